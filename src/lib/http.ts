import type { Problem } from '@shared/schemas/api';

/** The server answered with a problem (RFC 9457), or with something that is none. */
export class ProblemError extends Error {
  readonly status: number;
  readonly problem: Problem;

  constructor(status: number, problem: Problem) {
    super(problem.detail);
    this.name = 'ProblemError';
    this.status = status;
    this.problem = problem;
  }
}

/** No answer came: the network or the server is away. */
export class NoAnswerError extends Error {
  constructor() {
    super('The server does not answer.');
    this.name = 'NoAnswerError';
  }
}

interface Options {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  body?: unknown;
  headers?: Record<string, string>;
  signal?: AbortSignal | undefined;
}

const problemOf = async (response: Response): Promise<Problem> => {
  const fallback: Problem = {
    type: 'about:blank',
    title: response.statusText || 'No answer that can be read',
    status: response.status,
    detail: 'The server’s answer could not be read. Try again in a moment.',
    code: 'unreadable',
  };
  if (!(response.headers.get('content-type') ?? '').includes('json')) return fallback;
  const body: unknown = await response.json().catch(() => null);
  return typeof body === 'object' && body !== null ? { ...fallback, ...body } : fallback;
};

/**
 * Sends JSON and answers the parsed body. `T` is taken on trust: the server derives what it sends from the same
 * schemas (`shared/schemas/api`), and checking again here would cost the first screen the whole of zod.
 * @throws {ProblemError} where the server refuses, {@link NoAnswerError} where it is away; aborting rejects with an
 * `AbortError`.
 */
export async function request<T>(path: string, options: Options = {}): Promise<T> {
  const { method = 'GET', body, headers = {}, signal } = options;
  let response: Response;
  try {
    response = await fetch(path, {
      method,
      headers: {
        accept: 'application/json',
        ...(body === undefined ? {} : { 'content-type': 'application/json' }),
        ...headers,
      },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
      ...(signal ? { signal } : {}),
      credentials: 'same-origin',
    });
  } catch (error) {
    if (signal?.aborted) throw error;
    throw new NoAnswerError();
  }
  if (!response.ok) throw new ProblemError(response.status, await problemOf(response));
  const answer: unknown = response.status === 204 ? null : await response.json();
  return answer as T;
}

/** What to tell a person about anything thrown: what happened and what to do. */
export function sayError(error: unknown): string {
  if (error instanceof ProblemError || error instanceof NoAnswerError) return error.message;
  return 'Something went wrong on this page. Load it again; what was saved is safe.';
}
