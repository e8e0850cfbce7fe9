import { Router } from 'express';
import { saveDraftSchema } from '@shared/schemas/api';
import { may } from '@shared/roles';
import type { Outcome } from '../../engine/calculate-member';
import { HttpProblem, methodNotAllowed, parseBody } from '../../http/problems';
import { personAsking } from '../session/routes';

/** Calculates a document and keeps nothing. */
export function calculationRoutes(calculate: (document: unknown) => Outcome): Router {
  const router = Router();
  router
    .route('/calculations')
    .post((request, response) => {
      if (!may(personAsking(request), 'calculate', null)) {
        throw new HttpProblem('not-yours', 'You may not calculate here.');
      }
      const { document } = parseBody(saveDraftSchema, request.body);
      const outcome = calculate(document);
      if (!outcome.ok) {
        throw new HttpProblem('refused', outcome.refusal.message, { issues: outcome.refusal.issues });
      }
      response.json(outcome.result);
    })
    .all(methodNotAllowed);
  return router;
}
