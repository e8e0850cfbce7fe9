import { describe, expect, it } from 'vitest';
import { calculateMember } from '../../server/engine/calculate-member';

/** I of flanges 95×45 and web 45×220 on 4800, w = 3 N/mm, two rows of R = 400 N at each joint. */
function iSection(rules: object, zones?: { from: number; to: number; spacing: number }[]) {
  const connection = (pieces: [string, string]) => ({
    pieces,
    kind: 'fasteners',
    rows: 2,
    capacity: { basis: 'allowable', value: 400 },
    ...(zones === undefined ? {} : { zones }),
  });
  const outcome = calculateMember({
    schema: 1,
    length: 4800,
    supports: [
      { id: 'A', x: 0, kind: 'pin' },
      { id: 'B', x: 4800, kind: 'roller' },
    ],
    materials: [{ id: 'w', E: 11000 }],
    pieces: [
      { id: 'f', material: 'w', y: 0, z: 0, width: 95, depth: 45 },
      { id: 'w', material: 'w', y: 25, z: 45, width: 45, depth: 220 },
      { id: 'g', material: 'w', y: 0, z: 265, width: 95, depth: 45 },
    ],
    connections: [connection(['f', 'w']), connection(['w', 'g'])],
    loadCases: [{ id: 'Q', action: 'imposed', loads: [{ kind: 'uniform', from: 0, to: 4800, value: 3 }] }],
    rules,
  });
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.refusal));
  return outcome.result.interfaces;
}

// closed form: 2·(q/V)·M_max/R; the flange's force goes in over one half of the span and out over the other
const LEAST = 127.79538199;

describe('the flange force of a simple span must be got in and out', () => {
  it('the fasteners’ forces add up to it whatever their spacing', () => {
    // alike each side of midspan, so that no fastener's stretch holds flow of both directions
    const halves = [
      { from: 0, to: 1100, spacing: 37 },
      { from: 1100, to: 2400, spacing: 83 },
      { from: 2400, to: 3700, spacing: 83 },
      { from: 3700, to: 4800, spacing: 51 },
    ];
    for (const { fasteners } of iSection({}, halves)) {
      const sum = (fasteners?.forces ?? []).flat().reduce((total, force) => total + Math.abs(force), 0);
      expect(sum / 400 / LEAST).toBeCloseTo(1, 9);
    }
  });

  it.each([1, 2, 3, 5, 8, 12])(
    'no schedule of %i zones has fewer fasteners, and finer grading comes closer',
    (maxZones) => {
      const rules = { spacingStep: 1, spacingMin: 10, spacingMax: 1200, zoneGrid: 50, minZoneLength: 50 };
      const amount = (most: number) =>
        (iSection({ ...rules, maxZones: most })[0]?.zones ?? []).reduce(
          (total, { from, to, spacing }) => total + (2 * (to - from)) / spacing,
          0,
        );
      expect(amount(maxZones)).toBeGreaterThan(LEAST);
      expect(amount(maxZones)).toBeLessThanOrEqual(amount(Math.max(1, maxZones - 1)) + 1e-9);
      // linear flow cut into 6 stretches a half: at most 1/6 above, and a little for rounding down
      if (maxZones === 12) expect(amount(maxZones)).toBeLessThan(1.2 * LEAST);
    },
  );
});
