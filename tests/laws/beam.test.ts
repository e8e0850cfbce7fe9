import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import type { CalculationResult } from '@shared/schemas/result';
import { calculated, expectClose, evenSteps, largest, stationsAt } from './calculated';
import {
  anyBeam,
  anySection,
  fixedLoads,
  fixedMember,
  memberOf,
  runs,
  stack,
  type LoadInput,
} from './members';
import { breaks, cut, loadsOf, type FreeBody } from './statics';

/** The member's loads with the reactions that the result reports. */
function freeBody(member: MemberInput, result: CalculationResult): FreeBody {
  const body = loadsOf(member.loadCases[0]?.loads ?? []);
  for (const { support, max, momentMax } of result.reactions) {
    const x = member.supports.find(({ id }) => id === support)?.x ?? NaN;
    body.forces.push({ x, up: max, turn: momentMax });
  }
  return body;
}

const forceScale = (body: FreeBody): number =>
  largest(
    [
      ...body.forces.map(({ up }) => up),
      ...body.stretches.map((s) => (largest([s.start, s.end]) * (s.to - s.from)) / 2),
    ],
    1,
  );
const momentScale = (body: FreeBody, length: number): number =>
  largest([...body.forces.map(({ turn }) => turn), forceScale(body) * length]);

describe('a beam under fixed loads', () => {
  it('is in equilibrium: ΣV = 0 and ΣM = 0 of loads and reported reactions', () => {
    fc.assert(
      fc.property(fixedMember, (member) => {
        const body = freeBody(member, calculated(member));
        const beyond = cut(body, member.length, 'right');
        expectClose(beyond.V, 0, forceScale(body), 'ΣV');
        expectClose(beyond.M, 0, momentScale(body, member.length), 'ΣM');
      }),
      runs(150),
    );
  });

  it('reports at every station the V and M of the forces left of it, both sides of every jump', () => {
    fc.assert(
      fc.property(fixedMember, (member) => {
        const result = calculated(member);
        const body = freeBody(member, result);
        const { x, shearMax, shearMin, momentMax, momentMin } = result.envelope;
        const V = forceScale(body);
        const M = momentScale(body, member.length);
        expect(shearMin).toEqual(shearMax);
        expect(momentMin).toEqual(momentMax);
        for (const at of new Set(x)) {
          const left = cut(body, at, 'left');
          const right = cut(body, at, 'right');
          const shears = stationsAt(x, shearMax, at);
          const moments = stationsAt(x, momentMax, at);
          const jumps = Math.abs(left.V - right.V) > 1e-7 * V || Math.abs(left.M - right.M) > 1e-7 * M;
          if (jumps && at > 0 && at < member.length) expect(shears.length).toBe(2);
          if (at > 0) {
            expectClose(shears[0] ?? NaN, left.V, V, `V left of ${at}`);
            expectClose(moments[0] ?? NaN, left.M, M, `M left of ${at}`);
          }
          if (at < member.length) {
            expectClose(shears.at(-1) ?? NaN, right.V, V, `V right of ${at}`);
            expectClose(moments.at(-1) ?? NaN, right.M, M, `M right of ${at}`);
          }
        }
        for (const hinge of member.hinges ?? []) {
          for (const moment of stationsAt(x, momentMax, hinge))
            expectClose(moment, 0, M, `M at the hinge ${hinge}`);
        }
      }),
      runs(150),
    );
  });

  it('has a station at every event and at a hundred even steps or more, in order', () => {
    fc.assert(
      fc.property(fixedMember, (member) => {
        const result = calculated(member);
        const { x } = result.envelope;
        for (const at of [...breaks(freeBody(member, result), member.length), ...evenSteps(member.length)]) {
          expect(stationsAt(x, x, at).length, `a station at ${at}`).toBeGreaterThan(0);
        }
        expect([...x].sort((a, b) => a - b)).toEqual(x);
      }),
      runs(40),
    );
  });

  it('bends as its moments ask: the slope changes by −∫M/EI, supports do not move, springs yield by R/k', () => {
    // Gauss points and weights for four on [−1, 1]: exact to degree 7, M times the hat function has 4
    const gauss: [number, number][] = [
      [-0.8611363115940526, 0.34785484513745385],
      [-0.33998104358485626, 0.6521451548625461],
      [0.33998104358485626, 0.6521451548625461],
      [0.8611363115940526, 0.34785484513745385],
    ];
    fc.assert(
      fc.property(fixedMember, (member) => {
        const result = calculated(member);
        const body = freeBody(member, result);
        const { EI } = result.section;
        const xs = [...new Set(result.envelope.x)];
        const w = xs.map((x) => stationsAt(result.envelope.x, result.envelope.deflectionMax, x)[0] ?? NaN);
        const most = largest(w, 1e-9);
        for (let i = 1; i + 1 < xs.length; i += 1) {
          const [a, b, c] = [xs[i - 1] ?? NaN, xs[i] ?? NaN, xs[i + 1] ?? NaN];
          if ((member.hinges ?? []).some((hinge) => Math.abs(hinge - b) < 1e-6)) continue;
          const integral = [
            [a, b],
            [b, c],
          ].reduce((sum, [from = 0, to = 0]) => {
            const half = (to - from) / 2;
            return gauss.reduce((total, [point, weight]) => {
              const at = from + half * (1 + point);
              const hat = at < b ? (at - a) / (b - a) : (c - at) / (c - b);
              return total + weight * half * hat * cut(body, at, 'right').M;
            }, sum);
          }, 0);
          const [wa, wb, wc] = [w[i - 1] ?? NaN, w[i] ?? NaN, w[i + 1] ?? NaN];
          const shortest = Math.min(b - a, c - b);
          // multiplied by the shorter step, so that what is compared is a deflection
          expectClose(
            ((wc - wb) / (c - b) - (wb - wa) / (b - a)) * shortest,
            (-integral / EI) * shortest,
            most,
            `bend at ${b}`,
            1e-8,
          );
        }
        for (const { id, x, kind, stiffness } of member.supports) {
          const reaction = result.reactions.find(({ support }) => support === id)?.max ?? NaN;
          const yields = kind === 'spring' ? reaction / (stiffness ?? NaN) : 0;
          const here = stationsAt(result.envelope.x, result.envelope.deflectionMax, x)[0] ?? NaN;
          expectClose(here, yields, most, `deflection at ${id}`);
        }
      }),
      runs(60),
    );
  });

  it('names its extremes: no station beats them and they stand on the curves', () => {
    fc.assert(
      fc.property(fixedMember, (member) => {
        const result = calculated(member);
        const body = freeBody(member, result);
        const { shear, moment, deflection } = result.extremes;
        const V = forceScale(body);
        const M = momentScale(body, member.length);
        const sides = (['left', 'right'] as const).map((side) => cut(body, moment.x, side).M);
        const nearest = Math.min(...sides.map((value) => Math.abs(value - moment.value)));
        expectClose(nearest, 0, M, 'M at its x');
        const shears = (['left', 'right'] as const).map((side) => cut(body, shear.x, side).V);
        expectClose(Math.min(...shears.map((value) => Math.abs(value - shear.value))), 0, V, 'V at its x');
        expect(largest(result.envelope.shearMax)).toBeLessThanOrEqual(Math.abs(shear.value) + 1e-8 * V);
        expect(largest(result.envelope.momentMax)).toBeLessThanOrEqual(Math.abs(moment.value) + 1e-8 * M);
        const most = Math.abs(deflection.value);
        expect(largest(result.envelope.deflectionMax)).toBeLessThanOrEqual(most * (1 + 1e-8) + 1e-12);
        // sampled ten times as densely, by the forces themselves
        for (let i = 0; i <= 1000; i += 1) {
          const { V: v, M: m } = cut(body, (member.length * i) / 1000, i < 1000 ? 'right' : 'left');
          expect(Math.abs(m)).toBeLessThanOrEqual(Math.abs(moment.value) + 1e-8 * M);
          expect(Math.abs(v)).toBeLessThanOrEqual(Math.abs(shear.value) + 1e-8 * V);
        }
      }),
      runs(60),
    );
  });
});

