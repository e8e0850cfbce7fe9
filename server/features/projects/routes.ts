import { Router } from 'express';
import { methodNotAllowed, parseQuery } from '../../http/problems';
import { personAsking } from '../session/routes';
import { projectListQuery, type ProjectService } from './service';

export function projectRoutes(service: ProjectService): Router {
  const router = Router();
  router
    .route('/projects')
    .get((request, response) => {
      const person = personAsking(request);
      response.json(service.list(person, parseQuery(projectListQuery, request.query)));
    })
    .all(methodNotAllowed);
  router
    .route('/projects/:id')
    .get((request, response) => {
      response.json(service.get(personAsking(request), request.params.id));
    })
    .all(methodNotAllowed);
  return router;
}
