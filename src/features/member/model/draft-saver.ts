import type { Draft } from '@shared/schemas/api';
import { NoAnswerError, ProblemError } from '@/lib/http';
import { sameJson } from './draft-document';
import type { DraftDocument } from './draft-document';

/** How the document on the screen stands to the one on the server. */
export type SaveState =
  | { kind: 'saved' }
  /** changed, and about to be sent */
  | { kind: 'waiting' }
  | { kind: 'saving' }
  /** no answer or a fault there: what was typed is kept here and sent again */
  | { kind: 'retrying' }
  /** somebody else saved since; nothing more is sent until one says whose document holds */
  | { kind: 'conflict'; theirs: Draft }
  /** the server will not have it, and sending it again would not help */
  | { kind: 'stopped'; reason: 'signed-out' | 'refused'; message: string };

export interface SaverSnapshot {
  state: SaveState;
  /** the newest answer to a save, or what the page opened with */
  answer: Draft;
  /** the newest answer that had a result, with the document it is the result of */
  good: Draft | null;
  /** since when an answer to a change is awaited, in milliseconds of `now()`; null where none is */
  pendingSince: number | null;
}

export interface SaverDeps {
  put: (document: DraftDocument, version: number, signal: AbortSignal) => Promise<Draft>;
  current: () => Promise<Draft>;
  /** keeps what is not saved yet across a reload or a new sign-in; null forgets it */
  keep: (unsaved: { document: DraftDocument; version: number } | null) => void;
  now: () => number;
}

const DEBOUNCE = 400;
const FIRST_RETRY = 1_000;
const LONGEST_RETRY = 15_000;

/**
 * Sends a document to the server as it changes: a little after the last change, never two at a time, a superseded
 * request given up. Knows its own lost answers: a save whose answer was given up may have been stored all the same, and
 * the 412 that follows is then no conflict.
 */
export class DraftSaver {
  private snapshotNow: SaverSnapshot;
  private readonly listeners = new Set<() => void>();
  private document: DraftDocument;
  private version: number;
  private timer: ReturnType<typeof setTimeout> | undefined;
  private request: AbortController | undefined;
  private retryAfter = FIRST_RETRY;
  private left = false;
  /** documents sent since the last answer, any of which the server may hold by now */
  private sent: DraftDocument[] = [];

  constructor(
    opened: Draft,
    private readonly deps: SaverDeps,
  ) {
    this.document = opened.document;
    this.version = opened.version;
    this.snapshotNow = {
      state: { kind: 'saved' },
      answer: opened,
      good: opened.result === null ? null : opened,
      pendingSince: null,
    };
  }

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };

  readonly snapshot = (): SaverSnapshot => this.snapshotNow;

  /** Whether something typed is not on the server yet. */
  get unsaved(): boolean {
    return this.snapshotNow.state.kind !== 'saved';
  }

  /** Takes a changed document and sends it soon. */
  change(document: DraftDocument): void {
    this.left = false;
    this.document = document;
    this.deps.keep({ document, version: this.version });
    if (this.snapshotNow.state.kind === 'conflict') return;
    this.giveUpRequest();
    this.show({ state: { kind: 'waiting' }, pendingSince: this.snapshotNow.pendingSince ?? this.deps.now() });
    this.schedule(DEBOUNCE);
  }

  /** Sends at once what is waiting. */
  flush(): void {
    if (this.snapshotNow.state.kind === 'waiting' || this.snapshotNow.state.kind === 'retrying')
      this.schedule(0);
  }

  /** After a conflict: this document replaces theirs. */
  keepMine(): void {
    const { state } = this.snapshotNow;
    if (state.kind !== 'conflict') return;
    this.version = state.theirs.version;
    this.show({ state: { kind: 'waiting' }, pendingSince: this.deps.now() });
    this.schedule(0);
  }

  /** After a conflict: theirs replaces this document; answers it for the form. */
  takeTheirs(): DraftDocument | null {
    const { state } = this.snapshotNow;
    if (state.kind !== 'conflict') return null;
    this.document = state.theirs.document;
    this.settle(state.theirs);
    return state.theirs.document;
  }

  /** Takes up a document kept from before a reload, saved over `version`. */
  resume(document: DraftDocument, version: number): void {
    this.version = version;
    this.change(document);
  }

  /** The page is left: what waits is sent at once, what is under way goes on; what fails stays kept. */
  leave(): void {
    clearTimeout(this.timer);
    if (this.snapshotNow.state.kind === 'waiting' || this.snapshotNow.state.kind === 'retrying')
      void this.send();
    this.left = true;
  }

  private show(change: Partial<SaverSnapshot>): void {
    this.snapshotNow = { ...this.snapshotNow, ...change };
    for (const listener of this.listeners) listener();
  }

  private schedule(delay: number): void {
    clearTimeout(this.timer);
    if (this.left) return;
    this.timer = setTimeout(() => void this.send(), delay);
  }

  private giveUpRequest(): void {
    this.request?.abort();
    this.request = undefined;
  }

  private settle(answer: Draft): void {
    clearTimeout(this.timer);
    this.version = answer.version;
    this.sent = [];
    this.retryAfter = FIRST_RETRY;
    this.deps.keep(null);
    this.show({
      state: { kind: 'saved' },
      answer,
      good: answer.result === null ? this.snapshotNow.good : answer,
      pendingSince: null,
    });
  }

  private async send(): Promise<void> {
    this.giveUpRequest();
    const request = new AbortController();
    this.request = request;
    const document = this.document;
    this.sent.push(document);
    this.show({ state: { kind: 'saving' } });
    try {
      const answer = await this.deps.put(document, this.version, request.signal);
      if (this.request === request) this.settle(answer);
    } catch (error) {
      if (this.request !== request) return;
      await this.failed(error, request);
    }
  }

  private async failed(error: unknown, request: AbortController): Promise<void> {
    if (error instanceof ProblemError && error.status === 412) {
      await this.overtaken(request);
    } else if (
      error instanceof NoAnswerError ||
      (error instanceof ProblemError && (error.status >= 500 || error.status === 429))
    ) {
      this.retryLater();
    } else if (error instanceof ProblemError) {
      const reason = error.status === 401 ? 'signed-out' : 'refused';
      this.show({ state: { kind: 'stopped', reason, message: error.message }, pendingSince: null });
    } else {
      throw error;
    }
  }

  private async overtaken(request: AbortController): Promise<void> {
    let theirs: Draft;
    try {
      theirs = await this.deps.current();
    } catch {
      if (this.request === request) this.retryLater();
      return;
    }
    if (this.request !== request) return;
    const own = this.sent.some((document) => sameJson(document, theirs.document));
    if (own && sameJson(this.document, theirs.document)) {
      this.settle(theirs);
    } else if (own) {
      this.version = theirs.version;
      this.schedule(0);
    } else {
      this.show({ state: { kind: 'conflict', theirs }, pendingSince: null });
    }
  }

  private retryLater(): void {
    this.show({ state: { kind: 'retrying' } });
    this.schedule(this.retryAfter);
    this.retryAfter = Math.min(this.retryAfter * 2, LONGEST_RETRY);
  }
}
