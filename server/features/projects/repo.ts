import { eq } from 'drizzle-orm';
import type { Db } from '../../db/open';
import { members, people, projects } from '../../db/schema';

export type ProjectRow = typeof projects.$inferSelect;

export interface MemberState {
  projectId: string;
  state: (typeof members.$inferSelect)['state'];
  mark: string;
  title: string;
  savedAt: number;
  savedBy: string | null;
}

export function projectRepo(db: Db) {
  return {
    all: (): ProjectRow[] => db.select().from(projects).all(),
    byId: (id: string): ProjectRow | undefined => db.select().from(projects).where(eq(projects.id, id)).get(),
    insert: (row: typeof projects.$inferInsert): void => {
      db.insert(projects).values(row).run();
    },
    /** what the list tells of members, without their documents */
    memberStates: (): MemberState[] =>
      db
        .select({
          projectId: members.projectId,
          state: members.state,
          mark: members.mark,
          title: members.title,
          savedAt: members.savedAt,
          savedBy: members.savedBy,
        })
        .from(members)
        .all(),
    names: (): Map<string, string> =>
      new Map(
        db
          .select({ id: people.id, name: people.name })
          .from(people)
          .all()
          .map(({ id, name }) => [id, name]),
      ),
  };
}
export type ProjectRepo = ReturnType<typeof projectRepo>;
