import type { MemberDocument } from '@shared/schemas/member';
import type { Refusal } from '@shared/schemas/refusal';
import type { CalculationResult } from '@shared/schemas/result';

/** What became of a document: calculated, with its defaults filled in; or refused, with the fields to mend. */
export type Outcome =
  | { ok: true; document: MemberDocument; result: CalculationResult }
  | { ok: false; refusal: Refusal };

/** Parses and calculates a member document. Never throws for anything that a document can hold. */
export function calculateMember(_input: unknown): Outcome {
  throw new Error('the engine lands here');
}