describe('superposition', () => {
  const twoCases = anyBeam.chain((beam) =>
    fc.record({
      beam: fc.constant(beam),
      section: anySection,
      first: fixedLoads(beam, 3),
      second: fixedLoads(beam, 3),
      factors: fc.tuple(fc.integer({ min: -20, max: 30 }), fc.integer({ min: -20, max: 30 })),
    }),
  );

  it('a combination is the factored sum of its cases, in V, M, deflection and reactions', () => {
    fc.assert(
      fc.property(twoCases, ({ beam, section, first, second, factors: [f, g] }) => {
        const member: MemberInput = {
          ...memberOf(beam, section, []),
          loadCases: [
            { id: 'A', action: 'permanent', loads: first },
            { id: 'B', action: 'imposed', loads: second },
          ],
        };
        const of = (factors: Record<string, number>) =>
          calculated({ ...member, combinations: [{ id: 'C', factors }] });
        const [a, b, both] = [of({ A: 1 }), of({ B: 1 }), of({ A: f / 10, B: g / 10 })];
        const fields = ['shearMax', 'momentMax', 'deflectionMax'] as const;
        for (const field of fields) {
          const scale = largest([...a.envelope[field], ...b.envelope[field]], 1e-9);
          for (const x of evenSteps(beam.length)) {
            for (const side of [0, -1]) {
              const at = (r: CalculationResult) =>
                stationsAt(r.envelope.x, r.envelope[field], x).at(side) ?? NaN;
              expectClose(at(both), (f / 10) * at(a) + (g / 10) * at(b), scale, `${field} at ${x}`);
            }
          }
        }
        const scale = largest(
          [...a.reactions, ...b.reactions].map(({ max }) => max),
          1e-9,
        );
        both.reactions.forEach(({ max, support }, i) => {
          const sum = (f / 10) * (a.reactions[i]?.max ?? NaN) + (g / 10) * (b.reactions[i]?.max ?? NaN);
          expectClose(max, sum, scale, `reaction ${support}`);
        });
      }),
      runs(60),
    );
  });

  it('the envelope of several combinations is the largest and smallest of each alone, and traces to them', () => {
    fc.assert(
      fc.property(twoCases, ({ beam, section, first, second, factors: [f, g] }) => {
        const combinations = [
          { id: 'C1', factors: { A: 1.35 } },
          { id: 'C2', factors: { A: 0.9, B: f / 10 } },
          { id: 'C3', factors: { A: g / 10, B: 1.5 } },
        ];
        const member: MemberInput = {
          ...memberOf(beam, section, []),
          loadCases: [
            { id: 'A', action: 'permanent', loads: first },
            { id: 'B', action: 'imposed', loads: second },
          ],
        };
        const all = calculated({ ...member, combinations });
        const each = combinations.map((combination) =>
          calculated({ ...member, combinations: [combination] }),
        );
        for (const [most, least] of [
          ['shearMax', 'shearMin'],
          ['momentMax', 'momentMin'],
          ['deflectionMax', 'deflectionMin'],
        ] as const) {
          const scale = largest([...all.envelope[most], ...all.envelope[least]], 1e-9);
          for (const x of evenSteps(beam.length)) {
            const alone = each.map((r) => stationsAt(r.envelope.x, r.envelope[most], x).at(-1) ?? NaN);
            const here = (field: typeof most | typeof least) =>
              stationsAt(all.envelope.x, all.envelope[field], x).at(-1) ?? NaN;
            expectClose(here(most), Math.max(...alone), scale, `${most} at ${x}`);
            expectClose(here(least), Math.min(...alone), scale, `${least} at ${x}`);
          }
        }
        for (const of of ['shear', 'moment', 'deflection'] as const) {
          const { value, combination } = all.extremes[of];
          if (combination === null) {
            expect(each.map(({ extremes }) => extremes[of].value)).toEqual([0, 0, 0]);
            continue;
          }
          const index = combinations.findIndex(({ id }) => id === combination);
          const own = each[index]?.extremes[of].value ?? NaN;
          expectClose(Math.abs(own), Math.abs(value), 1e-9, `${of} of ${combination}`);
          for (const one of each) {
            expect(Math.abs(one.extremes[of].value)).toBeLessThanOrEqual(Math.abs(value) * (1 + 1e-9) + 1e-9);
          }
        }
      }),
      runs(50),
    );
  });
});

