import { describe, expect, it } from 'vitest';
import { calculateMember } from '../../../../server/engine/calculate-member';
import { toBring } from './to-bring';
import { whyAt } from './why';
import { carriedSteps, jointOf } from './worked';
import type { Joint, Worked } from './worked';

/** Two boards 38 × 235 laid flat, 2 400 mm, one load of 100 kg at midspan, two rows of nails of 900/2.5 N. */
const boards = (change: Record<string, unknown> = {}) => ({
  schema: 1,
  title: 'Two flat boards',
  length: 2400,
  supports: [
    { id: 'A', x: 0, kind: 'pin' },
    { id: 'B', x: 2400, kind: 'roller' },
  ],
  materials: [{ id: 'w', E: 11000 }],
  pieces: [
    { id: 'lower', material: 'w', y: 0, z: 0, width: 235, depth: 38 },
    { id: 'upper', material: 'w', y: 0, z: 38, width: 235, depth: 38 },
  ],
  connections: [
    {
      pieces: ['lower', 'upper'],
      kind: 'fasteners',
      rows: 2,
      capacity: { basis: 'ultimate', value: 900, factorOfSafety: 2.5 },
      fastener: { type: 'nail', diameter: 3.1, length: 75 },
      ...change,
    },
  ],
  loadCases: [
    { id: 'P', name: 'Person', action: 'construction', loads: [{ kind: 'point', x: 1200, value: 980.665 }] },
  ],
  combinations: [{ id: 'C1', name: 'Person', factors: { P: 1 } }],
  rules: { spacingStep: 5, spacingMin: 20, spacingMax: 300 },
});

const work = (document: unknown): { worked: Worked; joint: Joint } => {
  const outcome = calculateMember(document);
  if (!outcome.ok) throw new Error(outcome.refusal.message);
  const joint = jointOf(outcome, null);
  if (joint === null) throw new Error('nothing is joined');
  return { worked: outcome, joint };
};

describe('why a spacing', () => {
  it('goes from load to spacing in steps one can work out again', () => {
    const { worked, joint } = work(boards());
    // closed form: V = P/2 = 490.3 N; q = 1.5 V/H = 1.5 · 490.3/76 = 9.678 N/mm; s = 2 · 360/9.678 = 74.4 mm
    expect(whyAt(worked, joint, 1200, 'metric')).toEqual({
      title: 'Why at 70 in zone 1',
      lines: [
        'C1 Person governs at x\u00a0=\u00a00',
        'V = 490\u00a0N',
        'q = V·Q/I = 9.68\u00a0N/mm',
        'R = 900 / 2.5 = 360\u00a0N a nail',
        's ≤ 2 · 360 / 9.68 = 74.4\u00a0mm',
        'down to a step of 5\u00a0mm: 70\u00a0mm',
      ],
    });
    // carried = rows · R/s = 2 · 360/70
    expect(carriedSteps(joint, 2400).steps).toEqual([
      { from: 0, to: 2400, value: expect.closeTo(10.2857, 4) },
    ]);
    // ⌈2400/70⌉ = 35 a row
    expect(toBring(worked, 'metric')).toEqual([{ what: '70 nails 3.1 × 75', joints: ['J1'] }]);
  });

  it('says that somebody pinned it', () => {
    const { worked, joint } = work(boards({ zones: [{ from: 0, to: 2400, spacing: 60 }] }));
    expect(whyAt(worked, joint, 0, 'metric').lines.at(-1)).toBe('pinned by hand: 60\u00a0mm');
  });

  it('says what stops it at the largest allowed', () => {
    const { worked, joint } = work({
      ...boards(),
      rules: { spacingStep: 5, spacingMin: 20, spacingMax: 50 },
    });
    expect(whyAt(worked, joint, 0, 'metric').lines.at(-1)).toBe(
      'no more than the largest allowed: 50\u00a0mm',
    );
  });

  it('says why there is none', () => {
    const { worked, joint } = work({
      ...boards(),
      rules: { spacingStep: 5, spacingMin: 80, spacingMax: 300 },
    });
    const why = whyAt(worked, joint, 0, 'metric');
    expect(why.title).toBe('Why there is no schedule');
    expect(why.lines.at(-1)).toBe('the rules allow no closer than 80\u00a0mm');
    // the most that is possible: 2 · 360/80 = 9 N/mm
    expect(carriedSteps(joint, 2400)).toEqual({
      steps: [{ from: 0, to: 2400, value: expect.closeTo(9, 9) }],
      onlyPossible: true,
    });
    expect(toBring(worked, 'metric')).toEqual([]);
  });

  it('speaks of stress where the joint is glued', () => {
    const glue = {
      kind: 'adhesive',
      rows: undefined,
      fastener: undefined,
      capacity: { basis: 'allowable', value: 0.6 },
    };
    const { worked, joint } = work(boards(glue));
    const { lines } = whyAt(worked, joint, 0, 'metric');
    // τ = 9.678/235 = 0.0412 MPa; 0.0412/0.6 = 0.0686
    expect(lines.slice(-2)).toEqual(['τ = 9.68 N/mm / 235\u00a0mm = 0.0412\u00a0MPa', 'τ / R = 0.0686']);
    expect(toBring(worked, 'metric')).toEqual([
      { what: 'glue for 235\u00a0mm × 2\u202f400\u00a0mm', joints: ['J1'] },
    ]);
  });

  it('speaks of runs where the line has a bead', () => {
    const bead = {
      kind: 'continuous',
      rows: undefined,
      fastener: undefined,
      capacity: { basis: 'allowable', value: 20 },
      bead: 50,
    };
    const { worked, joint } = work({
      ...boards(bead),
      rules: { spacingStep: 5, spacingMin: 20, spacingMax: 300 },
    });
    // pitch ≤ 50 · 20/9.678 = 103.3 mm, so 100; ⌈2400/100⌉ = 24 runs
    expect(whyAt(worked, joint, 0, 'metric').lines.slice(-2)).toEqual([
      's ≤ 1\u202f000 / 9.68 = 103.3\u00a0mm',
      'down to a step of 5\u00a0mm: 100\u00a0mm',
    ]);
    expect(toBring(worked, 'metric')).toEqual([{ what: '24 runs of 50\u00a0mm', joints: ['J1'] }]);
  });

  it('speaks in the units of who reads', () => {
    const { worked, joint } = work(boards());
    // 490.3 N = 110.2 lb; 9.678 N/mm = 55.3 lb/in
    expect(whyAt(worked, joint, 0, 'us').lines.slice(1, 3)).toEqual([
      'V = 110\u00a0lb',
      'q = V·Q/I = 55.3\u00a0lb/in',
    ]);
  });

  it('keeps load passed sideways apart from shear', () => {
    const plies = {
      ...boards(),
      pieces: [
        { id: 'lower', material: 'w', y: 0, z: 0, width: 45, depth: 220 },
        { id: 'upper', material: 'w', y: 45, z: 0, width: 45, depth: 220 },
      ],
      loadCases: [
        {
          id: 'P',
          name: 'Hung',
          action: 'imposed',
          loads: [{ kind: 'uniform', from: 0, to: 2400, value: 3, on: 'lower' }],
        },
      ],
    };
    const { worked, joint } = work(plies);
    // two equal plies share a load put on one: half of 3 N/mm crosses
    expect(whyAt(worked, joint, 0, 'metric').lines.slice(1, 3)).toEqual([
      'V asks nothing of this joint; load passed sideways does',
      'q = t = 1.50\u00a0N/mm',
    ]);
  });
});
