import { describe, expect, it } from 'vitest';
import { calculateMember } from '../../server/engine/calculate-member';
import { compare } from '../../server/engine/second-method/compare';
import { recalculate } from '../../server/engine/second-method/recalculate';
import { randomMember } from '../support/random-members';

/*
 * Two methods that share no code work out the same random members. Where both are exact (loads at rest; V, M and reactions
 * under trains on determinate beams) every figure agrees to 1e-6. Where the second method samples the positions of a train
 * (indeterminate beams, trains on one ply) it may find up to `SAMPLED` less than the first, never more.
 *
 * SECOND_SEED in the environment starts at another seed, SECOND_TIMES takes so many times the members.
 */
const FIRST_SEED = Number(process.env['SECOND_SEED'] ?? 0);
const TIMES = Number(process.env['SECOND_TIMES'] ?? 1);
const GROUP = 65 * TIMES;
const GROUPS = Array.from({ length: 8 }, (_, i) => FIRST_SEED + i * GROUP);

/** What differs in one member, a line for each figure. */
function differences(seed: number): string[] {
  const outcome = calculateMember(randomMember(seed));
  if (!outcome.ok) return [`seed ${seed} is refused: ${JSON.stringify(outcome.refusal.issues)}`];
  return compare(outcome.result, recalculate(outcome.document, outcome.result.envelope.x))
    .filter(({ same }) => !same)
    .map(
      ({ figure, first, second, difference, tolerance }) =>
        `seed ${seed} ${figure}: first ${first}, second ${second}, ${difference.toExponential(1)} apart, ${tolerance} allowed`,
    );
}

describe('The first method and the second agree on random members', () => {
  it.each(GROUPS)('from seed %i on', (from) => {
    const told = Array.from({ length: GROUP }, (_, i) => differences(from + i)).flat();
    expect(told).toEqual([]);
  });
});

describe('The comparison', () => {
  const outcome = calculateMember(randomMember(4));
  if (!outcome.ok) throw new Error('the member of this test is refused');
  const { document, result } = outcome;
  const second = recalculate(document, result.envelope.x);

  it('notices a reaction, a flow and a spacing that are off by two millionths', () => {
    const off = structuredClone(result);
    const reaction = off.reactions[0];
    const first = off.interfaces[0];
    if (reaction === undefined || first === undefined) throw new Error('no reaction or interface');
    const largest = Math.max(...off.reactions.map(({ max, min }) => Math.max(Math.abs(max), Math.abs(min))));
    reaction.max += 2e-6 * largest;
    first.peakFlow.value *= 1 + 2e-6;
    off.section.EI *= 1 - 2e-6;
    const named = compare(off, second)
      .filter(({ same }) => !same)
      .map(({ figure }) => figure);
    expect(named).toContain(`reactions.${reaction.combination}.${reaction.support}.max`);
    expect(named).toContain(`interfaces.${first.id}.peakFlow`);
    expect(named).toContain('section.EI');
  });

  it('notices a single station of a curve', () => {
    const off = structuredClone(result);
    const middle = Math.floor(off.envelope.x.length / 2);
    const largest = Math.abs(off.extremes.moment.value);
    off.envelope.momentMax[middle] = (off.envelope.momentMax[middle] ?? 0) + 2e-6 * largest;
    const named = compare(off, second)
      .filter(({ same }) => !same)
      .map(({ figure }) => figure);
    expect(named).toEqual([`envelope.momentMax@${off.envelope.x[middle]}`]);
  });
});

describe('The comparison of schedules', () => {
  const seed = 29;
  const outcome = calculateMember(randomMember(seed));
  if (!outcome.ok) throw new Error('the member of this test is refused');
  const { document, result } = outcome;
  const second = recalculate(document, result.envelope.x);
  /** The figures that differ once the first fastened interface with a schedule of its own is changed. */
  const named = (change: (each: (typeof result.interfaces)[number]) => void): string[] => {
    const off = structuredClone(result);
    const graded = off.interfaces.find(({ fasteners, pinned }) => (fasteners?.count ?? 0) > 0 && !pinned);
    if (graded === undefined) throw new Error(`member ${seed} has no fastened interface`);
    change(graded);
    return compare(off, second)
      .filter(({ same }) => !same)
      .map(({ figure }) => figure.replace(/J\d+/, 'J'));
  };

  it('finds nothing where nothing is changed', () => {
    expect(named(() => undefined)).toEqual([]);
  });

  it('notices a spacing one step closer, which costs more', () => {
    const found = named(({ zones }) => {
      const zone = zones[0];
      if (zone !== undefined) zone.spacing -= document.rules.spacingStep;
    });
    expect(found).toContain('interfaces.J.cost');
  });

  it('notices a spacing one step wider, which is over what the flow allows', () => {
    const found = named(({ zones }) => {
      const zone = zones[0];
      if (zone !== undefined) zone.spacing += document.rules.spacingStep;
    });
    expect(found).toContain('interfaces.J.zones.0.utilisation');
  });

  it('notices one force of one fastener', () => {
    const found = named(({ fasteners }) => {
      const row = fasteners?.forces[0];
      if (row !== undefined) row[0] = (row[0] ?? 0) * (1 + 3e-6);
    });
    expect(found).toEqual(['interfaces.J.forces.0.0']);
  });
});

describe('The random members', () => {
  const members = Array.from({ length: 520 }, (_, seed) => randomMember(seed));
  const part = (holds: (member: (typeof members)[number]) => boolean): number =>
    members.filter(holds).length / members.length;

  it('are the same for the same seed', () => {
    expect(members[17]).toEqual(randomMember(17));
    expect(members[17]).not.toEqual(randomMember(18));
  });

  it('hold every kind of support, load and capacity, trains in about a third', () => {
    const trains = part(({ loadCases }) =>
      loadCases.some(({ loads }) => (loads ?? []).some(({ kind }) => kind === 'moving')),
    );
    expect(trains).toBeGreaterThan(0.28);
    expect(trains).toBeLessThan(0.42);
    const loads = members.flatMap(({ loadCases }) => loadCases.flatMap((each) => each.loads ?? []));
    expect(new Set(loads.map(({ kind }) => kind))).toEqual(
      new Set(['uniform', 'varying', 'point', 'couple', 'moving']),
    );
    expect(loads.some((load) => load.on !== undefined)).toBe(true);
    const supports = members.flatMap((member) => member.supports.map(({ kind }) => kind));
    expect(new Set(supports)).toEqual(new Set(['pin', 'roller', 'fixed', 'spring']));
    const connections = members.flatMap((member) => member.connections ?? []);
    expect(new Set(connections.map(({ capacity }) => capacity.basis))).toEqual(
      new Set(['ultimate', 'allowable', 'test']),
    );
    expect(new Set(connections.map(({ kind }) => kind))).toEqual(
      new Set(['fasteners', 'adhesive', 'continuous']),
    );
    expect(part(({ hinges }) => (hinges ?? []).length > 0)).toBeGreaterThan(0.1);
    expect(part(({ rules }) => rules?.mirror === true)).toBeGreaterThan(0.1);
    expect(
      part((member) => (member.connections ?? []).some(({ zones }) => zones !== undefined)),
    ).toBeGreaterThan(0.1);
    expect(
      part((member) => (member.connections ?? []).some(({ bead }) => bead !== undefined)),
    ).toBeGreaterThan(0.1);
  });
});
