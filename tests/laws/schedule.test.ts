import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import type { InterfaceResult } from '@shared/schemas/result';
import { amount, calculated, expectClose } from './calculated';
import { bodyOf, flowPerShear, largestShear, shearArea } from './demand';
import {
  anyRules,
  anyBeam,
  anySection,
  box,
  brokenJoints,
  fixedLoads,
  ledger,
  memberOf,
  runs,
  stack,
  train,
  type RulesInput,
} from './members';

interface Limits {
  step: number;
  min: number;
  max: number;
  zones: number;
  grid: number;
  shortest: number;
  mirror: boolean;
}
const limitsOf = (rules: RulesInput): Limits => ({
  step: rules.spacingStep ?? 5,
  min: rules.spacingMin ?? 40,
  max: rules.spacingMax ?? 300,
  zones: rules.maxZones ?? 3,
  grid: rules.zoneGrid ?? 100,
  shortest: rules.minZoneLength ?? 300,
  mirror: rules.mirror ?? false,
});

const isMultiple = (value: number, of: number): boolean =>
  Math.abs(value / of - Math.round(value / of)) < 1e-9;

const scheduled = anyBeam.chain((beam) =>
  fc
    .record({ section: anySection, loads: fixedLoads(beam), rules: anyRules })
    .map(({ section, loads, rules }) => memberOf(beam, section, loads, rules)),
);

/** Places where a zone may end: multiples of the grid from the left end (both ends, mirrored), and the beam's ends. */
function boundaries(length: number, { grid, mirror }: Limits): number[] {
  const reach = mirror ? length / 2 : length;
  const left: number[] = [];
  for (let i = 0; i * grid <= reach + 1e-9; i += 1) left.push(i * grid);
  const all = mirror ? [...left, ...left.map((x) => length - x)] : [...left, length];
  return [...new Set(all.map((x) => Math.round(x * 1e6) / 1e6))]
    .filter((x) => x <= length)
    .sort((a, b) => a - b);
}

/** Every schedule there is, the cheapest returned: fasteners (Σ rows·length/spacing), then zones. */
function byEnumeration(
  length: number,
  limits: Limits,
  rows: number,
  R: number,
  flow: (from: number, to: number) => number,
): { amount: number; zones: number } | null {
  const places = boundaries(length, limits);
  const spacingOf = (from: number, to: number): number => {
    const q = flow(from, to);
    const allowed = Math.min(limits.max, q > 1e-9 ? (rows * R) / q : Infinity);
    const spacing = Math.floor(allowed / limits.step + 1e-9) * limits.step;
    return spacing >= limits.min - 1e-9 && spacing > 0 ? spacing : NaN;
  };
  let best: { amount: number; zones: number } | null = null;
  const visit = (cuts: number[]): void => {
    const from = cuts.at(-1) ?? 0;
    if (from === length) {
      const pairs = cuts.slice(1).map((to, i): [number, number] => [cuts[i] ?? NaN, to]);
      const reads = pairs.map(([a, b]) => ({ length: b - a, spacing: spacingOf(a, b) }));
      if (limits.mirror) {
        const n = pairs.length;
        const same = pairs.every(([a, b], i) => {
          const [c = NaN, d = NaN] = pairs[n - 1 - i] ?? [];
          return Math.abs(a - (length - d)) < 1e-6 && Math.abs(b - (length - c)) < 1e-6;
        });
        if (!same) return;
        // both ends read the same: the closer spacing of the two
        for (let i = 0; i < n / 2; i += 1) {
          const one = reads[i];
          const other = reads[n - 1 - i];
          if (one !== undefined && other !== undefined) {
            one.spacing = other.spacing = Math.min(one.spacing, other.spacing);
          }
        }
      }
      if (reads.some(({ spacing }) => Number.isNaN(spacing))) return;
      const total = reads.reduce((sum, zone) => sum + (rows * zone.length) / zone.spacing, 0);
      const better =
        best === null ||
        total < best.amount * (1 - 1e-12) ||
        (total <= best.amount * (1 + 1e-12) && pairs.length < best.zones);
      if (better) best = { amount: total, zones: pairs.length };
      return;
    }
    if (cuts.length > limits.zones) return;
    for (const to of places) {
      // the shortest zone: a beam shorter than it is one zone
      if (to > from && (to - from >= limits.shortest - 1e-9 || (from === 0 && to === length)))
        visit([...cuts, to]);
    }
  };
  visit([0]);
  return best;
}

