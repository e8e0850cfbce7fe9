import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Draft } from '@shared/schemas/api';
import { NoAnswerError, ProblemError } from '@/lib/http';
import type { DraftDocument } from './draft-document';
import { DraftSaver } from './draft-saver';

const draft = (document: DraftDocument, version: number, by = 'Rolf'): Draft => ({
  document,
  result: null,
  refusal: null,
  issues: [],
  version,
  saved: { at: '2026-12-01T09:41:00.000Z', by: { id: by, name: by } },
});

const problem = (status: number, code: string) =>
  new ProblemError(status, { type: 'about:blank', title: code, status, detail: code, code });

/** A server that holds one draft, can be away, and can lose the way of its answers. */
class Server {
  held = draft({ rows: 2 }, 1);
  away = false;
  losesAnswers = false;
  takes = 20;
  readonly puts: { document: DraftDocument; version: number; aborted: boolean }[] = [];

  readonly put = async (document: DraftDocument, version: number, signal: AbortSignal): Promise<Draft> => {
    const put = { document, version, aborted: false };
    this.puts.push(put);
    if (this.away) throw new NoAnswerError();
    const stored = version === this.held.version;
    if (stored) this.held = draft(document, version + 1);
    const answer = this.held;
    await new Promise((resolve) => setTimeout(resolve, this.takes));
    if (signal.aborted || this.losesAnswers) {
      put.aborted = true;
      throw this.losesAnswers ? new NoAnswerError() : new DOMException('given up', 'AbortError');
    }
    if (!stored) throw problem(412, 'saved-in-between');
    return answer;
  };

  readonly current = (): Promise<Draft> =>
    this.away ? Promise.reject(new NoAnswerError()) : Promise.resolve(this.held);
}

let server: Server;
let kept: { document: DraftDocument; version: number } | null;
let saver: DraftSaver;

const begin = (): DraftSaver =>
  new DraftSaver(server.held, {
    put: server.put,
    current: server.current,
    keep: (unsaved) => {
      kept = unsaved;
    },
    now: () => Date.now(),
  });
const state = () => saver.snapshot().state.kind;

beforeEach(() => {
  vi.useFakeTimers();
  server = new Server();
  kept = null;
  saver = begin();
});
afterEach(() => {
  saver.leave();
  vi.useRealTimers();
});

describe('saving as one types', () => {
  it('waits for a pause and sends the last state once', async () => {
    saver.change({ rows: 3 });
    await vi.advanceTimersByTimeAsync(200);
    saver.change({ rows: 31 });
    expect(state()).toBe('waiting');
    expect(kept).toEqual({ document: { rows: 31 }, version: 1 });
    await vi.advanceTimersByTimeAsync(399);
    expect(server.puts).toHaveLength(0);
    await vi.advanceTimersByTimeAsync(30);
    expect(server.puts.map((put) => put.document)).toEqual([{ rows: 31 }]);
    expect(state()).toBe('saved');
    expect(saver.snapshot().answer.version).toBe(2);
    expect(kept).toBeNull();
  });

  it('gives up a request that is overtaken, and does not take its own save for somebody else’s', async () => {
    server.takes = 1_000;
    saver.change({ rows: 3 });
    await vi.advanceTimersByTimeAsync(500);
    expect(state()).toBe('saving');
    saver.change({ rows: 4 });
    await vi.advanceTimersByTimeAsync(4_000);
    // the first was stored although nobody heard the answer; the second met a 412 and went over it
    expect(server.puts.map((put) => [put.document.rows, put.version])).toEqual([
      [3, 1],
      [4, 1],
      [4, 2],
    ]);
    expect(server.puts[0]?.aborted).toBe(true);
    expect(server.held.document).toEqual({ rows: 4 });
    expect(state()).toBe('saved');
  });

  it('keeps what was typed while the server is away, and says so until it is back', async () => {
    server.away = true;
    saver.change({ rows: 5 });
    await vi.advanceTimersByTimeAsync(500);
    expect(state()).toBe('retrying');
    expect(kept).toEqual({ document: { rows: 5 }, version: 1 });
    await vi.advanceTimersByTimeAsync(1_000);
    expect(server.puts).toHaveLength(2);
    server.away = false;
    await vi.advanceTimersByTimeAsync(16_000);
    expect(state()).toBe('saved');
    expect(server.held.document).toEqual({ rows: 5 });
  });

  it('finds its own save again after an answer was lost on the way', async () => {
    server.losesAnswers = true;
    saver.change({ rows: 6 });
    await vi.advanceTimersByTimeAsync(500);
    expect(state()).toBe('retrying');
    server.losesAnswers = false;
    await vi.advanceTimersByTimeAsync(2_000);
    expect(state()).toBe('saved');
    expect(server.held).toMatchObject({ document: { rows: 6 }, version: 2 });
  });

  it('sends what waits when the page is left', async () => {
    saver.change({ rows: 9 });
    await vi.advanceTimersByTimeAsync(10);
    saver.leave();
    await vi.advanceTimersByTimeAsync(50);
    expect(server.held.document).toEqual({ rows: 9 });
    expect(kept).toBeNull();
  });

  it('stops where the server will not have it, without forgetting what was typed', async () => {
    saver = new DraftSaver(server.held, {
      put: () => Promise.reject(problem(401, 'signed-out')),
      current: server.current,
      keep: (unsaved) => {
        kept = unsaved;
      },
      now: () => Date.now(),
    });
    saver.change({ rows: 7 });
    await vi.advanceTimersByTimeAsync(30_000);
    expect(saver.snapshot().state).toMatchObject({ kind: 'stopped', reason: 'signed-out' });
    expect(kept).toEqual({ document: { rows: 7 }, version: 1 });
  });
});

describe('when somebody else saved first', () => {
  beforeEach(async () => {
    server.held = draft({ rows: 8 }, 2, 'Mira');
    saver.change({ rows: 3 });
    await vi.advanceTimersByTimeAsync(1_000);
  });

  it('shows theirs and sends nothing more', async () => {
    expect(saver.snapshot().state).toMatchObject({ kind: 'conflict', theirs: { document: { rows: 8 } } });
    const before = server.puts.length;
    saver.change({ rows: 33 });
    await vi.advanceTimersByTimeAsync(5_000);
    expect(server.puts).toHaveLength(before);
    expect(state()).toBe('conflict');
    expect(kept?.document).toEqual({ rows: 33 });
  });

  it('saves over theirs when told to', async () => {
    saver.keepMine();
    await vi.advanceTimersByTimeAsync(1_000);
    expect(state()).toBe('saved');
    expect(server.held).toMatchObject({ document: { rows: 3 }, version: 3 });
  });

  it('takes theirs when told to', async () => {
    expect(saver.takeTheirs()).toEqual({ rows: 8 });
    await vi.advanceTimersByTimeAsync(1_000);
    expect(state()).toBe('saved');
    expect(saver.snapshot().answer.version).toBe(2);
    expect(server.held.document).toEqual({ rows: 8 });
    expect(kept).toBeNull();
  });
});
