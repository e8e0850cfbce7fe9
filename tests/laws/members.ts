import fc from 'fast-check';
import type { MemberInput } from '@shared/schemas/member';

/**
 * Every law runs from one seed, so that a failure can be run again. LAWS_SEED and LAWS_TIMES in the environment
 * ask for another seed, or for so many times the runs: for a night's search.
 */
export const runs = (numRuns: number): fc.Parameters<unknown> => ({
  seed: Number(process.env['LAWS_SEED'] ?? 20_260_417),
  numRuns: numRuns * Number(process.env['LAWS_TIMES'] ?? 1),
  // a failure is told as it was found: making it smaller can take longer than anybody waits
  endOnFailure: true,
});

export type Beam = Pick<MemberInput, 'length' | 'supports'> & { hinges: number[] };
export type Section = Pick<MemberInput, 'materials' | 'pieces'> & {
  connections: NonNullable<MemberInput['connections']>;
};
export type LoadInput = NonNullable<MemberInput['loadCases'][number]['loads']>[number];

const pick = <T>(...options: T[]): fc.Arbitrary<T> => fc.constantFrom(...options);
const whole = (min: number, max: number): fc.Arbitrary<number> => fc.integer({ min, max });
/** Numbers with a few decimals: uneven, but written the way people write them. */
const decimal = (min: number, max: number, places: number): fc.Arbitrary<number> =>
  whole(Math.round(min * 10 ** places), Math.round(max * 10 ** places)).map((n) => n / 10 ** places);

/** Beams whose reactions follow from statics alone: simple, with one or two overhangs. */
export const determinateBeam: fc.Arbitrary<Beam> = fc
  .record({ cells: whole(12, 60), left: pick(0, 0, 1, 3), right: pick(0, 0, 2, 4) })
  .map(({ cells, left, right }) => ({
    length: cells * 100,
    supports: [
      { id: 'A', x: left * 100, kind: 'pin' },
      { id: 'B', x: (cells - right) * 100, kind: 'roller' },
    ],
    hinges: [],
  }));

/** Beams of every kind: clamped, propped, continuous, hinged, on springs. */
export const anyBeam: fc.Arbitrary<Beam> = fc.oneof(
  determinateBeam,
  whole(10, 40).map((cells): Beam => ({
    length: cells * 100,
    supports: [{ id: 'A', x: 0, kind: 'fixed' }],
    hinges: [],
  })),
  whole(10, 40).map((cells): Beam => ({
    length: cells * 100,
    supports: [{ id: 'A', x: cells * 100, kind: 'fixed' }],
    hinges: [],
  })),
  fc.record({ cells: whole(15, 60), kind: pick('roller', 'fixed') }).map(({ cells, kind }): Beam => ({
    length: cells * 100,
    supports: [
      { id: 'A', x: 0, kind: 'fixed' },
      { id: 'B', x: cells * 100, kind: kind === 'fixed' ? 'fixed' : 'roller' },
    ],
    hinges: [],
  })),
  fc
    .record({ spans: fc.array(whole(11, 37), { minLength: 2, maxLength: 5 }), overhang: whole(0, 6) })
    .map(({ spans, overhang }): Beam => {
      const places = spans.reduce<number[]>((xs, span) => [...xs, (xs.at(-1) ?? 0) + span * 100], [0]);
      return {
        length: (places.at(-1) ?? 0) + overhang * 100,
        supports: places.map((x, i) => ({ id: `S${i}`, x, kind: i === 0 ? 'pin' : 'roller' })),
        hinges: [],
      };
    }),
  fc
    .record({ first: whole(15, 35), second: whole(15, 35), stiffness: whole(80, 5000) })
    .map(({ first, second, stiffness }): Beam => ({
      length: (first + second) * 100,
      supports: [
        { id: 'A', x: 0, kind: 'pin' },
        { id: 'B', x: first * 100, kind: 'spring', stiffness },
        { id: 'C', x: (first + second) * 100, kind: 'roller' },
      ],
      hinges: [],
    })),
  fc
    .record({ first: whole(18, 35), arm: whole(3, 9), hung: whole(12, 30), stiffness: whole(200, 9000) })
    .map(({ first, arm, hung, stiffness }): Beam => ({
      length: (first + arm + hung) * 100,
      supports: [
        { id: 'A', x: 0, kind: 'pin' },
        { id: 'B', x: first * 100, kind: 'roller' },
        { id: 'C', x: (first + arm + hung) * 100, kind: 'spring', stiffness },
      ],
      hinges: [(first + arm) * 100],
    })),
);

