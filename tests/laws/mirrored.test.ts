import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import { amount, calculated, evenSteps, expectClose, largest, stationsAt } from './calculated';
import { anyBeam, anySection, fixedLoads, memberOf, runs, train, type LoadInput } from './members';

/** The load as seen from the other side of the beam. */
function turnedLoad(load: LoadInput, length: number): LoadInput {
  switch (load.kind) {
    case 'uniform':
      return { ...load, from: length - load.to, to: length - load.from };
    case 'varying':
      return { ...load, from: length - load.to, to: length - load.from, start: load.end, end: load.start };
    case 'point':
      return { ...load, x: length - load.x };
    case 'couple':
      return { ...load, x: length - load.x, value: -load.value };
    case 'moving':
      return {
        ...load,
        from: length - load.to,
        to: length - load.from,
        axles: load.axles.map(({ offset, value }) => ({ offset: -offset, value })),
      };
  }
}

function turned(member: MemberInput): MemberInput {
  const { length } = member;
  return {
    ...member,
    supports: member.supports.map((support) => ({ ...support, x: length - support.x })),
    hinges: (member.hinges ?? []).map((x) => length - x),
    connections: (member.connections ?? []).map((connection) =>
      connection.zones === undefined
        ? connection
        : {
            ...connection,
            zones: connection.zones.map(({ from, to, spacing }) => ({
              from: length - to,
              to: length - from,
              spacing,
            })),
          },
    ),
    loadCases: member.loadCases.map((one) => ({
      ...one,
      loads: (one.loads ?? []).map((load) => turnedLoad(load, length)),
    })),
  };
}

const members = anyBeam.chain((beam) =>
  fc
    .record({
      section: anySection,
      loads: fixedLoads(beam, 3),
      moving: fc.option(train(beam), { nil: null }),
      mirror: fc.boolean(),
      cut: fc.integer({ min: 2, max: 8 }),
    })
    .map(({ section, loads, moving, mirror, cut }) => ({
      member: memberOf(beam, section, moving === null ? loads : [...loads, moving], {
        spacingMin: 5,
        mirror,
        maxZones: 4,
        zoneGrid: 100,
        minZoneLength: 200,
      }),
      at: (beam.length * cut) / 10,
      rel: moving === null ? 1e-8 : 1e-4,
    })),
);

describe('the same beam seen from the other side', () => {
  it('has its curves turned round: V with its sign changed, M and deflection as they were', () => {
    fc.assert(
      fc.property(members, ({ member, rel }) => {
        const { length } = member;
        const here = calculated(member);
        const there = calculated(turned(member));
        // N, N·mm and mm below which a value is nothing: loads are of newtons at least, spans of metres
        const pairs = [
          ['shearMax', 'shearMin', -1, 1e-3],
          ['shearMin', 'shearMax', -1, 1e-3],
          ['momentMax', 'momentMax', 1, 1],
          ['momentMin', 'momentMin', 1, 1],
          ['deflectionMax', 'deflectionMax', 1, 1e-6],
          ['deflectionMin', 'deflectionMin', 1, 1e-6],
        ] as const;
        for (const [field, other, sign, least] of pairs) {
          const scale = largest([...here.envelope[field], ...here.envelope[other]], least);
          for (const x of evenSteps(length)) {
            const a = stationsAt(here.envelope.x, here.envelope[field], x);
            const b = stationsAt(there.envelope.x, there.envelope[other], length - x).reverse();
            if (x === 0 || x === length) continue;
            expect(b.length, `stations at ${x}`).toBe(a.length);
            a.forEach((value, i) => expectClose(sign * (b[i] ?? NaN), value, scale, `${field} at ${x}`, rel));
          }
        }
        const scale = largest(
          here.reactions.flatMap(({ max, min }) => [max, min]),
          1e-9,
        );
        here.reactions.forEach(({ support, max, min, momentMax, momentMin }) => {
          const other = there.reactions.find((one) => one.support === support);
          expectClose(other?.max ?? NaN, max, scale, `reaction ${support}`, rel);
          expectClose(other?.min ?? NaN, min, scale, `reaction ${support}`, rel);
          expectClose(-(other?.momentMin ?? NaN), momentMax, scale * length, `moment at ${support}`, rel);
          expectClose(-(other?.momentMax ?? NaN), momentMin, scale * length, `moment at ${support}`, rel);
        });
      }),
      runs(60),
    );
  });

  it('needs as many fasteners, in as many zones, at the same required spacing', () => {
    fc.assert(
      fc.property(members, ({ member, rel }) => {
        const here = calculated(member);
        const there = calculated(turned(member));
        there.interfaces.forEach((one, i) => {
          const other = here.interfaces[i];
          if (other === undefined) throw new Error('an interface is missing');
          expectClose(one.requiredSpacing ?? 0, other.requiredSpacing ?? 0, 0, 'required spacing', rel);
          // with moving loads a spacing on the very edge of a step may fall to either side
          if (rel > 1e-6) return;
          expectClose(amount(one), amount(other), 0, 'fasteners', 1e-9);
          expect(one.zones.length).toBe(other.zones.length);
          expect(one.status === 'over').toBe(other.status === 'over');
        });
      }),
      runs(60),
    );
  });

  it('has every fastener’s force turned round, zones given', () => {
    fc.assert(
      fc.property(members, ({ member, at, rel }) => {
        const given: MemberInput = {
          ...member,
          connections: (member.connections ?? []).map((connection) => ({
            ...connection,
            zones: [
              { from: 0, to: at, spacing: 87 },
              { from: at, to: member.length, spacing: 133 },
            ],
          })),
        };
        const here = calculated(given);
        const there = calculated(turned(given));
        there.interfaces.forEach((one, i) => {
          const other = here.interfaces[i];
          const scale = largest((other?.fasteners?.forces ?? []).flat(), 1e-6);
          one.fasteners?.forces.forEach((row, r) => {
            const back = [...(other?.fasteners?.forces[r] ?? [])].reverse();
            expect(row.length).toBe(back.length);
            row.forEach((force, f) => expectClose(force, back[f] ?? NaN, scale, `force ${f}`, rel));
          });
          expect(one.zones.length).toBe(2);
          expectClose(
            one.zones[0]?.utilisation ?? NaN,
            other?.zones[1]?.utilisation ?? NaN,
            1e-9,
            'utilisation',
            rel,
          );
        });
      }),
      runs(60),
    );
  });
});
