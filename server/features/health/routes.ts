import { Router } from 'express';
import { HttpProblem, methodNotAllowed } from '../../http/problems';

/** Whether the server works, for whoever watches it. */
export function healthRoutes(ping: () => void, version: string, engine: string): Router {
  const router = Router();
  router
    .route('/health')
    .get((_request, response) => {
      try {
        ping();
      } catch {
        throw new HttpProblem('database-away', 'The database does not answer.');
      }
      response.json({ status: 'ok', version, engine });
    })
    .all(methodNotAllowed);
  return router;
}
