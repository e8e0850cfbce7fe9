import { and, eq } from 'drizzle-orm';
import type { Db } from '../../db/open';
import { members, people } from '../../db/schema';

export type MemberRow = typeof members.$inferSelect;
export type Saved = Pick<
  MemberRow,
  'document' | 'title' | 'result' | 'refusal' | 'engine' | 'outcome' | 'utilisation' | 'savedAt' | 'savedBy'
>;

const summary = {
  id: members.id,
  projectId: members.projectId,
  mark: members.mark,
  title: members.title,
  state: members.state,
  revision: members.revision,
  outcome: members.outcome,
  utilisation: members.utilisation,
  savedAt: members.savedAt,
  savedBy: members.savedBy,
};

export function memberRepo(db: Db) {
  return {
    byId: (id: string): MemberRow | undefined => db.select().from(members).where(eq(members.id, id)).get(),
    ofProject: (projectId: string) =>
      db.select(summary).from(members).where(eq(members.projectId, projectId)).all(),
    insert: (row: typeof members.$inferInsert): void => {
      db.insert(members).values(row).run();
    },
    /** Saves over one version and no other; false where somebody else has saved since. */
    saveOver: (id: string, version: number, saved: Saved): boolean =>
      db
        .update(members)
        .set({ ...saved, version: version + 1 })
        .where(and(eq(members.id, id), eq(members.version, version)))
        .run().changes === 1,
    /** Keeps a result that a newer engine gave, if the document is still the same. */
    keepResult: (
      id: string,
      version: number,
      saved: Omit<Saved, 'document' | 'title' | 'savedAt' | 'savedBy'>,
    ): void => {
      db.update(members)
        .set(saved)
        .where(and(eq(members.id, id), eq(members.version, version)))
        .run();
    },
    nameOf: (personId: string): string =>
      db.select({ name: people.name }).from(people).where(eq(people.id, personId)).get()?.name ?? '',
  };
}
export type MemberRepo = ReturnType<typeof memberRepo>;
