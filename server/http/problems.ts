import type { ErrorRequestHandler, RequestHandler } from 'express';
import type { Logger } from 'pino';
import type { z } from 'zod';
import { problemCodes, type ProblemCode } from '@shared/problem-codes';
import type { Problem } from '@shared/schemas/api';
import type { Issue } from '@shared/schemas/refusal';

const titles: Record<ProblemCode, string> = {
  'malformed-json': 'The request is not JSON',
  'malformed-request': 'The request cannot be read',
  'if-match-missing': 'The version that is saved over is missing',
  'not-signed-in': 'Not signed in',
  'wrong-credentials': 'Not signed in',
  'cross-origin': 'The request comes from another site',
  'not-yours': 'Not yours to do',
  'not-found': 'Not found',
  'method-not-allowed': 'Not possible here',
  'saved-by-another': 'Somebody else saved first',
  'too-large': 'Too large',
  'unsupported-media': 'The server reads JSON here',
  'invalid-body': 'Some fields are not right',
  refused: 'The document cannot be calculated',
  'account-paused': 'The account is paused',
  'slow-down': 'Too many requests',
  'server-fault': 'The server failed',
  'database-away': 'The database does not answer',
};

/** An error that a caller can cause, with the code and status it leaves with. */
export class HttpProblem extends Error {
  constructor(
    readonly code: ProblemCode,
    detail: string,
    readonly extra: Pick<Problem, 'issues' | 'conflict'> & { retryAfter?: number } = {},
  ) {
    super(detail);
    this.name = 'HttpProblem';
  }
}

function bodyOf({ code, message, extra }: HttpProblem): Problem {
  const { issues, conflict } = extra;
  return {
    type: `urn:seamwright:problem:${code}`,
    title: titles[code],
    status: problemCodes[code],
    detail: message,
    code,
    ...(issues ? { issues } : {}),
    ...(conflict ? { conflict } : {}),
  };
}

/** Parses a body, or throws the 422 that names its fields. */
export function parseBody<T extends z.ZodType>(schema: T, body: unknown): z.output<T> {
  const parsed = schema.safeParse(body);
  if (parsed.success) return parsed.data;
  const issues = parsed.error.issues.map((issue): Issue => ({
    path: issue.path.map(String).join('.'),
    message: issue.message,
  }));
  throw new HttpProblem('invalid-body', issues[0]?.message ?? 'Some fields are not right.', { issues });
}

/** Parses a query string, or throws the 400 that says what is wrong with it. */
export function parseQuery<T extends z.ZodType>(schema: T, query: unknown): z.output<T> {
  const parsed = schema.safeParse(query);
  if (parsed.success) return parsed.data;
  const [first] = parsed.error.issues;
  throw new HttpProblem(
    'malformed-request',
    `${first?.path.join('.') ?? ''}: ${first?.message ?? 'not valid'}`,
  );
}

export const notFound: RequestHandler = () => {
  throw new HttpProblem('not-found', 'Nothing is here, or it is not yours to see.');
};

export const methodNotAllowed: RequestHandler = (request) => {
  throw new HttpProblem('method-not-allowed', `${request.method} is not possible on this address.`);
};

/** Turns everything thrown into `application/problem+json`; faults of ours are logged, never told. */
export function problemHandler(log: Logger): ErrorRequestHandler {
  return (error: unknown, _request, response, next) => {
    if (response.headersSent) {
      next(error);
      return;
    }
    const problem = error instanceof HttpProblem ? error : fromParser(error);
    if (problem.code === 'server-fault') log.error({ err: error }, 'request failed');
    if (problem.extra.retryAfter !== undefined)
      response.setHeader('Retry-After', String(problem.extra.retryAfter));
    response
      .status(problemCodes[problem.code])
      .type('application/problem+json')
      .send(JSON.stringify(bodyOf(problem)));
  };
}

/** Errors of the body parser and the router, which are plain errors with a type and a status. */
function fromParser(error: unknown): HttpProblem {
  if (typeof error === 'object' && error !== null) {
    const type = 'type' in error ? error.type : null;
    if (type === 'entity.too.large') return new HttpProblem('too-large', 'A document may have 4 MB at most.');
    if (type === 'entity.parse.failed') return new HttpProblem('malformed-json', 'The body is not JSON.');
    const status = 'status' in error ? error.status : null;
    if (status === 400) return new HttpProblem('malformed-request', 'The request cannot be read.');
    if (status === 415)
      return new HttpProblem('unsupported-media', 'Send JSON in UTF-8, without compression.');
  }
  return new HttpProblem('server-fault', 'The server failed. Try again; if it stays, tell the office.');
}
