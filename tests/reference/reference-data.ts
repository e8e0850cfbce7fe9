import { readFileSync } from 'node:fs';
import { z } from 'zod';

/** One figure of a case: where it is read (`readPath`), what it is, how close, and where it comes from. */
export const figureSchema = z
  .object({
    of: z.string(),
    is: z.union([z.number(), z.string(), z.boolean(), z.null()]).optional(),
    zones: z.array(z.tuple([z.number(), z.number(), z.number()])).optional(),
    entries: z.int().optional(),
    exists: z.literal(true).optional(),
    rel: z.number().optional(),
    abs: z.number().optional(),
    magnitude: z.boolean().optional(),
    source: z.string().min(4),
  })
  .strict();
export type Figure = z.infer<typeof figureSchema>;

const casesSchema = z.object({
  about: z.string(),
  cases: z.array(z.object({ id: z.string(), member: z.unknown(), figures: z.array(figureSchema).min(1) })),
});

const refusalsSchema = z.object({
  about: z.string(),
  cases: z.array(
    z.object({
      id: z.string(),
      code: z.string(),
      paths: z.array(z.string()),
      member: z.unknown(),
      source: z.string(),
    }),
  ),
});

const toleranceFactorsSchema = z.object({
  about: z.string(),
  factors: z.array(z.object({ n: z.int(), is: z.number(), rel: z.number(), source: z.string() })).min(1),
});

const read = (name: string): unknown =>
  JSON.parse(readFileSync(new URL(`./data/${name}.json`, import.meta.url), 'utf8'));

/** The files of `data/` that hold members with their published figures. */
export const figureTopics = ['beams', 'moving', 'flow', 'capacity', 'schedule', 'sideways'] as const;
export type FigureTopic = (typeof figureTopics)[number];

/** Members with published figures, of one topic. */
export const readCases = (topic: FigureTopic) => casesSchema.parse(read(topic)).cases;
/** Documents that must be refused, each with one thing wrong. */
export const readRefusals = () => refusalsSchema.parse(read('refusals')).cases;
/** k_s by number of tests. */
export const readToleranceFactors = () => toleranceFactorsSchema.parse(read('tolerance-factors')).factors;
