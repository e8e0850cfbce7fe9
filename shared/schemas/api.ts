import { z } from 'zod';
import { issueSchema } from './refusal';
import { resultSchema } from './result';

/**
 * What the HTTP interface takes and answers. The handlers parse and answer with these, the screens take their
 * types from here. Times are ISO 8601 UTC, days (`due`) YYYY-MM-DD. Documents travel as typed: only the calculation
 * judges them, so that nothing a person typed is lost because it is not yet right.
 */

export const unitSystemSchema = z.enum(['metric', 'us']);
export const themeSchema = z.enum(['system', 'light', 'dark']);
export type Theme = z.infer<typeof themeSchema>;

export const personSchema = z
  .object({
    id: z.string(),
    name: z.string(),
    email: z.string(),
    role: z.enum(['lead', 'staff']),
    active: z.boolean(),
    units: unitSystemSchema,
    theme: themeSchema,
  })
  .meta({ id: 'Person' });
export type Person = z.infer<typeof personSchema>;

/** A person as named beside something that they did or answer for. */
export const personRefSchema = z.object({ id: z.string(), name: z.string() }).meta({ id: 'PersonRef' });
export type PersonRef = z.infer<typeof personRefSchema>;

/** Who changed a thing last, and when; `by` is null where nobody signed in did (the demo's filling). */
export const changeSchema = z
  .object({ at: z.iso.datetime(), by: personRefSchema.nullable() })
  .meta({ id: 'Change' });
export type Change = z.infer<typeof changeSchema>;

export const signInSchema = z
  .object({
    email: z
      .string({ error: 'The e-mail address is missing' })
      .min(1, { error: 'Enter your e-mail address' })
      .max(320),
    password: z
      .string({ error: 'The password is missing' })
      .min(1, { error: 'Enter your password' })
      .max(1024),
  })
  .meta({ id: 'SignIn' });
export type SignIn = z.infer<typeof signInSchema>;

export const sessionSchema = z.object({ person: personSchema.nullable() }).meta({ id: 'Session' });
export type Session = z.infer<typeof sessionSchema>;

/** A new password: long rather than complicated. */
export const newPasswordSchema = z
  .string({ error: 'The new password is missing' })
  .min(12, { error: 'Use 12 characters or more' })
  .max(128, { error: 'Use 128 characters at most' });

export const changeMeSchema = z
  .object({
    name: z.string().trim().min(1, { error: 'Enter your name' }).max(200),
    units: unitSystemSchema,
    theme: themeSchema,
    password: z.object({ old: z.string().max(1024), new: newPasswordSchema }),
  })
  .partial()
  .meta({ id: 'ChangeMe' });
export type ChangeMe = z.infer<typeof changeMeSchema>;

/** States of a member's latest revision, in product order. */
export const memberStateSchema = z.enum(['draft', 'in-check', 'sent-back', 'signed-off', 'superseded']);
export type MemberState = z.infer<typeof memberStateSchema>;

export const projectSchema = z
  .object({
    id: z.string(),
    number: z.string(),
    name: z.string(),
    client: z.string(),
    siteAddress: z.string(),
    archived: z.boolean(),
    designer: personRefSchema.nullable(),
    checker: personRefSchema.nullable(),
    due: z.iso.date().nullable(),
    /** how many members stand in each state; states without members may be left out */
    members: z.partialRecord(memberStateSchema, z.int()),
    lastChange: changeSchema.nullable(),
    createdAt: z.iso.datetime(),
  })
  .meta({ id: 'Project' });
export type Project = z.infer<typeof projectSchema>;

export const projectSortKeys = [
  'number',
  'name',
  'client',
  'members',
  'designer',
  'checker',
  'due',
  'change',
] as const;
export const projectSortSchema = z.enum([
  ...projectSortKeys,
  ...projectSortKeys.map((key) => `-${key}` as const),
]);
export type ProjectSort = z.infer<typeof projectSortSchema>;

export const projectListSchema = z
  .object({ items: z.array(projectSchema), nextCursor: z.string().nullable() })
  .meta({ id: 'ProjectList' });
export type ProjectList = z.infer<typeof projectListSchema>;

/** What the last calculation of a member came to; `refused` where its document could not be calculated. */
export const memberOutcomeSchema = z.enum(['ok', 'over', 'advice', 'refused']);
export type MemberOutcome = z.infer<typeof memberOutcomeSchema>;

export const memberSummarySchema = z
  .object({
    id: z.string(),
    projectId: z.string(),
    mark: z.string(),
    title: z.string(),
    state: memberStateSchema,
    /** the letter of the revision that the state speaks of: A, B … */
    revision: z.string(),
    outcome: memberOutcomeSchema,
    /** the largest of all interfaces; null where refused */
    utilisation: z.number().nullable(),
    lastChange: changeSchema,
  })
  .meta({ id: 'MemberSummary' });
export type MemberSummary = z.infer<typeof memberSummarySchema>;

export const memberListSchema = z
  .object({ items: z.array(memberSummarySchema), nextCursor: z.string().nullable() })
  .meta({ id: 'MemberList' });
export type MemberList = z.infer<typeof memberListSchema>;

/** A draft as it stands: the document as typed, and its result, or the issues for which it was refused. */
export const draftSchema = z
  .object({
    document: z.record(z.string(), z.unknown()),
    result: resultSchema.nullable(),
    /** one sentence for the whole refusal; null where there is a result */
    refusal: z.string().nullable(),
    issues: z.array(issueSchema),
    /** rises by one with every save; the ETag is this number in quotes */
    version: z.int(),
    saved: changeSchema,
  })
  .meta({ id: 'Draft' });
export type Draft = z.infer<typeof draftSchema>;

export const memberSchema = memberSummarySchema
  .extend(draftSchema.shape)
  .extend({
    project: z.object({ id: z.string(), number: z.string(), name: z.string() }),
    /** what the person who asks may do with it */
    may: z.object({ edit: z.boolean() }),
  })
  .meta({ id: 'Member' });
export type Member = z.infer<typeof memberSchema>;

export const saveDraftSchema = z
  .object({ document: z.record(z.string(), z.unknown(), { error: 'The document must be an object' }) })
  .meta({ id: 'SaveDraft' });

/** Added to the 412 problem: who saved in the meantime, when, and the dotted paths that differ from what was sent. */
export const saveConflictSchema = z
  .object({ version: z.int(), saved: changeSchema, paths: z.array(z.string()) })
  .meta({ id: 'SaveConflict' });
export type SaveConflict = z.infer<typeof saveConflictSchema>;

/** RFC 9457, with a stable `code` and, where a document or body was refused, its issues. */
export const problemSchema = z
  .object({
    type: z.string(),
    title: z.string(),
    status: z.int(),
    detail: z.string(),
    code: z.string(),
    issues: z.array(issueSchema).optional(),
    conflict: saveConflictSchema.optional(),
  })
  .meta({ id: 'Problem' });
export type Problem = z.infer<typeof problemSchema>;
