import { Router, type Request } from 'express';
import { saveDraftSchema } from '@shared/schemas/api';
import { HttpProblem, methodNotAllowed, parseBody } from '../../http/problems';
import { personAsking } from '../session/routes';
import type { MemberService } from './service';

export function memberRoutes(service: MemberService): Router {
  const router = Router();
  router
    .route('/projects/:id/members')
    .get((request, response) => {
      response.json(service.list(personAsking(request), request.params.id));
    })
    .all(methodNotAllowed);
  router
    .route('/members/:id')
    .get((request, response) => {
      const member = service.get(personAsking(request), request.params.id);
      response.setHeader('ETag', `"${member.version}"`);
      response.json(member);
    })
    .all(methodNotAllowed);
  router
    .route('/members/:id/draft')
    .put((request, response) => {
      const person = personAsking(request);
      const version = versionWanted(request);
      const { document } = parseBody(saveDraftSchema, request.body);
      const draft = service.save(person, request.params.id, document, version);
      response.setHeader('ETag', `"${draft.version}"`);
      response.json(draft);
    })
    .all(methodNotAllowed);
  return router;
}

/** The version in `If-Match` (RFC 9110, 13.1.1); null for `*`. */
function versionWanted(request: Request): number | null {
  const header = request.get('if-match')?.trim();
  if (header === undefined) {
    throw new HttpProblem(
      'if-match-missing',
      'Say in If-Match which version is saved over: the ETag that was read.',
    );
  }
  if (header === '*') return null;
  const version = /^(?:W\/)?"(\d{1,15})"$/.exec(header)?.[1];
  // An ETag that was never ours matches nothing.
  return version === undefined ? -1 : Number(version);
}
