import type { Request, RequestHandler } from 'express';
import { HttpProblem } from './problems';

const changing = new Set(['POST', 'PUT', 'PATCH', 'DELETE']);

/** Refuses requests that change something and come from another site. */
export function refuseCrossOrigin(publicUrl: string | null): RequestHandler {
  const ours = publicUrl === null ? null : new URL(publicUrl).host;
  return (request, _response, next) => {
    if (changing.has(request.method) && !sameOrigin(request, ours)) {
      throw new HttpProblem(
        'cross-origin',
        'Requests that change something must come from the application itself.',
      );
    }
    next();
  };
}

function sameOrigin(request: Request, ours: string | null): boolean {
  const site = request.get('sec-fetch-site');
  if (site !== undefined && site !== 'same-origin' && site !== 'none') return false;
  const origin = request.get('origin');
  if (origin === undefined) return true;
  if (!URL.canParse(origin)) return false;
  const { host } = new URL(origin);
  return host === request.get('host') || host === ours;
}

/** Refuses bodies that are not JSON: a form on another site can send no JSON without asking first. */
export const requireJson: RequestHandler = (request, _response, next) => {
  const length = request.get('content-length');
  const hasBody = request.get('transfer-encoding') !== undefined || (length !== undefined && length !== '0');
  if (hasBody && changing.has(request.method) && !request.is(['application/json', '+json'])) {
    throw new HttpProblem('unsupported-media', 'Send the body as application/json.');
  }
  next();
};
