import { z } from 'zod';

/**
 * The member document: the whole input of one member as one JSON value.
 *
 * Units everywhere: N, mm, MPa (N/mm²), N/mm, kg/m³. x runs along the beam from its left end, y across the
 * section to the right, z up. Loads are positive downward. The schemas fill in the defaults; what is behind
 * them never sees a missing rule.
 */

/** Limits of a document; a refusal names the one that was passed. */
export const documentLimits = {
  bytes: 4 * 2 ** 20,
  pieces: 100,
  supports: 60,
  hinges: 60,
  materials: 100,
  connections: 300,
  loadCases: 200,
  combinations: 500,
  loads: 2000,
  axles: 20,
  zones: 12,
  text: 200,
  testValues: 1000,
  zoneCells: 2000,
  /** fasteners or beads of one interface */
  fasteners: 50_000,
} as const;

/** Lengths (mm) and other magnitudes beyond these are a slip of the keyboard, and would cost all precision. */
const LARGEST = 1e12;

const said = (what: string) => (issue: { code?: string; input?: unknown }) =>
  issue.input === undefined ? `${what} is missing` : `${what} must be a number`;

const number = (what: string) =>
  z
    .number({ error: said(what) })
    .gte(-LARGEST, { error: `${what} is too large to be meant; check the unit` })
    .lte(LARGEST, { error: `${what} is too large to be meant; check the unit` });

const positive = (what: string) =>
  number(what)
    .gt(0, { error: `${what} must be more than 0` })
    .gte(1e-9, { error: `${what} is too small to be meant; check the unit` });
const notNegative = (what: string) => number(what).gte(0, { error: `${what} must not be below 0` });

const text = (what: string) =>
  z
    .string({ error: (issue) => (issue.input === undefined ? `${what} is missing` : `${what} must be text`) })
    .max(documentLimits.text, { error: `${what} may have ${documentLimits.text} characters at most` });
const identifier = (what: string) => text(what).min(1, { error: `${what} must not be empty` });

const list = <T extends z.ZodType>(item: T, what: string, most: number) =>
  z
    .array(item, {
      error: (issue) => (issue.input === undefined ? `${what} are missing` : `${what} must be a list`),
    })
    .max(most, { error: `${what}: at most ${most} are allowed` });

const choice = <const T extends readonly [string, ...string[]]>(what: string, options: T) =>
  z.enum(options, { error: `${what} must be one of ${options.join(', ')}` });

export const supportSchema = z.object({
  id: identifier('The support’s id'),
  x: number('The support’s x'),
  kind: choice('The support’s kind', ['pin', 'roller', 'fixed', 'spring']),
  /** N/mm, of a spring */
  stiffness: positive('The spring’s stiffness').optional(),
  bearingLength: positive('The bearing length').optional(),
});

export const materialSchema = z.object({
  id: identifier('The material’s id'),
  name: text('The material’s name').default(''),
  kind: choice('The material’s kind', ['solid', 'glulam', 'lvl', 'plywood', 'osb', 'steel']).default('solid'),
  E: positive('The modulus E'),
  density: positive('The density').optional(),
  characteristicDensity: positive('The characteristic density').optional(),
  specificGravity: positive('The specific gravity').optional(),
  strengths: z.record(z.string(), notNegative('The strength')).optional(),
});

export const pieceSchema = z.object({
  id: identifier('The piece’s id'),
  material: identifier('The piece’s material'),
  y: number('y'),
  z: number('z'),
  width: positive('The width'),
  depth: positive('The depth'),
});

const factorOfSafety = number('The factor of safety').gte(1, {
  error: 'The factor of safety must be 1 or more',
});

export const capacitySchema = z.discriminatedUnion(
  'basis',
  [
    z.object({ basis: z.literal('ultimate'), value: positive('The ultimate value'), factorOfSafety }),
    z.object({ basis: z.literal('allowable'), value: positive('The allowable value') }),
    z.object({
      basis: z.literal('test'),
      values: list(positive('A test value'), 'The test values', documentLimits.testValues).min(5, {
        error: 'At least 5 test values are needed',
      }),
      factorOfSafety,
    }),
    z.looseObject({ basis: z.literal('nds') }),
    z.looseObject({ basis: z.literal('ec5') }),
  ],
  { error: 'The capacity needs a basis: ultimate, allowable, test, nds or ec5' },
);

export const fastenerSchema = z.object({
  type: choice('The fastener’s type', ['nail', 'screw', 'bolt', 'lag']).optional(),
  shank: choice('The shank', ['smooth', 'ringed', 'square']).optional(),
  diameter: positive('The diameter').optional(),
  length: positive('The fastener’s length').optional(),
  headDiameter: positive('The head’s diameter').optional(),
  tensileStrength: positive('The tensile strength').optional(),
  bendingYieldStrength: positive('The bending yield strength').optional(),
  predrilled: z.boolean({ error: 'predrilled must be true or false' }).optional(),
  headSide: identifier('headSide').optional(),
});

const ruleFields = {
  /** mm; every spacing is a multiple of it */
  spacingStep: positive('The spacing step'),
  spacingMin: positive('The smallest spacing'),
  spacingMax: positive('The largest spacing'),
  maxZones: z
    .int({ error: 'The number of zones must be a whole number' })
    .gte(1, { error: 'At least one zone is needed' })
    .lte(documentLimits.zones, { error: `At most ${documentLimits.zones} zones are allowed` }),
  zoneGrid: positive('The zone grid'),
  minZoneLength: notNegative('The shortest zone'),
  mirror: z.boolean({ error: 'mirror must be true or false' }),
};

