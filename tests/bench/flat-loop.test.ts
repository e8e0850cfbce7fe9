import { readFileSync } from 'node:fs';
import { memberDocumentSchema } from '@shared/schemas/member';
import { describe, expect, it } from 'vitest';
import { flatLoop, POSITIONS, prepare, stationsAt } from '../../bench/flat-loop';
import { influenceLines } from '../../bench/influence';
import { calculateMember } from '../../server/engine/calculate-member';

/** A yardstick that measures wrongly, or does less than it says, is none. */
describe('the influence lines of the yardstick', () => {
  const valueAt = (lines: Float64Array, at: number, t: number): number =>
    [3, 2, 1, 0].reduce((sum, power) => sum * t + (lines[at + power] ?? 0), 0);

  it('two equal spans, one load: M = 0.2074 PL at 0.4323 L (closed form)', () => {
    const at = 0.4323;
    const { moment } = influenceLines([1, 1], [{ x: at, span: 0, left: false }]);
    expect(valueAt(moment, 4, at)).toBeCloseTo(0.2074, 4);
  });

  it('two equal spans: support moment −PL/(6√3) with the load at L/√3 (closed form)', () => {
    const { moment } = influenceLines([1, 1], [{ x: 1, span: 0, left: true }]);
    expect(valueAt(moment, 0, 1 / Math.sqrt(3))).toBeCloseTo(-1 / (6 * Math.sqrt(3)), 12);
  });

  it('two equal spans, uniform load on both: support moment −wL²/8 (closed form), from the areas', () => {
    const { moment } = influenceLines([2, 2], [{ x: 2, span: 0, left: true }]);
    const area = [0, 1].reduce(
      (sum, span) =>
        sum +
        2 * [0, 1, 2, 3].reduce((part, power) => part + (moment[span * 8 + power] ?? 0) / (power + 1), 0),
      0,
    );
    expect(area).toBeCloseTo(-4 / 8, 12);
  });

  it('reads the left value at a support in the span on its left', () => {
    expect(stationsAt([0, 1, 1, 2], [1, 1]).map(({ span }) => span)).toEqual([0, 0, 1, 1]);
  });
});

describe('the heavy member', () => {
  const document = memberDocumentSchema.parse(
    JSON.parse(readFileSync(new URL('../../bench/heavy-member.json', import.meta.url), 'utf8')),
  );

  it('is as heavy as it says', () => {
    expect(document.supports).toHaveLength(7);
    expect(document.loadCases).toHaveLength(8);
    expect(document.combinations).toHaveLength(24);
    expect(document.pieces).toHaveLength(7);
    expect(document.connections).toHaveLength(8);
    expect(document.rules.maxZones).toBe(12);
    const moving = document.loadCases.flatMap(({ loads }) => loads.filter(({ kind }) => kind === 'moving'));
    expect(moving.every((load) => load.kind === 'moving' && load.axles.length === 3)).toBe(true);
    // edges − nodes + 1 = independent loops of a connected graph
    expect(document.connections.length - document.pieces.length + 1).toBe(2);
  });

  it('can be scheduled at every interface', () => {
    const outcome = calculateMember(document);
    if (!outcome.ok) throw new Error(outcome.refusal.message);
    expect(outcome.result.interfaces).toHaveLength(8);
    for (const { zones, status } of outcome.result.interfaces) {
      expect(zones.length).toBeGreaterThan(1);
      expect(status).not.toBe('over');
    }
  });

  it('has the same V and M by the flat loop as by the engine: at rest exactly, moving from just below', () => {
    // A hundred times the positions: stepping falls short of the exact extreme by a hundredth of a step.
    const fine = 100 * POSITIONS;
    const resting = {
      ...document,
      combinations: document.combinations.filter(({ factors }) => !factors['T1'] && !factors['T2']),
    };
    for (const [input, tolerance] of [
      [resting, 1e-9],
      [document, 2e-4],
    ] as const) {
      const outcome = calculateMember(input);
      if (!outcome.ok) throw new Error(outcome.refusal.message);
      const { envelope } = outcome.result;
      const flat = flatLoop(prepare(input, envelope.x, fine));
      const last = envelope.x.length - 1;
      for (const name of ['shearMax', 'shearMin', 'momentMax', 'momentMin'] as const) {
        const scale = Math.max(...envelope[name].map(Math.abs));
        const sign = name.endsWith('Max') ? 1 : -1;
        // a beam's ends have a value outside the beam as well, which the loop does not know
        for (let i = 0; i <= last; i += 1) {
          const x = envelope.x[i] ?? 0;
          if (x === 0 || x === document.length) continue;
          const shortfall = (sign * ((envelope[name][i] ?? 0) - (flat[name][i] ?? 0))) / scale;
          expect(shortfall, `${name} at ${x}`).toBeGreaterThan(-1e-9);
          expect(shortfall, `${name} at ${x}`).toBeLessThan(tolerance);
        }
      }
    }
  });
});
