import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import { calculated, expectClose, largest } from './calculated';
import { anyBeam, anySection, fixedLoads, memberOf, runs, train } from './members';

/** A member of three combinations, one of which moves a train. */
const members = anyBeam.chain((beam) =>
  fc
    .record({
      section: anySection,
      dead: fixedLoads(beam, 2),
      snow: fixedLoads(beam, 2),
      moving: train(beam),
      factors: fc.tuple(fc.integer({ min: 5, max: 15 }), fc.integer({ min: -15, max: 15 })),
    })
    .map(({ section, dead, snow, moving, factors: [f, g] }): MemberInput => ({
      ...memberOf(beam, section, []),
      loadCases: [
        { id: 'G', action: 'permanent', loads: dead },
        { id: 'S', action: 'snow', loads: snow },
        { id: 'W', action: 'construction', loads: [moving] },
      ],
      combinations: [
        { id: 'C1', factors: { G: f / 10 } },
        { id: 'C2', factors: { G: 1, S: g / 10 } },
        { id: 'C3', factors: { G: 1, W: 0.4 } },
      ],
    })),
);

describe('what is said to govern', () => {
  it('is the combination with the largest value, at every station and for every extreme', () => {
    fc.assert(
      fc.property(members, (member) => {
        const all = calculated(member);
        const alone = (member.combinations ?? []).map((combination) =>
          calculated({ ...member, combinations: [combination] }),
        );
        expect(all.combinations.map(({ id, moving }) => [id, moving])).toEqual([
          ['C1', false],
          ['C2', false],
          ['C3', true],
        ]);
        for (const [of, most, least] of [
          ['shear', 'shearMax', 'shearMin'],
          ['moment', 'momentMax', 'momentMin'],
          ['deflection', 'deflectionMax', 'deflectionMin'],
        ] as const) {
          const scale = largest([...all.envelope[most], ...all.envelope[least]], 1e-6);
          all.envelope.governing[of].forEach((index, i) => {
            const magnitude = Math.max(
              Math.abs(all.envelope[most][i] ?? NaN),
              Math.abs(all.envelope[least][i] ?? NaN),
            );
            if (index < 0) {
              expectClose(magnitude, 0, scale, `${of} at station ${i}, nothing governs`);
              return;
            }
            const r = alone[index];
            const x = all.envelope.x[i] ?? NaN;
            // a combination alone may have fewer stations: read it where it has this one, on either side
            const own = (r?.envelope.x ?? []).flatMap((at, s) =>
              Math.abs(at - x) < 1e-6 ? [r?.envelope[most][s] ?? NaN, r?.envelope[least][s] ?? NaN] : [],
            );
            if (own.length === 0) return;
            const off = Math.min(...own.map((value) => Math.abs(Math.abs(value) - magnitude)));
            expectClose(
              off,
              0,
              scale,
              `${of} at ${x}: ${magnitude} by ${member.combinations?.[index]?.id ?? ''}`,
              1e-6,
            );
          });
          const { value, combination } = all.extremes[of];
          const named = alone[(member.combinations ?? []).findIndex(({ id }) => id === combination)];
          expectClose(
            Math.abs(named?.extremes[of].value ?? NaN),
            Math.abs(value),
            scale,
            `${of} of ${String(combination)}`,
          );
          for (const one of alone) {
            expect(Math.abs(one.extremes[of].value)).toBeLessThanOrEqual(Math.abs(value) + 1e-8 * scale);
          }
        }
        all.interfaces.forEach((one, j) => {
          const peaks = alone.map(({ interfaces }) => interfaces[j]?.peakFlow.value ?? NaN);
          expectClose(one.peakFlow.value, Math.max(...peaks), 1e-9, `peak flow of ${one.id}`);
          if (one.peakFlow.combination !== null) {
            const index = (member.combinations ?? []).findIndex(({ id }) => id === one.peakFlow.combination);
            expectClose(
              peaks[index] ?? NaN,
              one.peakFlow.value,
              1e-9,
              `${one.peakFlow.combination} at ${one.id}`,
            );
          }
        });
      }),
      runs(50),
    );
  });

  it('the flow needed at every station is q/V times the larger shear there, and its peak the peak', () => {
    fc.assert(
      fc.property(members, (member) => {
        const { envelope, interfaces, section } = calculated(member);
        for (const one of interfaces) {
          const each = section.interfaces.find(({ id }) => id === one.id)?.flowPerShear ?? NaN;
          expect(one.needed).toHaveLength(envelope.x.length);
          expect(one.governing).toHaveLength(envelope.x.length);
          one.needed.forEach((flow, i) => {
            const V = Math.max(Math.abs(envelope.shearMax[i] ?? NaN), Math.abs(envelope.shearMin[i] ?? NaN));
            expectClose(
              flow,
              each * V,
              Math.max(1e-9, one.peakFlow.value),
              `flow at ${envelope.x[i] ?? NaN}`,
              1e-8,
            );
          });
          expect(Math.max(...one.needed)).toBeLessThanOrEqual(one.peakFlow.value * (1 + 1e-8) + 1e-12);
        }
      }),
      runs(50),
    );
  });
});
