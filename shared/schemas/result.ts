import { z } from 'zod';

/**
 * The result of a calculation. Units: N, mm, MPa, N/mm, kg/m. Reactions positive upward, V positive when the
 * part to the left is pushed up, M positive when it sags, deflection positive downward.
 */

const place = z.object({
  value: z.number(),
  x: z.number(),
  combination: z.string().nullable(),
  /** where offset 0 of each moving load stands when this value is reached; empty where none moves */
  positions: z.array(z.object({ loadCase: z.string(), load: z.int(), x: z.number() })),
});
export type Place = z.infer<typeof place>;

export const lineSchema = z
  .object({
    id: z.string(), // "2.4": group and number within it
    group: z.string(),
    label: z.string(),
    symbol: z.string(),
    formula: z.string(), // a mathjs expression over `inputs`
    substituted: z.string(), // the same with its numbers, rounded for reading
    inputs: z.array(
      z.object({ symbol: z.string(), value: z.number(), unit: z.string(), from: z.string().nullable() }),
    ),
    value: z.number(),
    unit: z.string(), // mathjs units; '' for a pure number
    source: z.string(),
    /** the interface it speaks of, if any: J1 … */
    interface: z.string().nullable(),
  })
  .meta({ id: 'CalculationLine' });
export type CalculationLine = z.infer<typeof lineSchema>;

export const zoneResultSchema = z.object({
  from: z.number(),
  to: z.number(),
  spacing: z.number(),
  perRow: z.int(),
  utilisation: z.number(),
});
export type ZoneResult = z.infer<typeof zoneResultSchema>;

export const statusSchema = z.enum(['ok', 'over', 'advice']);
export type Status = z.infer<typeof statusSchema>;

export const interfaceResultSchema = z.object({
  id: z.string(),
  pieces: z.tuple([z.string(), z.string()]),
  kind: z.enum(['fasteners', 'adhesive', 'continuous']),
  rows: z.int(),
  capacity: z.number(),
  capacityLines: z.array(lineSchema),
  /** of the combination with the largest flow over capacity; the resultant where load is passed sideways */
  peakFlow: place.extend({ along: z.number(), across: z.number() }),
  requiredSpacing: z.number().nullable(),
  zones: z.array(zoneResultSchema),
  /** true where the document gave the zones */
  pinned: z.boolean(),
  fasteners: z
    .object({
      count: z.int(),
      positions: z.array(z.array(z.number())),
      forces: z.array(z.array(z.number())),
      utilisation: z.number(),
    })
    .nullable(),
  /** flow (N/mm) needed at each `envelope.x`, and the index in `combinations` that asks for it (−1: none) */
  needed: z.array(z.number()),
  governing: z.array(z.int()),
  utilisation: z.number(),
  slip: z.null(),
  status: statusSchema,
});
export type InterfaceResult = z.infer<typeof interfaceResultSchema>;

export const noticeSchema = z.object({
  code: z.string(),
  message: z.string(),
  /** the interface it speaks of, if any */
  interface: z.string().optional(),
});
export type Notice = z.infer<typeof noticeSchema>;

export const sectionInterfaceSchema = z.object({
  id: z.string(),
  pieces: z.tuple([z.string(), z.string()]),
  orientation: z.enum(['horizontal', 'vertical']),
  contact: z.number(),
  connected: z.boolean(),
  firstMoment: z.number().nullable(),
  flowPerShear: z.number(),
});
export type SectionInterface = z.infer<typeof sectionInterfaceSchema>;

export const resultSchema = z
  .object({
    schema: z.literal(1),
    engine: z.string(),
    section: z.object({
      EA: z.number(),
      EI: z.number(),
      centroid: z.number(),
      referenceModulus: z.number(),
      I: z.number(),
      massPerLength: z.number().nullable(),
      interfaces: z.array(sectionInterfaceSchema),
    }),
    /** the combinations as calculated, in order; one named `all` where the document gives none */
    combinations: z.array(z.object({ id: z.string(), name: z.string(), moving: z.boolean() })),
    reactions: z.array(
      z.object({
        combination: z.string(),
        support: z.string(),
        max: z.number(),
        min: z.number(),
        momentMax: z.number(),
        momentMin: z.number(),
      }),
    ),
    envelope: z.object({
      x: z.array(z.number()),
      shearMax: z.array(z.number()),
      shearMin: z.array(z.number()),
      momentMax: z.array(z.number()),
      momentMin: z.array(z.number()),
      deflectionMax: z.array(z.number()),
      deflectionMin: z.array(z.number()),
      /** index in `combinations` of the largest |V|, |M| and |w| at each x (−1 where all are 0) */
      governing: z.object({
        shear: z.array(z.int()),
        moment: z.array(z.int()),
        deflection: z.array(z.int()),
      }),
    }),
    extremes: z.object({ shear: place, moment: place, deflection: place }),
    interfaces: z.array(interfaceResultSchema),
    slip: z.null(),
    checks: z.array(
      z.object({
        id: z.string(),
        label: z.string(),
        demand: z.number(),
        capacity: z.number(),
        unit: z.string(),
        utilisation: z.number(),
        status: statusSchema,
        source: z.string(),
      }),
    ),
    lines: z.array(lineSchema),
    notices: z.array(noticeSchema),
  })
  .meta({ id: 'CalculationResult' });
export type CalculationResult = z.infer<typeof resultSchema>;