describe('a schedule that was found', () => {
  it('covers the beam, keeps to the step, the limits, the grid, the shortest zone and the number of zones', () => {
    fc.assert(
      fc.property(scheduled, (member) => {
        const limits = limitsOf(member.rules ?? {});
        const places = boundaries(member.length, limits);
        for (const { zones, rows, fasteners } of calculated(member).interfaces) {
          if (zones.length === 0) continue;
          expect(zones[0]?.from).toBe(0);
          expect(zones.at(-1)?.to).toBe(member.length);
          expect(zones.length).toBeLessThanOrEqual(limits.zones);
          let count = 0;
          zones.forEach(({ from, to, spacing, perRow }, i) => {
            if (i > 0) expect(from).toBe(zones[i - 1]?.to);
            expect(isMultiple(spacing, limits.step), `${spacing} on steps of ${limits.step}`).toBe(true);
            expect(spacing).toBeGreaterThanOrEqual(limits.min);
            expect(spacing).toBeLessThanOrEqual(limits.max);
            if (zones.length > 1) expect(to - from).toBeGreaterThanOrEqual(limits.shortest - 1e-9);
            expect(
              places.some((x) => Math.abs(x - to) < 1e-6),
              `${to} is a place for a boundary`,
            ).toBe(true);
            expect(perRow).toBe(Math.ceil((to - from) / spacing - 1e-9));
            count += perRow * rows;
          });
          expect(fasteners?.count).toBe(count);
          if (limits.mirror) {
            const turned = [...zones].reverse();
            zones.forEach(({ from, to, spacing }, i) => {
              expect(turned[i]?.spacing).toBe(spacing);
              expectClose(member.length - (turned[i]?.to ?? NaN), from, 1, 'mirrored start', 1e-9);
              expectClose(member.length - (turned[i]?.from ?? NaN), to, 1, 'mirrored end', 1e-9);
            });
          }
        }
      }),
      runs(150),
    );
  });

  it('is never above the required spacing anywhere, by the forces themselves', () => {
    fc.assert(
      fc.property(scheduled, (member) => {
        const result = calculated(member);
        const body = bodyOf(member, result);
        for (const one of result.interfaces) {
          const each = flowPerShear(result, one);
          for (const { from, to, spacing, utilisation } of one.zones) {
            const q = each * largestShear(body, member.length, from, to);
            expect(spacing * q).toBeLessThanOrEqual(one.rows * one.capacity * (1 + 2e-9));
            expectClose(utilisation, (spacing * q) / (one.rows * one.capacity), 1e-6, 'utilisation', 1e-7);
          }
          const q = each * largestShear(body, member.length, 0, member.length);
          expectClose(one.peakFlow.value, q, 1e-9, 'peak flow', 1e-8);
          if (one.requiredSpacing !== null) {
            expectClose(one.requiredSpacing, (one.rows * one.capacity) / q, 0, 'required spacing', 1e-8);
          }
        }
      }),
      runs(150),
    );
  });

  // Few places for boundaries, so that every schedule can be tried.
  const small = fc
    .record({
      cells: fc.integer({ min: 3, max: 9 }),
      rest: fc.constantFrom(0, 0, 30),
      rules: fc.record({
        spacingStep: fc.constantFrom(5, 10),
        spacingMin: fc.constantFrom(5, 20, 60, 100),
        spacingMax: fc.constantFrom(120, 300),
        maxZones: fc.integer({ min: 1, max: 5 }),
        zoneGrid: fc.constant(200),
        minZoneLength: fc.constantFrom(0, 200, 350, 600),
        mirror: fc.boolean(),
      }),
    })
    .chain(({ cells, rest, rules }) => {
      const beam = {
        length: cells * 200 + rest,
        supports: [
          { id: 'A', x: 0, kind: 'pin' as const },
          { id: 'B', x: cells * 200 + rest, kind: 'roller' as const },
        ],
        hinges: [],
      };
      return fc
        .record({ section: fc.oneof(stack, box, brokenJoints, ledger), loads: fixedLoads(beam, 3) })
        .map(({ section, loads }) => memberOf(beam, section, loads, rules));
    });

  it('has no better one: every schedule of a small member tried', () => {
    let found = 0;
    let none = 0;
    fc.assert(
      fc.property(small, (member) => {
        const result = calculated(member);
        const body = bodyOf(member, result);
        const limits = limitsOf(member.rules ?? {});
        for (const one of result.interfaces) {
          const each = flowPerShear(result, one);
          const best = byEnumeration(
            member.length,
            limits,
            one.rows,
            one.capacity,
            (from, to) => each * largestShear(body, member.length, from, to),
          );
          if (best === null) {
            expect(one.zones).toEqual([]);
            expect(one.status).toBe('over');
            expect(one.fasteners?.count).toBe(0);
            expect(result.notices.some(({ code }) => code === 'no-schedule')).toBe(true);
            none += 1;
          } else {
            expect(one.zones.length, 'there is a schedule').toBeGreaterThan(0);
            expectClose(amount(one), best.amount, 0, 'fasteners', 1e-9);
            expect(one.zones.length).toBe(best.zones);
            found += 1;
          }
        }
      }),
      runs(250),
    );
    // the sample must hold both kinds, or the law was not tried
    expect(found).toBeGreaterThan(50);
    expect(none).toBeGreaterThan(10);
  });
});

