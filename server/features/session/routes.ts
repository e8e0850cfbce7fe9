import { Router, type CookieOptions, type Request, type RequestHandler } from 'express';
import { parseCookies } from '../../http/cookies';
import { changeMeSchema, signInSchema, type Person, type Session } from '@shared/schemas/api';
import { HttpProblem, methodNotAllowed, parseBody } from '../../http/problems';
import type { SessionService } from './service';

const people = new WeakMap<Request, Person>();

/** Reads the cookie and remembers who asks; nobody is fine here. */
export function identify(service: SessionService): RequestHandler {
  return async (request, _response, next) => {
    const id = parseCookies(request.get('cookie')).get(service.cookieName);
    const person = id === undefined ? null : await service.resolve(id);
    if (person) people.set(request, person);
    next();
  };
}

/** Refuses whoever is not signed in. */
export const requirePerson: RequestHandler = (request, _response, next) => {
  personAsking(request);
  next();
};

/** The person who asks; throws 401 where nobody is signed in. */
export function personAsking(request: Request): Person {
  const person = people.get(request);
  if (!person) throw new HttpProblem('not-signed-in', 'Sign in first.');
  return person;
}

export function sessionRoutes(service: SessionService, secure: boolean, limitSignIn: RequestHandler): Router {
  const router = Router();
  const cookie = (request: Request): CookieOptions => ({
    httpOnly: true,
    sameSite: 'lax',
    secure: secure || request.secure,
    path: '/',
  });
  router
    .route('/session')
    .get((request, response) => {
      const answer: Session = { person: people.get(request) ?? null };
      response.json(answer);
    })
    .post(limitSignIn, async (request, response) => {
      const { email, password } = parseBody(signInSchema, request.body);
      const { id, person } = await service.signIn(email, password);
      response.cookie(service.cookieName, id, { ...cookie(request), maxAge: 30 * 24 * 3_600_000 });
      const answer: Session = { person };
      response.json(answer);
    })
    .delete(async (request, response) => {
      const id = parseCookies(request.get('cookie')).get(service.cookieName);
      if (id !== undefined) await service.signOut(id);
      response.clearCookie(service.cookieName, cookie(request));
      response.status(204).end();
    })
    .all(methodNotAllowed);
  router
    .route('/me')
    .patch(async (request, response) => {
      const { person, newSession } = await service.changeMe(
        personAsking(request),
        parseBody(changeMeSchema, request.body),
      );
      if (newSession !== null) {
        response.cookie(service.cookieName, newSession, { ...cookie(request), maxAge: 30 * 24 * 3_600_000 });
      }
      response.json(person);
    })
    .all(methodNotAllowed);
  return router;
}
