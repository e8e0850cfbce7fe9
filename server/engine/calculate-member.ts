import type { MemberDocument } from '@shared/schemas/member';
import type { Refusal } from '@shared/schemas/refusal';
import type { CalculationResult } from '@shared/schemas/result';
import { calculate } from './calculate';
import { parseMember } from './input/parse';
import { Refused } from './refused';

/** What became of a document: calculated, with its defaults filled in; or refused, with the fields to mend. */
export type Outcome =
  { ok: true; document: MemberDocument; result: CalculationResult } | { ok: false; refusal: Refusal };

/** Parses and calculates a member document. Never throws for anything that a document can hold. */
export function calculateMember(input: unknown): Outcome {
  try {
    const { document, notices } = parseMember(input);
    return { ok: true, document, result: calculate(document, notices) };
  } catch (error) {
    if (error instanceof Refused) return { ok: false, refusal: error.toRefusal() };
    throw error;
  }
}
