import type { DraftDocument } from './draft-document';

const keyOf = (memberId: string): string => `seamwright-unsaved-${memberId}`;

/** Keeps, for this tab, what is typed and not on the server yet; null forgets it. */
export function keepUnsaved(
  memberId: string,
  unsaved: { document: DraftDocument; version: number } | null,
): void {
  try {
    if (unsaved === null) sessionStorage.removeItem(keyOf(memberId));
    else sessionStorage.setItem(keyOf(memberId), JSON.stringify(unsaved));
  } catch {
    // without storage a reload loses it, and the browser asks before it reloads
  }
}

/** What was kept for a member, or null. */
export function keptUnsaved(memberId: string): { document: DraftDocument; version: number } | null {
  try {
    const kept: unknown = JSON.parse(sessionStorage.getItem(keyOf(memberId)) ?? 'null');
    if (typeof kept !== 'object' || kept === null || !('document' in kept) || !('version' in kept))
      return null;
    const { document, version } = kept;
    if (typeof document !== 'object' || document === null || typeof version !== 'number') return null;
    return { document: { ...document }, version };
  } catch {
    return null;
  }
}
