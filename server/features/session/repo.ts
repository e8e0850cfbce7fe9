import { eq } from 'drizzle-orm';
import type { Db } from '../../db/open';
import { people, sessions } from '../../db/schema';

export type PersonRow = typeof people.$inferSelect;

/** People and the time their sessions were last used. */
export function sessionRepo(db: Db) {
  return {
    byEmail: (email: string): PersonRow | undefined =>
      db.select().from(people).where(eq(people.email, email.trim().toLowerCase())).get(),
    byId: (id: string): PersonRow | undefined => db.select().from(people).where(eq(people.id, id)).get(),
    insert: (row: typeof people.$inferInsert): void => {
      db.insert(people).values(row).run();
    },
    update: (id: string, change: Partial<Omit<PersonRow, 'id'>>): void => {
      db.update(people).set(change).where(eq(people.id, id)).run();
    },
    touch: (sessionId: string, usedAt: number): void => {
      db.update(sessions).set({ usedAt }).where(eq(sessions.id, sessionId)).run();
    },
  };
}
export type SessionRepo = ReturnType<typeof sessionRepo>;