const fasteners = (
  R: number,
  rows: number,
): Pick<Section['connections'][number], 'kind' | 'rows' | 'capacity'> => ({
  kind: 'fasteners',
  rows,
  capacity: { basis: 'allowable', value: R },
});

/** Boards of unlike sizes and woods one on another, centred. */
export const stack: fc.Arbitrary<Section> = fc
  .record({
    layers: fc.array(fc.record({ b: whole(40, 260), d: whole(19, 120), E: whole(6000, 14000) }), {
      minLength: 2,
      maxLength: 4,
    }),
    R: whole(400, 9000),
    rows: whole(1, 4),
  })
  .map(({ layers, R, rows }) => ({
    materials: layers.map(({ E }, i) => ({ id: `m${i}`, name: '', E, density: 380 + 37 * i })),
    pieces: layers.map(({ b, d }, i) => ({
      id: `p${i}`,
      material: `m${i}`,
      y: -b / 2,
      z: layers.slice(0, i).reduce((sum, layer) => sum + layer.d, 0),
      width: b,
      depth: d,
    })),
    connections: layers.slice(1).map((_, i) => ({ pieces: [`p${i}`, `p${i + 1}`], ...fasteners(R, rows) })),
  }));

/** A box of two flanges between two webs: its four joints close a loop. */
export const box: fc.Arbitrary<Section> = fc
  .record({
    b: whole(60, 140),
    d: whole(30, 70),
    web: whole(9, 25),
    clear: whole(90, 400),
    E: whole(7000, 14000),
    webE: whole(3000, 9000),
    R: whole(200, 3000),
    rows: fc.tuple(whole(1, 3), whole(1, 3), whole(1, 3), whole(1, 3)),
    k: fc.option(fc.tuple(whole(300, 4000), whole(300, 4000), whole(300, 4000), whole(300, 4000)), {
      nil: null,
    }),
  })
  .map(({ b, d, web, clear, E, webE, R, rows, k }) => {
    const joints: [string, string][] = [
      ['bottom', 'left'],
      ['bottom', 'right'],
      ['top', 'left'],
      ['top', 'right'],
    ];
    return {
      materials: [
        { id: 'solid', name: '', E, density: 420 },
        { id: 'panel', name: '', kind: 'plywood', E: webE, density: 500 },
      ],
      pieces: [
        { id: 'bottom', material: 'solid', y: 0, z: 0, width: b, depth: d },
        { id: 'top', material: 'solid', y: 0, z: d + clear, width: b, depth: d },
        { id: 'left', material: 'panel', y: -web, z: 0, width: web, depth: clear + 2 * d },
        { id: 'right', material: 'panel', y: b, z: 0, width: web, depth: clear + 2 * d },
      ],
      connections: joints.map((pieces, i) => ({
        pieces,
        ...fasteners(R, rows[i] ?? 1),
        ...(k === null ? {} : { slipModulus: k[i] ?? 1 }),
      })),
    };
  });

/** A joist with a ledger low on its side: one vertical interface that carries flow along the beam. */
export const ledger: fc.Arbitrary<Section> = fc
  .record({
    depth: whole(140, 300),
    low: whole(38, 120),
    b: whole(30, 60),
    c: whole(20, 60),
    E: whole(7000, 14000),
    R: whole(300, 4000),
    rows: whole(1, 3),
  })
  .map(({ depth, low, b, c, E, R, rows }) => ({
    materials: [
      { id: 'j', name: '', E, density: 430 },
      { id: 'l', name: '', E: E * 0.8, density: 510 },
    ],
    pieces: [
      { id: 'joist', material: 'j', y: 0, z: 0, width: b, depth },
      { id: 'ledger', material: 'l', y: b, z: 0, width: c, depth: low },
    ],
    connections: [{ pieces: ['joist', 'ledger'], ...fasteners(R, rows) }],
  }));

