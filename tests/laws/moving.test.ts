import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import type { CalculationResult } from '@shared/schemas/result';
import { calculated, evenSteps, expectClose, largest, stationsAt } from './calculated';
import {
  anyBeam,
  anySection,
  determinateBeam,
  fixedLoads,
  memberOf,
  runs,
  train,
  type Beam,
  type LoadInput,
  type Section,
} from './members';

type Train = Extract<LoadInput, { kind: 'moving' }>;

/** The train as loads that stand still, offset 0 at x; axles off the beam carry nothing. */
const standing = (beam: Pick<Beam, 'length'>, { axles }: Train, x: number): LoadInput[] =>
  axles
    .map(({ offset, value }): LoadInput & { kind: 'point' } => ({ kind: 'point', x: x + offset, value }))
    .filter((load) => load.x >= 0 && load.x <= beam.length);

const crossing = (beams: fc.Arbitrary<Beam>) =>
  beams.chain((beam) =>
    fc.record({
      beam: fc.constant(beam),
      section: anySection,
      dead: fixedLoads(beam, 2),
      moving: train(beam),
      places: fc.array(
        fc.integer({ min: 0, max: 997 }).map((n) => n / 997),
        { minLength: 6, maxLength: 6 },
      ),
    }),
  );

const member = (base: MemberInput, loads: LoadInput[]): MemberInput => ({
  ...base,
  loadCases: [{ id: 'Q', action: 'imposed', loads }],
});

/** mm; the value beside a load that stands at a station: 1e-6 of a span off, and far above what counts as touching */
const HAIR = 1e-3;

const fields = [
  ['shearMax', 'shearMin'],
  ['momentMax', 'momentMin'],
  ['deflectionMax', 'deflectionMin'],
] as const;

/** No value of the standing load is outside the moving load's envelope, beyond `rel` of the largest in it. */
function expectWithin(
  moving: CalculationResult,
  fixed: CalculationResult,
  length: number,
  rel: number,
): void {
  for (const [most, least] of fields) {
    const scale = largest([...moving.envelope[most], ...moving.envelope[least]], 1e-9);
    for (const x of evenSteps(length)) {
      const here = (r: CalculationResult, field: typeof most | typeof least) =>
        stationsAt(r.envelope.x, r.envelope[field], x);
      const upper = Math.max(...here(moving, most));
      const lower = Math.min(...here(moving, least));
      for (const value of here(fixed, most)) {
        expect(value, `${most} at ${x}`).toBeLessThanOrEqual(upper + rel * scale);
        expect(value, `${least} at ${x}`).toBeGreaterThanOrEqual(lower - rel * scale);
      }
    }
  }
  const scale = largest(
    moving.reactions.flatMap(({ max, min }) => [max, min]),
    1e-9,
  );
  moving.reactions.forEach(({ max, min, momentMax, momentMin }, i) => {
    const one = fixed.reactions[i];
    expect(one?.max).toBeLessThanOrEqual(max + rel * scale);
    expect(one?.min).toBeGreaterThanOrEqual(min - rel * scale);
    expect(one?.momentMax).toBeLessThanOrEqual(momentMax + rel * scale * length);
    expect(one?.momentMin).toBeGreaterThanOrEqual(momentMin - rel * scale * length);
  });
  for (const of of ['shear', 'moment', 'deflection'] as const) {
    const most = Math.abs(moving.extremes[of].value);
    expect(Math.abs(fixed.extremes[of].value), of).toBeLessThanOrEqual(most * (1 + rel) + 1e-9);
  }
  fixed.interfaces.forEach(({ peakFlow }, i) => {
    const most = moving.interfaces[i]?.peakFlow.value ?? NaN;
    expect(peakFlow.value).toBeLessThanOrEqual(most * (1 + rel) + 1e-9);
  });
}

/** Positions worth trying: at random, and with each axle on each side of each support, on the ends, at midspan. */
function positionsOf(beam: Beam, { axles, from, to }: Train, places: readonly number[]): number[] {
  const telling = [0, beam.length / 2, beam.length, ...beam.supports.map(({ x }) => x)];
  const aimed = telling.flatMap((x) => axles.map(({ offset }) => x - offset));
  return [...places.map((place) => from + place * (to - from)), ...aimed].filter((x) => x >= from && x <= to);
}