describe('scaling', () => {
  const factored = (loads: readonly LoadInput[], k: number): LoadInput[] =>
    loads.map((load): LoadInput => {
      if (load.kind === 'varying') return { ...load, start: load.start * k, end: load.end * k };
      if (load.kind === 'moving') {
        return { ...load, axles: load.axles.map(({ offset, value }) => ({ offset, value: value * k })) };
      }
      return { ...load, value: load.value * k };
    });

  it('loads times k: everything that is force or movement times k, the required spacing over k', () => {
    fc.assert(
      fc.property(fixedMember, fc.integer({ min: 2, max: 90 }), (member, tenths) => {
        const k = tenths / 10;
        const [first] = member.loadCases;
        if (first === undefined) throw new Error('no load case');
        const plain = calculated(member);
        const scaled = calculated({
          ...member,
          loadCases: [{ ...first, loads: factored(first.loads ?? [], k) }],
        });
        for (const field of ['shearMax', 'momentMax', 'deflectionMax'] as const) {
          const scale = largest(plain.envelope[field], 1e-9) * k;
          scaled.envelope[field].forEach((value, i) =>
            expectClose(value, k * (plain.envelope[field][i] ?? NaN), scale, field),
          );
        }
        scaled.interfaces.forEach(({ requiredSpacing, peakFlow }, i) => {
          const other = plain.interfaces[i];
          expectClose(peakFlow.value, k * (other?.peakFlow.value ?? NaN), 1e-6, 'peak flow');
          if (requiredSpacing !== null) {
            expectClose(requiredSpacing, (other?.requiredSpacing ?? NaN) / k, 0, 'required spacing');
          }
        });
      }),
      runs(60),
    );
  });

  it('all lengths times k: M times k, V as it was, flow over k, deflection over k, required spacing times k', () => {
    fc.assert(
      fc.property(
        anyBeam,
        stack,
        fc.integer({ min: 3, max: 40 }),
        fc.integer({ min: 1, max: 9 }),
        (beam, section, tenths, at) => {
          const k = tenths / 10;
          const place = (beam.length * at) / 10 + 7;
          const build = (s: number): MemberInput => ({
            ...memberOf(
              {
                length: beam.length * s,
                hinges: beam.hinges.map((x) => x * s),
                supports: beam.supports.map((support) => ({
                  ...support,
                  x: support.x * s,
                  // N/mm against a beam's EI/L³, which goes with s
                  ...(support.stiffness === undefined ? {} : { stiffness: support.stiffness * s }),
                })),
              },
              {
                ...section,
                pieces: section.pieces.map((piece) => ({
                  ...piece,
                  y: piece.y * s,
                  z: piece.z * s,
                  width: piece.width * s,
                  depth: piece.depth * s,
                })),
              },
              [
                { kind: 'point', x: place * s, value: 3170 },
                { kind: 'varying', from: 0, to: beam.length * s, start: 1.9 / s, end: 0.4 / s },
              ],
              {
                zoneGrid: 100 * s,
                minZoneLength: 0,
                spacingMin: 1e-3,
                spacingStep: 1e-3,
                spacingMax: 1e6,
                maxZones: 1,
              },
            ),
          });
          const [one, other] = [calculated(build(1)), calculated(build(k))];
          const compare = (field: 'shearMax' | 'momentMax' | 'deflectionMax', ratio: number) => {
            const scale = largest(one.envelope[field], 1e-9) * ratio;
            for (const x of evenSteps(beam.length)) {
              const a = stationsAt(one.envelope.x, one.envelope[field], x).at(-1) ?? NaN;
              const b = other.envelope[field].filter(
                (_, i) => Math.abs((other.envelope.x[i] ?? NaN) - x * k) < 1e-5,
              );
              expectClose(b.at(-1) ?? NaN, a * ratio, scale, `${field} at ${x}`, 1e-7);
            }
          };
          compare('shearMax', 1);
          compare('momentMax', k);
          compare('deflectionMax', 1 / k);
          one.interfaces.forEach((a, i) => {
            const b = other.interfaces[i];
            expectClose(b?.peakFlow.value ?? NaN, a.peakFlow.value / k, 1e-9, 'peak flow');
            expectClose(b?.requiredSpacing ?? NaN, (a.requiredSpacing ?? NaN) * k, 0, 'required spacing');
          });
        },
      ),
      runs(50),
    );
  });
});
