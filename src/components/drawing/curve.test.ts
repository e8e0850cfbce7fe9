import { describe, expect, it } from 'vitest';
import { stretchesAbove, withoutCollisions, xScale } from './curve';

describe('one scale along the beam', () => {
  it('goes there and back, and stays on the beam', () => {
    const scale = xScale(4200, 100, 940);
    expect(scale.at(0)).toBe(100);
    expect(scale.at(4200)).toBe(940);
    expect(scale.back(scale.at(1230))).toBeCloseTo(1230, 9);
    expect(scale.back(20)).toBe(0);
    expect(scale.back(2000)).toBe(4200);
  });
});

describe('where needed lies above carried', () => {
  it('is cut where the lines cross', () => {
    // from 10 down to 0 over 1000 mm; 4 is carried, so it crosses at 600
    const [only, ...rest] = stretchesAbove([0, 1000], [10, 0], [{ from: 0, to: 1000, value: 4 }]);
    expect(rest).toEqual([]);
    expect(only?.map((point) => point.x)).toEqual([0, 600]);
    expect(only?.map((point) => point.curve)).toEqual([10, 4]);
  });

  it('follows steps and jumps', () => {
    const found = stretchesAbove(
      [0, 500, 500, 1000],
      [2, 6, 1, 9],
      [
        { from: 0, to: 400, value: 5 },
        { from: 400, to: 1000, value: 5 },
      ],
    );
    // rises past 5 at 375 in the first zone; on in the second up to the jump; from 1 to 9 past 5 half-way
    expect(found.map((points) => [points[0]?.x, points.at(-1)?.x])).toEqual([
      [375, 400],
      [400, 500],
      [750, 1000],
    ]);
  });

  it('is nowhere where enough is carried, even exactly enough', () => {
    expect(stretchesAbove([0, 1000], [5, 5], [{ from: 0, to: 1000, value: 5 }])).toEqual([]);
  });
});

describe('figures written on a drawing', () => {
  it('do not run into each other; the first stays', () => {
    const labels = [
      { x: 100, y: 20, text: '1 789', anchor: 'middle' as const },
      { x: 110, y: 24, text: '1 700', anchor: 'middle' as const },
      { x: 110, y: 60, text: '−1 461', anchor: 'middle' as const },
    ];
    expect(withoutCollisions(labels).map((label) => label.text)).toEqual(['1 789', '−1 461']);
  });
});
