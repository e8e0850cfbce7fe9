import { describe, expect, it } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import { calculateMember } from '../../server/engine/calculate-member';

/** Two boards on a simple span of 3100 under 1.7 N/mm; what is given is put over it. */
function codesOf(change: Partial<MemberInput>): string[] {
  const outcome = calculateMember({
    schema: 1,
    length: 3100,
    supports: [
      { id: 'A', x: 0, kind: 'pin' },
      { id: 'B', x: 3100, kind: 'roller' },
    ],
    materials: [{ id: 'w', E: 10_400, density: 430 }],
    pieces: [
      { id: 'P1', material: 'w', y: 0, z: 0, width: 140, depth: 45 },
      { id: 'P2', material: 'w', y: 0, z: 45, width: 140, depth: 45 },
    ],
    connections: [connection({ basis: 'ultimate', value: 3100, factorOfSafety: 2.5 })],
    loadCases: [{ id: 'Q', action: 'imposed', loads: [{ kind: 'uniform', from: 0, to: 3100, value: 1.7 }] }],
    ...change,
  } satisfies MemberInput);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.refusal));
  return outcome.result.notices.map(({ code }) => code);
}

type Connection = NonNullable<MemberInput['connections']>[number];
const connection = (capacity: Connection['capacity']): Connection => ({
  pieces: ['P1', 'P2'],
  kind: 'fasteners',
  rows: 2,
  capacity,
});
const combination = (factor: number) => ({ combinations: [{ id: 'C1', factors: { Q: factor } }] });

// each beside the sentence of the member document's contract that asks for it
describe('what the person who signs is told beside the figures', () => {
  it('factored loads beside a factor of safety: the mismatch gets a notice; unfactored ones do not', () => {
    expect(codesOf(combination(1.5))).toContain('factored-loads');
    expect(codesOf(combination(1))).not.toContain('factored-loads');
  });

  it('a section not symmetric about a vertical line must be restrained; a symmetric one need not', () => {
    const pieces = [
      { id: 'P1', material: 'w', y: 0, z: 0, width: 140, depth: 45 },
      { id: 'P2', material: 'w', y: 5, z: 45, width: 140, depth: 45 },
    ];
    expect(codesOf({ pieces })).toContain('asymmetric-section');
    expect(codesOf({})).not.toContain('asymmetric-section');
  });

  it('slip in the joints is not left out in silence', () => {
    expect(codesOf({ rules: { composite: 'slip' } })).toContain('slip-not-available');
    expect(codesOf({ rules: { composite: 'gamma' } })).toContain('slip-not-available');
    expect(codesOf({})).toContain('rigid-joints');
  });

  it('no schedule, and none missing where there is one', () => {
    const weak = connection({ basis: 'allowable', value: 200 });
    expect(codesOf({ connections: [weak] })).toContain('no-schedule');
    expect(codesOf({})).not.toContain('no-schedule');
  });

  it('a train one way round only; not where it is entered both ways, nor for a single axle', () => {
    const train = (...axles: [number, number][]): MemberInput['loadCases'] => [
      {
        id: 'T',
        action: 'construction',
        loads: [
          { kind: 'moving', from: 0, to: 3100, axles: axles.map(([offset, value]) => ({ offset, value })) },
        ],
      },
    ];
    const there = train([0, 900], [700, 400]);
    const back = train([0, 400], [700, 900]).map((one) => ({ ...one, id: 'U' }));
    expect(codesOf({ loadCases: there })).toContain('one-way-train');
    expect(codesOf({ loadCases: [...there, ...back] })).not.toContain('one-way-train');
    expect(codesOf({ loadCases: train([0, 900]) })).not.toContain('one-way-train');
  });

  it('runs whose pitch is below their own length', () => {
    const bead: Connection = {
      pieces: ['P1', 'P2'],
      kind: 'continuous',
      bead: 90,
      capacity: { basis: 'allowable', value: 31 },
      zones: [{ from: 0, to: 3100, spacing: 80 }],
    };
    expect(codesOf({ connections: [bead] })).toContain('pitch-below-bead');
  });
});