export const rulesSchema = z.object({
  spacingStep: ruleFields.spacingStep.default(5),
  spacingMin: ruleFields.spacingMin.default(40),
  spacingMax: ruleFields.spacingMax.default(300),
  maxZones: ruleFields.maxZones.default(3),
  zoneGrid: ruleFields.zoneGrid.default(100),
  minZoneLength: ruleFields.minZoneLength.default(300),
  mirror: ruleFields.mirror.default(false),
  /** the deflection allowed is the span over this */
  deflectionLimit: positive('The deflection limit').default(300),
  composite: choice('composite', ['rigid', 'gamma', 'slip']).default('rigid'),
});

export const zoneSchema = z.object({
  from: number('The zone’s start'),
  to: number('The zone’s end'),
  spacing: positive('The spacing'),
});

export const connectionSchema = z.object({
  pieces: z.tuple([identifier('A piece’s id'), identifier('A piece’s id')], {
    error: 'A connection joins two pieces: give their two ids',
  }),
  kind: choice('The connection’s kind', ['fasteners', 'adhesive', 'continuous']),
  rows: z
    .int({ error: 'The number of rows must be a whole number' })
    .gte(1, { error: 'At least one row is needed' })
    .lte(100, { error: 'At most 100 rows are allowed' })
    .optional(),
  capacity: capacitySchema,
  slipModulus: positive('The slip modulus').optional(),
  fastener: fastenerSchema.optional(),
  /** mm, of a continuous line: the length of each run; the spacing is then the pitch */
  bead: positive('The bead').optional(),
  rules: z.object(ruleFields).partial().optional(),
  zones: list(zoneSchema, 'The zones', documentLimits.zones)
    .min(1, { error: 'Pinned zones must not be empty' })
    .optional(),
});

const on = { on: identifier('on').optional() };
export const loadSchema = z.discriminatedUnion(
  'kind',
  [
    z.object({
      kind: z.literal('uniform'),
      from: number('from'),
      to: number('to'),
      value: number('The load'),
      ...on,
    }),
    z.object({
      kind: z.literal('varying'),
      from: number('from'),
      to: number('to'),
      start: number('The load at its start'),
      end: number('The load at its end'),
      ...on,
    }),
    z.object({ kind: z.literal('point'), x: number('x'), value: number('The load'), ...on }),
    z.object({ kind: z.literal('couple'), x: number('x'), value: number('The couple'), ...on }),
    z.object({
      kind: z.literal('moving'),
      from: number('from'),
      to: number('to'),
      axles: list(
        z.object({ offset: number('The offset'), value: number('The axle load') }),
        'The axles',
        documentLimits.axles,
      ).min(1, { error: 'A moving load needs at least one axle' }),
      ...on,
    }),
  ],
  { error: 'The load’s kind must be one of uniform, varying, point, couple, moving' },
);

export const loadCaseSchema = z.object({
  id: identifier('The load case’s id'),
  name: text('The load case’s name').default(''),
  action: choice('action', ['permanent', 'imposed', 'snow', 'wind', 'construction', 'accidental']),
  selfWeight: z.boolean({ error: 'selfWeight must be true or false' }).default(false),
  loads: z.array(loadSchema, { error: 'loads must be a list' }).default([]),
});

export const combinationSchema = z.object({
  id: identifier('The combination’s id'),
  name: text('The combination’s name').default(''),
  factors: z.record(z.string(), number('The factor'), {
    error: 'factors are needed: one for each load case',
  }),
  duration: choice('duration', [
    'permanent',
    'long-term',
    'medium-term',
    'short-term',
    'instantaneous',
  ]).default('long-term'),
});

export const memberDocumentSchema = z
  .object({
    schema: z.literal(1, { error: 'schema must be 1' }),
    title: text('The title').default(''),
    length: number('The length')
      .gte(1, { error: 'The length must be 1 mm or more' })
      .lte(1e7, { error: 'The length may be 10 000 000 mm at most' }),
    supports: list(supportSchema, 'The supports', documentLimits.supports).min(1, {
      error: 'The beam has no support: add two pins or rollers, or a fixed end',
    }),
    hinges: list(number('A hinge’s x'), 'The hinges', documentLimits.hinges).default([]),
    materials: list(materialSchema, 'The materials', documentLimits.materials).min(1, {
      error: 'At least one material is needed',
    }),
    pieces: list(pieceSchema, 'The pieces', documentLimits.pieces).min(1, {
      error: 'At least one piece is needed',
    }),
    connections: list(connectionSchema, 'The connections', documentLimits.connections).default([]),
    loadCases: list(loadCaseSchema, 'The load cases', documentLimits.loadCases).min(1, {
      error: 'At least one load case is needed',
    }),
    combinations: list(combinationSchema, 'The combinations', documentLimits.combinations).default([]),
    rules: rulesSchema.prefault({}),
  })
  .meta({ id: 'MemberDocument' });

/** A document as people and programs write it: defaults may be left out. */
export type MemberInput = z.input<typeof memberDocumentSchema>;
/** A document as the calculation reads it: parsed, defaults filled in. */
export type MemberDocument = z.output<typeof memberDocumentSchema>;
export type Support = MemberDocument['supports'][number];
export type Material = MemberDocument['materials'][number];
export type Piece = MemberDocument['pieces'][number];
export type Connection = MemberDocument['connections'][number];
export type Capacity = Connection['capacity'];
export type LoadCase = MemberDocument['loadCases'][number];
export type Load = LoadCase['loads'][number];
export type MovingLoad = Extract<Load, { kind: 'moving' }>;
export type Combination = MemberDocument['combinations'][number];
export type Rules = MemberDocument['rules'];
export type ZoneInput = z.output<typeof zoneSchema>;