describe.each([
  ['on a determinate beam, exactly', determinateBeam, 1e-9, 40],
  ['on any beam, to 1e-4', anyBeam, 1e-4, 40],
] as const)('a moving load %s', (_, beams, rel, count) => {
  it('has an envelope that no standing position passes', () => {
    fc.assert(
      fc.property(crossing(beams), ({ beam, section, dead, moving, places }) => {
        const base = memberOf(beam, section, []);
        const envelope = calculated(member(base, [...dead, moving]));
        for (const x of positionsOf(beam, moving, places)) {
          expectWithin(
            envelope,
            calculated(member(base, [...dead, ...standing(beam, moving, x)])),
            beam.length,
            rel,
          );
        }
      }),
      runs(count),
    );
  });

  it('reaches its extremes: standing where the result says, it gives them', () => {
    fc.assert(
      fc.property(crossing(beams), ({ beam, section, dead, moving }) => {
        const base = memberOf(beam, section, []);
        const envelope = calculated(member(base, [...dead, moving]));
        const index = dead.length;
        const spots = [
          ['shear', envelope.extremes.shear] as const,
          ['moment', envelope.extremes.moment] as const,
          ['deflection', envelope.extremes.deflection] as const,
        ];
        for (const [of, { value, x, positions }] of spots) {
          // a train that never comes on the beam leaves nothing to trace
          if (value === 0) continue;
          expect(positions.map(({ load, loadCase }) => `${loadCase} ${load}`)).toEqual([`Q ${index}`]);
          const at = positions[0]?.x ?? NaN;
          expect(at).toBeGreaterThanOrEqual(moving.from - 1e-9);
          expect(at).toBeLessThanOrEqual(moving.to + 1e-9);
          // the side of a load that stands exactly at x is either: a hair to each side gives both
          const tries = [0, HAIR, -HAIR].map((d) =>
            calculated(
              member(base, [
                ...dead,
                ...standing(beam, moving, Math.min(moving.to, Math.max(moving.from, at + d))),
              ]),
            ),
          );
          const values = tries.flatMap(({ envelope: e, extremes }) => [
            extremes[of].value,
            ...stationsAt(
              e.x,
              of === 'shear' ? e.shearMax : of === 'moment' ? e.momentMax : e.deflectionMax,
              x,
            ),
          ]);
          const off = Math.min(...values.map((one) => Math.abs(one - value)));
          expectClose(
            off,
            0,
            Math.max(Math.abs(value), 1e-6),
            `${of} ${value} at ${x} with the load at ${at}`,
            1e-5,
          );
        }
        for (const one of envelope.interfaces) {
          const at = one.peakFlow.positions[0]?.x ?? NaN;
          if (one.peakFlow.value < 1e-9) continue;
          const values = [0, HAIR, -HAIR].map(
            (d) =>
              calculated(
                member(base, [
                  ...dead,
                  ...standing(beam, moving, Math.min(moving.to, Math.max(moving.from, at + d))),
                ]),
              ).interfaces.find(({ id }) => id === one.id)?.peakFlow.value ?? NaN,
          );
          const off = Math.min(...values.map((value) => Math.abs(value - one.peakFlow.value)));
          expectClose(off, 0, one.peakFlow.value, `peak flow of ${one.id} with the load at ${at}`, 1e-5);
        }
      }),
      runs(30),
    );
  });

  it('has a schedule that carries every standing position', () => {
    fc.assert(
      fc.property(crossing(beams), ({ beam, section, dead, moving, places }) => {
        const base: MemberInput = { ...memberOf(beam, section, []), rules: { spacingMin: 5, maxZones: 4 } };
        const envelope = calculated(member(base, [...dead, moving]));
        for (const x of positionsOf(beam, moving, places)) {
          const zones = new Map(envelope.interfaces.map((one) => [one.pieces.join('|'), one.zones]));
          const fixed = calculated({
            ...member(base, [...dead, ...standing(beam, moving, x)]),
            connections: (base.connections ?? []).map((connection) => {
              const found = zones.get(connection.pieces.join('|')) ?? [];
              return found.length === 0
                ? connection
                : { ...connection, zones: found.map(({ from, to, spacing }) => ({ from, to, spacing })) };
            }),
          });
          fixed.interfaces.forEach((one, i) => {
            const other = envelope.interfaces[i];
            if (!one.pinned || other === undefined) return;
            expect(one.utilisation).toBeLessThanOrEqual(1 + rel);
            one.zones.forEach((zone, z) =>
              expect(zone.utilisation).toBeLessThanOrEqual(
                (other.zones[z]?.utilisation ?? NaN) * (1 + rel) + 1e-9,
              ),
            );
            const forces = other.fasteners?.forces ?? [];
            one.fasteners?.forces.forEach((row, r) =>
              row.forEach((force, f) =>
                expect(force).toBeLessThanOrEqual(
                  (forces[r]?.[f] ?? NaN) * (1 + rel) + rel * one.capacity + 1e-9,
                ),
              ),
            );
          });
        }
      }),
      runs(25),
    );
  });
});

