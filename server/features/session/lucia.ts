import { DrizzleSQLiteAdapter } from '@lucia-auth/adapter-drizzle';
import { Lucia, TimeSpan } from 'lucia';
import type { Db } from '../../db/open';
import { people, sessions } from '../../db/schema';

/** The only file that knows the session library. A session is an id, a person's id, and two times. */

export interface SessionRow {
  id: string;
  personId: string;
  startedAt: number;
  usedAt: number;
}

export interface Sessions {
  cookieName: string;
  create: (personId: string, now: number) => Promise<string>;
  find: (id: string) => Promise<SessionRow | null>;
  end: (id: string) => Promise<void>;
  endAllOf: (personId: string) => Promise<void>;
}

/** Sessions last 30 days here; the idle time is looked after by the service. */
export function createSessions(db: Db): Sessions {
  const lucia = new Lucia(new DrizzleSQLiteAdapter(db, sessions, people), {
    sessionExpiresIn: new TimeSpan(30, 'd'),
    sessionCookie: { name: 'seamwright_session' },
    getSessionAttributes: ({ startedAt, usedAt }) => ({ startedAt, usedAt }),
  });
  return {
    cookieName: lucia.sessionCookieName,
    create: async (personId, now) =>
      (await lucia.createSession(personId, { startedAt: now, usedAt: now })).id,
    find: async (id) => {
      const { session } = await lucia.validateSession(id);
      if (!session) return null;
      return {
        id: session.id,
        personId: session.userId,
        startedAt: session.startedAt,
        usedAt: session.usedAt,
      };
    },
    end: (id) => lucia.invalidateSession(id),
    endAllOf: (personId) => lucia.invalidateUserSessions(personId),
  };
}

declare module 'lucia' {
  interface Register {
    Lucia: Lucia<{ startedAt: number; usedAt: number }>;
    DatabaseSessionAttributes: { startedAt: number; usedAt: number };
  }
}