describe('a schedule under moving loads, several combinations and load passed sideways', () => {
  const cells = 8;
  const busy = fc
    .record({
      zoneGrid: fc.constantFrom(200, 300),
      section: fc.oneof(stack, box, ledger),
      rules: fc.record({
        spacingStep: fc.constantFrom(1, 5),
        spacingMin: fc.constantFrom(5, 40),
        spacingMax: fc.constant(250),
        maxZones: fc.integer({ min: 2, max: 5 }),
        minZoneLength: fc.constantFrom(0, 350, 600),
        mirror: fc.boolean(),
      }),
    })
    .chain(({ zoneGrid, section, rules }) => {
      const length = cells * zoneGrid;
      const beam = {
        length,
        supports: [
          { id: 'A', x: 0, kind: 'pin' as const },
          { id: 'B', x: length * 0.6, kind: 'roller' as const },
          { id: 'C', x: length, kind: 'roller' as const },
        ],
        hinges: [],
      };
      const on = section.pieces.at(-1)?.id ?? '';
      return fc
        .record({ dead: fixedLoads(beam, 2), moving: train(beam), side: fc.boolean() })
        .map(({ dead, moving, side }): MemberInput => ({
          ...memberOf(beam, section, [], { ...rules, zoneGrid }),
          loadCases: [
            { id: 'G', action: 'permanent', loads: side ? dead.map((load) => ({ ...load, on })) : dead },
            { id: 'W', action: 'construction', loads: [side ? { ...moving, on } : moving] },
          ],
          combinations: [
            { id: 'C1', factors: { G: 1.35 } },
            { id: 'C2', factors: { G: 1, W: 1.5 } },
          ],
        }));
    });

  it('has no better one: every schedule tried, each cell’s flow as a given zone reports it', () => {
    fc.assert(
      fc.property(busy, (member) => {
        const result = calculated(member);
        const limits = limitsOf(member.rules ?? {});
        const zones = Array.from({ length: cells }, (_, i) => ({
          from: i * limits.grid,
          to: (i + 1) * limits.grid,
          spacing: 1,
        }));
        const given = calculated({
          ...member,
          connections: (member.connections ?? []).map((connection) => ({ ...connection, zones })),
        });
        result.interfaces.forEach((one, i) => {
          const cell = given.interfaces[i]?.zones ?? [];
          const flow = (from: number, to: number): number =>
            Math.max(
              ...cell
                .filter((zone) => zone.from >= from - 1e-6 && zone.to <= to + 1e-6)
                .map(({ utilisation }) => utilisation * one.rows * one.capacity),
            );
          const best = byEnumeration(member.length, limits, one.rows, one.capacity, flow);
          expect(one.zones.length).toBe(best?.zones ?? 0);
          if (best !== null) expectClose(amount(one), best.amount, 0, 'fasteners', 1e-9);
        });
      }),
      runs(80),
    );
  });

  it('each combination alone asks for no more than both, and one of them for as much, of every fastener', () => {
    fc.assert(
      fc.property(busy, (member) => {
        const zones = [
          { from: 0, to: member.length / 2, spacing: 73 },
          { from: member.length / 2, to: member.length, spacing: 118 },
        ];
        const given: MemberInput = {
          ...member,
          connections: (member.connections ?? []).map((connection) => ({ ...connection, zones })),
        };
        const both = calculated(given);
        const alone = (member.combinations ?? []).map((combination) =>
          calculated({ ...given, combinations: [combination] }),
        );
        both.interfaces.forEach((one, i) => {
          const scale = Math.max(1e-6, ...(one.fasteners?.forces ?? []).flat());
          one.fasteners?.forces.forEach((row, r) =>
            row.forEach((force, f) => {
              const most = Math.max(
                ...alone.map(({ interfaces }) => interfaces[i]?.fasteners?.forces[r]?.[f] ?? NaN),
              );
              expectClose(force, most, scale, `force ${r} ${f} of ${one.id}`, 1e-9);
            }),
          );
          one.zones.forEach(({ utilisation }, z) => {
            const most = Math.max(
              ...alone.map(({ interfaces }) => interfaces[i]?.zones[z]?.utilisation ?? NaN),
            );
            expectClose(utilisation, most, 1e-6, `zone ${z} of ${one.id}`, 1e-9);
          });
        });
      }),
      runs(50),
    );
  });
});

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
