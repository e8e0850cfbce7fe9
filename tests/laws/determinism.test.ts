import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { calculateMember } from '../../server/engine/calculate-member';
import { anyBeam, anyRules, anySection, fixedLoads, memberOf, runs, train } from './members';

const members = anyBeam.chain((beam) =>
  fc
    .record({
      section: anySection,
      loads: fixedLoads(beam),
      moving: fc.option(train(beam), { nil: null }),
      rules: anyRules,
    })
    .map(({ section, loads, moving, rules }) =>
      memberOf(beam, section, moving === null ? loads : [...loads, moving], rules),
    ),
);

/** The same value with the keys of every object in the opposite order. */
function reversed(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(reversed);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value)
      .reverse()
      .map(([key, inner]) => [key, reversed(inner)]),
  );
}

describe('the same document', () => {
  it('gives the same result byte for byte, whatever was calculated between', () => {
    fc.assert(
      fc.property(members, members, (member, other) => {
        const first = JSON.stringify(calculateMember(member));
        calculateMember(other);
        expect(JSON.stringify(calculateMember(structuredClone(member)))).toBe(first);
      }),
      runs(60),
    );
  });

  it('gives the same result with its keys in another order', () => {
    fc.assert(
      fc.property(members, (member) => {
        const outcome = (input: unknown): string => {
          const calculation = calculateMember(input);
          return JSON.stringify(calculation.ok ? calculation.result : calculation.refusal);
        };
        expect(outcome(reversed(member))).toBe(outcome(member));
      }),
      runs(60),
    );
  });

  it('is not changed by being calculated', () => {
    fc.assert(
      fc.property(members, (member) => {
        const before = JSON.stringify(member);
        calculateMember(member);
        expect(JSON.stringify(member)).toBe(before);
      }),
      runs(30),
    );
  });
});
