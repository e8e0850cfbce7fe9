import { z } from 'zod';

/** One thing wrong with a document: where (dotted path, empty for the whole), and what to do about it. */
export const issueSchema = z.object({ path: z.string(), message: z.string() }).meta({ id: 'Issue' });
export type Issue = z.infer<typeof issueSchema>;

export const refusalCodes = [
  'not-json',
  'too-large',
  'invalid-document',
  'unstable-beam',
  'overlapping-pieces',
  'unknown-reference',
  'loose-piece',
  'not-touching',
  'not-available',
] as const;
export type RefusalCode = (typeof refusalCodes)[number];

/** What leaves when input is refused: on standard error under `error`, over HTTP as a problem with status 422. */
export interface Refusal {
  code: RefusalCode;
  message: string;
  issues: Issue[];
}
