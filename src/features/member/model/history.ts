import type { DraftDocument } from './draft-document';

const MOST = 100;
/** Changes of one field within this many milliseconds of each other are one step back. */
const TOGETHER = 1_500;

interface Step {
  before: DraftDocument;
  path: string;
  at: number;
}

/** What a document was before each change, newest last. Plain data: every function answers a new one. */
export type History = readonly Step[];

/** Remembers `before`; typing on in one field adds no step. */
export function remember(history: History, before: DraftDocument, path: string, at: number): History {
  const last = history.at(-1);
  if (last !== undefined && path !== '' && last.path === path && at - last.at < TOGETHER)
    return [...history.slice(0, -1), { ...last, at }];
  return [...history.slice(-(MOST - 1)), { before, path, at }];
}

/** The document before the last change, and the history without it; null where there is nothing to take back. */
export function stepBack(history: History): { document: DraftDocument; history: History } | null {
  const last = history.at(-1);
  return last === undefined ? null : { document: last.before, history: history.slice(0, -1) };
}
