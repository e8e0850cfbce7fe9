import { memberDocumentSchema } from '@shared/schemas/member';
import type { Connection, MemberDocument } from '@shared/schemas/member';
import type { CalculationResult, InterfaceResult, SectionInterface } from '@shared/schemas/result';
import type { Draft } from '@shared/schemas/api';
import type { Step } from '@/components/drawing/curve';

/** A document that could be calculated, and what came of it. */
export interface Worked {
  document: MemberDocument;
  result: CalculationResult;
}

/** A saved draft with its result; null where there is none. */
export function workedOf(draft: Draft | null): Worked | null {
  if (draft === null || draft.result === null) return null;
  const document = memberDocumentSchema.safeParse(draft.document);
  return document.success ? { document: document.data, result: draft.result } : null;
}

/** Everything known of one joined interface. */
export interface Joint {
  outcome: InterfaceResult;
  section: SectionInterface;
  connection: Connection;
  rules: MemberDocument['rules'];
}

/** The joined interface of that id, or the first one; null where nothing is joined. */
export function jointOf({ document, result }: Worked, id: string | null): Joint | null {
  const outcome = result.interfaces.find((one) => one.id === id) ?? result.interfaces[0];
  const section = result.section.interfaces.find((one) => one.id === outcome?.id);
  const connection = document.connections.find(
    ({ pieces: [a, b] }) => outcome?.pieces.includes(a) === true && outcome.pieces.includes(b),
  );
  if (!outcome || !section || !connection) return null;
  const own = Object.fromEntries(
    Object.entries(connection.rules ?? {}).filter(([, value]) => value !== undefined),
  );
  return { outcome, section, connection, rules: { ...document.rules, ...own } };
}

/** N: what one spacing of one row carries: R of a fastener, or R of a bead's length. */
export function carriedASpacing({ outcome, connection }: Joint): number {
  const bead = outcome.kind === 'continuous' ? connection.bead : undefined;
  return outcome.capacity * (bead ?? 1);
}

/** Whether the joint has a spacing at all; glue and unbroken lines have none. */
export function isSpaced({ outcome, connection }: Joint): boolean {
  return outcome.kind === 'fasteners' || (outcome.kind === 'continuous' && connection.bead !== undefined);
}

/** mm; the closest spacing that the rules allow, of a joint for which no schedule exists. */
export function closestSpacing({ outcome }: Joint): number {
  return outcome.utilisation * (outcome.requiredSpacing ?? 0);
}

/** N/mm along the beam that the schedule carries; where there is none, the most that the rules allow. */
export function carriedSteps(joint: Joint, length: number): { steps: Step[]; onlyPossible: boolean } {
  const { outcome, section } = joint;
  if (!isSpaced(joint)) {
    const value = outcome.kind === 'adhesive' ? outcome.capacity * section.contact : outcome.capacity;
    return { steps: [{ from: 0, to: length, value }], onlyPossible: false };
  }
  const each = outcome.rows * carriedASpacing(joint);
  if (outcome.zones.length === 0)
    return { steps: [{ from: 0, to: length, value: each / closestSpacing(joint) }], onlyPossible: true };
  return {
    steps: outcome.zones.map(({ from, to, spacing }) => ({ from, to, value: each / spacing })),
    onlyPossible: false,
  };
}
