/** The stable codes of problems (RFC 9457) that the HTTP interface answers with, and the status of each. */
export const problemCodes = {
  'malformed-json': 400,
  'malformed-request': 400,
  'if-match-missing': 400,
  'not-signed-in': 401,
  'wrong-credentials': 401,
  'cross-origin': 403,
  'not-yours': 403,
  'not-found': 404,
  'method-not-allowed': 405,
  'saved-by-another': 412,
  'too-large': 413,
  'unsupported-media': 415,
  'invalid-body': 422,
  refused: 422,
  'account-paused': 423,
  'slow-down': 429,
  'server-fault': 500,
  'database-away': 503,
} as const;
export type ProblemCode = keyof typeof problemCodes;
