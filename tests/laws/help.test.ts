import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import { calculated } from './calculated';
import { determinateBeam, fixedLoads, memberOf, runs, stack } from './members';

/** Members of stacked boards whose fasteners are mostly too weak. */
const weak = determinateBeam.chain((beam) =>
  fc
    .record({ section: stack, loads: fixedLoads(beam, 2), R: fc.integer({ min: 90, max: 900 }) })
    .map(({ section, loads, R }): MemberInput =>
      memberOf(
        beam,
        {
          ...section,
          connections: section.connections.map((one) => ({
            ...one,
            rows: 1,
            capacity: { basis: 'allowable', value: R },
          })),
        },
        loads,
        { spacingMin: 50, maxZones: 2 },
      ),
    ),
);

/** The figure that stands before `instead of` after these words in a notice. */
function told(message: string, before: RegExp): number {
  const found = before.exec(message)?.[1];
  if (found === undefined) throw new Error(`no figure in: ${message}`);
  return Number(found.replace(/[\s\u202f]/g, ''));
}

describe('where no schedule is possible, what is said to help', () => {
  it('helps: so many rows, or so much capacity, give a schedule; one row fewer does not', () => {
    let tried = 0;
    fc.assert(
      fc.property(weak, (member) => {
        const result = calculated(member);
        result.interfaces.forEach((one, i) => {
          if (one.zones.length > 0) return;
          const notice = result.notices.find(
            ({ code, interface: id }) => code === 'no-schedule' && id === one.id,
          );
          const message = notice?.message ?? '';
          const rows = told(message, /(\d+) rows instead of/);
          const value = told(message, /a capacity of ([\d.\s]+) instead of/);
          const zonesWith = (change: {
            rows?: number;
            capacity?: { basis: 'allowable'; value: number };
          }): number => {
            const connections = (member.connections ?? []).map((connection, c) =>
              c === i ? { ...connection, ...change } : connection,
            );
            return calculated({ ...member, connections }).interfaces[i]?.zones.length ?? NaN;
          };
          // more rows than can be entered are told all the same: that says how far off it is
          if (rows <= 100) expect(zonesWith({ rows }), `${rows} rows`).toBeGreaterThan(0);
          if (rows <= 101) expect(zonesWith({ rows: rows - 1 }), `${rows - 1} rows`).toBe(0);
          expect(
            zonesWith({ capacity: { basis: 'allowable', value } }),
            `capacity ${value}: ${message}`,
          ).toBeGreaterThan(0);
          expect(zonesWith({ capacity: { basis: 'allowable', value: value * 0.99 } })).toBe(0);
          tried += 1;
        });
      }),
      runs(80),
    );
    expect(tried).toBeGreaterThan(30);
  });
});