describe('an envelope of a moving load', () => {
  it('is close to the densest of many standing positions: it is not merely above them', () => {
    fc.assert(
      fc.property(crossing(determinateBeam), ({ beam, section, moving }) => {
        const base = memberOf(beam, section, []);
        const envelope = calculated(member(base, [moving]));
        const tries = Array.from(
          { length: 161 },
          (_, i) => moving.from + ((moving.to - moving.from) * i) / 160,
        ).map((x) =>
          calculated(member(base, [...standing(beam, moving, x), { kind: 'point', x: 0, value: 0 }])),
        );
        const most = Math.max(...tries.map(({ extremes }) => Math.abs(extremes.moment.value)));
        const step = (moving.to - moving.from) / 160;
        const axles = moving.axles.reduce((sum, { value }) => sum + value, 0);
        // an axle's moment changes by its load times the step at most
        expect(Math.abs(envelope.extremes.moment.value)).toBeLessThanOrEqual(most + axles * step);
        for (const x of evenSteps(beam.length)) {
          const dense = Math.max(
            ...tries.map(({ envelope: e }) => Math.max(...stationsAt(e.x, e.momentMax, x))),
          );
          const here = Math.max(...stationsAt(envelope.envelope.x, envelope.envelope.momentMax, x));
          expect(here).toBeLessThanOrEqual(dense + axles * step);
        }
      }),
      runs(8),
    );
  });

  it('of one train and its double: twice the axle loads, twice the envelope', () => {
    fc.assert(
      fc.property(crossing(anyBeam), ({ beam, section, moving }) => {
        const base = memberOf(beam, section, []);
        const one = calculated(member(base, [moving]));
        const axles = moving.axles.map(({ offset, value }) => ({ offset, value: 2 * value }));
        const two = calculated(member(base, [{ ...moving, axles }]));
        for (const [most, least] of fields) {
          for (const field of [most, least]) {
            const scale = largest(two.envelope[field], 1e-9);
            two.envelope[field].forEach((value, i) =>
              expectClose(value, 2 * (one.envelope[field][i] ?? NaN), scale, field),
            );
          }
        }
      }),
      runs(30),
    );
  });

  it('jumps where one axle stands on the beam’s end and another within: past the end it carries nothing', () => {
    const axles = [
      { offset: 0, value: 300 },
      { offset: -60, value: 420 },
    ];
    const beam: Beam = {
      length: 1200,
      supports: [
        { id: 'A', x: 0, kind: 'pin' },
        { id: 'B', x: 800, kind: 'roller' },
      ],
      hinges: [],
    };
    const section: Section = {
      materials: [{ id: 'w', name: '', E: 9000 }],
      pieces: [
        { id: 'a', material: 'w', y: 0, z: 0, width: 90, depth: 40 },
        { id: 'b', material: 'w', y: 0, z: 40, width: 90, depth: 40 },
      ],
      connections: [
        {
          pieces: ['a', 'b'],
          kind: 'fasteners',
          capacity: { basis: 'allowable', value: 900 },
        },
      ],
    };
    const { envelope } = calculated(
      memberOf(beam, section, [{ kind: 'moving', from: -700, to: 1900, axles }]),
    );
    // just left of 1140 both axles may stand to the right of it; right of 1140 only one of them, the heavier at most
    expect(stationsAt(envelope.x, envelope.shearMax, 1140)).toEqual(
      [720, 420].map((force): unknown => expect.closeTo(force, 6)),
    );
  });
});
