import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import { amount, calculated, expectClose } from './calculated';
import { bodyOf, flowPerShear, largestShear } from './demand';
import { boundaries, byEnumeration, byRecursion, limitsOf } from './enumeration';
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
} from './members';

const isMultiple = (value: number, of: number): boolean =>
  Math.abs(value / of - Math.round(value / of)) < 1e-9;

const scheduled = anyBeam.chain((beam) =>
  fc
    .record({ section: anySection, loads: fixedLoads(beam), rules: anyRules })
    .map(({ section, loads, rules }) => memberOf(beam, section, loads, rules)),
);

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
        spacingStep: fc.constantFrom(0.25, 1, 5, 10),
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

describe('a long schedule', () => {
  const long = anyBeam.chain((beam) =>
    fc
      .record({
        section: anySection,
        loads: fixedLoads(beam),
        rules: fc.record({
          spacingStep: fc.constantFrom(0.25, 1, 5),
          spacingMin: fc.constant(0.25),
          spacingMax: fc.constantFrom(180, 420),
          maxZones: fc.integer({ min: 2, max: 12 }),
          zoneGrid: fc.constantFrom(60, 75),
          minZoneLength: fc.constantFrom(0, 100, 290),
        }),
      })
      .map(({ section, loads, rules }) => memberOf(beam, section, loads, rules)),
  );

  it('of many cells and up to twelve zones has no better one either', () => {
    fc.assert(
      fc.property(long, (member) => {
        const result = calculated(member);
        const body = bodyOf(member, result);
        for (const one of result.interfaces) {
          const each = flowPerShear(result, one);
          const best = byRecursion(
            member.length,
            limitsOf(member.rules ?? {}),
            one.rows,
            one.capacity,
            (from, to) => each * largestShear(body, member.length, from, to),
          );
          expect(one.zones.length).toBe(best?.zones ?? 0);
          if (best !== null) expectClose(amount(one), best.amount, 0, 'fasteners', 1e-9);
        }
      }),
      runs(60),
    );
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