/** Planks in two layers with broken joints: a chain, with touching edges that nothing connects. */
export const brokenJoints: fc.Arbitrary<Section> = fc
  .record({ b: whole(80, 240), cut: whole(20, 60), d: whole(25, 60), e: whole(25, 60), R: whole(300, 3000) })
  .map(({ b, cut, d, e, R }) => ({
    materials: [{ id: 'w', name: '', E: 9900, density: 470 }],
    pieces: [
      { id: 'B1', material: 'w', y: 0, z: 0, width: b, depth: d },
      { id: 'B2', material: 'w', y: b, z: 0, width: b, depth: d },
      { id: 'T1', material: 'w', y: 0, z: d, width: cut, depth: e },
      { id: 'T2', material: 'w', y: cut, z: d, width: 2 * b - 2 * cut, depth: e },
      { id: 'T3', material: 'w', y: 2 * b - cut, z: d, width: cut, depth: e },
    ],
    connections: [
      { pieces: ['B1', 'T1'], ...fasteners(R, 1) },
      { pieces: ['B1', 'T2'], ...fasteners(R, 2) },
      { pieces: ['B2', 'T2'], ...fasteners(R, 2) },
      { pieces: ['B2', 'T3'], ...fasteners(R, 1) },
    ],
  }));

export const anySection: fc.Arbitrary<Section> = fc.oneof(stack, box, ledger, brokenJoints);

/** Loads that stand still, on a beam of this length, off the hinges. */
export function fixedLoads(beam: Beam, most = 4): fc.Arbitrary<LoadInput[]> {
  const x = whole(0, Math.round(beam.length / 10)).map((n) => n * 10);
  const offHinge = x.map((at) => (beam.hinges.includes(at) ? at + 10 : at));
  const stretch = fc
    .tuple(x, x)
    .filter(([a, b]) => a !== b)
    .map(([a, b]) => ({ from: Math.min(a, b), to: Math.max(a, b) }));
  const load = fc.oneof(
    fc
      .record({ span: stretch, value: decimal(-3, 9, 2) })
      .map(({ span, value }): LoadInput => ({ kind: 'uniform', ...span, value })),
    fc
      .record({ span: stretch, start: decimal(-2, 7, 2), end: decimal(-2, 7, 2) })
      .map(({ span, start, end }): LoadInput => ({ kind: 'varying', ...span, start, end })),
    fc.record({ x, value: decimal(-2000, 9000, 1) }).map((at): LoadInput => ({ kind: 'point', ...at })),
    fc
      .record({ x: offHinge, value: whole(-900_000, 900_000) })
      .map((at): LoadInput => ({ kind: 'couple', ...at })),
  );
  return fc.array(load, { minLength: 1, maxLength: most });
}

/** A train of one to four axles that comes on and goes off the beam. */
export function train(beam: Beam): fc.Arbitrary<Extract<LoadInput, { kind: 'moving' }>> {
  return fc
    .record({
      axles: fc.array(
        fc.record({ offset: whole(-200, 200).map((n) => n * 10), value: decimal(300, 9000, 1) }),
        {
          minLength: 1,
          maxLength: 4,
        },
      ),
      reach: whole(0, 3),
    })
    .map(({ axles, reach }) => ({
      kind: 'moving',
      from: -reach * 700,
      to: beam.length + reach * 700,
      axles,
    }));
}

export type RulesInput = NonNullable<MemberInput['rules']>;
export const anyRules: fc.Arbitrary<RulesInput> = fc.record({
  spacingStep: pick(1, 5, 10, 12.5),
  spacingMin: pick(10, 20, 45),
  spacingMax: pick(150, 300, 437),
  maxZones: whole(1, 6),
  zoneGrid: pick(50, 100, 250),
  minZoneLength: pick(0, 130, 300, 500),
  mirror: fc.boolean(),
});

/** A whole member of one load case. */
export function memberOf(
  beam: Beam,
  section: Section,
  loads: LoadInput[],
  rules: RulesInput = {},
): MemberInput {
  return {
    schema: 1,
    title: 'A member for a law',
    length: beam.length,
    supports: beam.supports,
    hinges: beam.hinges,
    materials: section.materials,
    pieces: section.pieces,
    connections: section.connections,
    loadCases: [{ id: 'Q', name: '', action: 'imposed', loads }],
    rules,
  };
}

/** A member with fixed loads on any kind of beam. */
export const fixedMember: fc.Arbitrary<MemberInput> = anyBeam.chain((beam) =>
  fc
    .record({ section: anySection, loads: fixedLoads(beam), rules: anyRules })
    .map(({ section, loads, rules }) => memberOf(beam, section, loads, rules)),
);

/** A member with fixed loads on a beam that statics alone solves. */
export const determinateMember: fc.Arbitrary<MemberInput> = determinateBeam.chain((beam) =>
  fc
    .record({ section: anySection, loads: fixedLoads(beam), rules: anyRules })
    .map(({ section, loads, rules }) => memberOf(beam, section, loads, rules)),
);
