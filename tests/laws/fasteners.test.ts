import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import type { InterfaceResult } from '@shared/schemas/result';
import { calculated, expectClose } from './calculated';
import { bodyOf, flowPerShear, largestShear, shearArea } from './demand';
import { anyBeam, anyRules, anySection, fixedLoads, memberOf, runs, stack } from './members';

const scheduled = anyBeam.chain((beam) =>
  fc
    .record({ section: anySection, loads: fixedLoads(beam), rules: anyRules })
    .map(({ section, loads, rules }) => memberOf(beam, section, loads, rules)),
);

/** Positions of a row of fasteners from the zones: evenly divided, half the real spacing from a zone's ends. */
const positionsOf = (zones: readonly { from: number; to: number; perRow: number }[]): number[] =>
  zones.flatMap(({ from, to, perRow }) =>
    Array.from({ length: perRow }, (_, i) => from + ((to - from) * (i + 0.5)) / perRow),
  );

describe('every fastener', () => {
  it('stands evenly divided in its zone and takes the flow of its stretch; together they take all of it', () => {
    fc.assert(
      fc.property(scheduled, (member) => {
        const result = calculated(member);
        const body = bodyOf(member, result);
        for (const one of result.interfaces) {
          if (one.fasteners === null || one.zones.length === 0) continue;
          const expected = positionsOf(one.zones);
          const { positions, forces } = one.fasteners;
          expect(positions).toHaveLength(one.rows);
          expect(forces).toHaveLength(one.rows);
          const each = flowPerShear(result, one);
          const scale =
            (each * largestShear(body, member.length, 0, member.length) * member.length) / one.rows;
          positions.forEach((row, r) => {
            expect(row).toHaveLength(expected.length);
            let carried = 0;
            row.forEach((x, i) => {
              expectClose(x, expected[i] ?? NaN, member.length, 'position', 1e-12);
              const from = i === 0 ? 0 : (x + (row[i - 1] ?? NaN)) / 2;
              const to = i + 1 === row.length ? member.length : (x + (row[i + 1] ?? NaN)) / 2;
              const signed = (each * shearArea(body, member.length, from, to)) / one.rows;
              expectClose(forces[r]?.[i] ?? NaN, Math.abs(signed), scale, `force at ${x}`, 1e-9);
              carried += Math.sign(signed) * (forces[r]?.[i] ?? NaN);
            });
            const all = (each * shearArea(body, member.length, 0, member.length)) / one.rows;
            expectClose(carried, all, scale, 'the row’s sum', 1e-8);
          });
          const worst = Math.max(...forces.flat()) / one.capacity;
          expectClose(one.fasteners.utilisation, worst, 1e-9, 'utilisation', 1e-9);
          const status =
            worst > 1 + 1e-9 && one.utilisation <= 1 + 1e-9
              ? 'advice'
              : one.utilisation > 1 + 1e-9
                ? 'over'
                : 'ok';
          expect(one.status).toBe(status);
        }
      }),
      runs(120),
    );
  });
});

describe('given zones', () => {
  const pinned = anyBeam.chain((beam) =>
    fc
      .record({
        section: stack,
        loads: fixedLoads(beam),
        cuts: fc.uniqueArray(fc.integer({ min: 1, max: 9 }), { maxLength: 4 }),
        spacings: fc.array(fc.integer({ min: 15, max: 400 }), { minLength: 5, maxLength: 5 }),
      })
      .map(({ section, loads, cuts, spacings }): MemberInput => {
        const ends = [0, ...cuts.sort((a, b) => a - b).map((i) => (beam.length * i) / 10), beam.length];
        const zones = ends.slice(1).map((to, i) => ({ from: ends[i] ?? 0, to, spacing: spacings[i] ?? 100 }));
        return memberOf(
          beam,
          {
            ...section,
            connections: section.connections.map((one) => ({ ...one, zones: [...zones].reverse() })),
          },
          loads,
        );
      }),
  );

  it('stand as they are, from left to right, with their own utilisation; too much is over, never refused', () => {
    fc.assert(
      fc.property(pinned, (member) => {
        const result = calculated(member);
        const body = bodyOf(member, result);
        const given = [...(member.connections?.[0]?.zones ?? [])].sort((a, b) => a.from - b.from);
        result.interfaces.forEach((one: InterfaceResult) => {
          expect(one.pinned).toBe(true);
          expect(one.zones.map(({ from, to, spacing }) => ({ from, to, spacing }))).toEqual(given);
          const worst = one.zones.map(({ from, to, spacing, utilisation }) => {
            const q = flowPerShear(result, one) * largestShear(body, member.length, from, to);
            expectClose(utilisation, (spacing * q) / (one.rows * one.capacity), 1e-6, 'utilisation', 1e-8);
            return utilisation;
          });
          expectClose(one.utilisation, Math.max(...worst), 1e-9, 'the worst zone', 1e-9);
          expect(one.status === 'over').toBe(one.utilisation > 1 + 1e-9);
        });
      }),
      runs(80),
    );
  });
});
