import { describe, expect, it } from 'vitest';
import { tapeTicks } from './tape-ticks';

describe('the tape rule', () => {
  it('has ticks of 20, 100 and 500 mm at the scale of a desk screen, the metre bold', () => {
    const { ticks, step } = tapeTicks(4200, 823 / 4200, 'metric');
    expect(step).toBe(20);
    expect(ticks).toHaveLength(211);
    expect(ticks.filter((tick) => tick.size === 'large').map((tick) => tick.x)).toEqual(
      Array.from({ length: 9 }, (_, index) => index * 500),
    );
    expect(ticks.filter((tick) => tick.size === 'middle')).toHaveLength(43 - 9);
    expect(ticks.find((tick) => tick.x === 1000)).toEqual({
      x: 1000,
      size: 'large',
      bold: true,
      label: '1\u202f000',
    });
    expect(ticks.find((tick) => tick.x === 1500)?.bold).toBe(false);
  });

  it('goes wider on a narrow screen and closer on a short beam', () => {
    expect(tapeTicks(4200, 328 / 4200, 'metric').step).toBe(100);
    expect(tapeTicks(400, 823 / 400, 'metric').step).toBe(2);
  });

  it('counts inches and feet where these are read', () => {
    const { ticks, step } = tapeTicks(12 * 304.8, 823 / (12 * 304.8), 'us');
    expect(step).toBeCloseTo(25.4, 9);
    expect(ticks.filter((tick) => tick.label !== null).map((tick) => tick.label)).toEqual(
      Array.from({ length: 12 }, (_, index) => `${index + 1}′`),
    );
    expect(ticks.filter((tick) => tick.bold)).toHaveLength(13);
  });

  it('leaves room for every label and never goes past the beam', () => {
    for (const length of [90, 650, 3333, 12_345, 99_000, 1e7])
      for (const width of [300, 823])
        for (const system of ['metric', 'us'] as const) {
          const { ticks } = tapeTicks(length, width / length, system);
          const labelled = ticks
            .filter((tick) => tick.label !== null)
            .map((tick) => (tick.x * width) / length);
          for (const [index, x] of labelled.entries())
            if (index > 0) expect(x - (labelled[index - 1] ?? 0)).toBeGreaterThanOrEqual(46);
          expect(ticks.at(-1)?.x ?? 0).toBeLessThanOrEqual(length * (1 + 1e-9));
          expect(ticks.length).toBeLessThan(400);
        }
  });
});
