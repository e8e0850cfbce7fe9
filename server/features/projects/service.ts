import { z } from 'zod';
import {
  memberStateSchema,
  projectSortSchema,
  type Person,
  type Project,
  type ProjectList,
} from '@shared/schemas/api';
import { may, type Assigned } from '@shared/roles';
import { HttpProblem } from '../../http/problems';
import type { MemberState, ProjectRepo, ProjectRow } from './repo';

/** The list's query: every part may be left out. */
export const projectListQuery = z.object({
  state: memberStateSchema.optional(),
  person: z.string().max(100).optional(),
  q: z.string().max(200).default(''),
  archived: z.enum(['true', 'false']).default('false'),
  sort: projectSortSchema.default('due'),
  cursor: z
    .string()
    .regex(/^\d{1,9}$/, { error: 'not a place in this list' })
    .optional(),
  limit: z.coerce.number().int().min(1).max(200).default(100),
});
export type ProjectListQuery = z.output<typeof projectListQuery>;

export interface ProjectService {
  list: (person: Person, query: ProjectListQuery) => ProjectList;
  /** the project, or 404 where there is none or it is not theirs to see */
  get: (person: Person, id: string) => Project;
  /** who is assigned, after the same check */
  assigned: (person: Person, id: string) => Assigned & { number: string; name: string };
}

export function projectService(repo: ProjectRepo): ProjectService {
  const visible = (person: Person, id: string): ProjectRow => {
    const row = repo.byId(id);
    if (!row || !may(person, 'see-project', row)) {
      throw new HttpProblem('not-found', 'There is no such project, or it is not yours to see.');
    }
    return row;
  };
  return {
    list: (person, query) => {
      const names = repo.names();
      const byProject = new Map<string, MemberState[]>();
      for (const m of repo.memberStates()) {
        const known = byProject.get(m.projectId);
        if (known) known.push(m);
        else byProject.set(m.projectId, [m]);
      }
      const words = query.q.toLowerCase().split(/\s+/).filter(Boolean);
      const found = repo
        .all()
        .filter((row) => may(person, 'see-project', row) && row.archived === (query.archived === 'true'))
        .filter(
          (row) =>
            query.person === undefined || row.designerId === query.person || row.checkerId === query.person,
        )
        .filter((row) => matches(row, byProject.get(row.id) ?? [], words))
        .map((row) => projectOf(row, byProject.get(row.id) ?? [], names))
        .filter(({ members }) => query.state === undefined || (members[query.state] ?? 0) > 0)
        .sort(order(query.sort));
      const start = Number(query.cursor ?? '0');
      const end = start + query.limit;
      return { items: found.slice(start, end), nextCursor: end < found.length ? String(end) : null };
    },
    get: (person, id) =>
      projectOf(
        visible(person, id),
        repo.memberStates().filter((m) => m.projectId === id),
        repo.names(),
      ),
    assigned: (person, id) => {
      const { designerId, checkerId, number, name } = visible(person, id);
      return { designerId, checkerId, number, name };
    },
  };
}

/** Every word typed has to stand somewhere in number, name, client or a member's mark or title. */
function matches(row: ProjectRow, members: readonly MemberState[], words: readonly string[]): boolean {
  const text = [row.number, row.name, row.client, ...members.flatMap((m) => [m.mark, m.title])]
    .join('\n')
    .toLowerCase();
  return words.every((word) => text.includes(word));
}

function projectOf(
  row: ProjectRow,
  members: readonly MemberState[],
  names: ReadonlyMap<string, string>,
): Project {
  const ref = (id: string | null) => (id === null ? null : { id, name: names.get(id) ?? '' });
  const counts: Project['members'] = {};
  for (const { state } of members) counts[state] = (counts[state] ?? 0) + 1;
  const last = members.reduce<MemberState | null>(
    (a, b) => (a === null || b.savedAt > a.savedAt ? b : a),
    null,
  );
  return {
    id: row.id,
    number: row.number,
    name: row.name,
    client: row.client,
    siteAddress: row.siteAddress,
    archived: row.archived,
    designer: ref(row.designerId),
    checker: ref(row.checkerId),
    due: row.due,
    members: counts,
    lastChange: last ? { at: new Date(last.savedAt).toISOString(), by: ref(last.savedBy) } : null,
    createdAt: new Date(row.createdAt).toISOString(),
  };
}

/** Order by the key; what is missing comes last either way, and the number settles ties. */
function order(sort: ProjectListQuery['sort']): (a: Project, b: Project) => number {
  const down = sort.startsWith('-');
  const key = (p: Project): string | number | null => {
    switch (sort.replace('-', '')) {
      case 'name':
        return p.name.toLowerCase();
      case 'client':
        return p.client.toLowerCase();
      case 'members':
        return Object.values(p.members).reduce((sum, n) => sum + n, 0);
      case 'designer':
        return p.designer?.name.toLowerCase() ?? null;
      case 'checker':
        return p.checker?.name.toLowerCase() ?? null;
      case 'due':
        return p.due;
      case 'change':
        return p.lastChange?.at ?? null;
      default:
        return p.number;
    }
  };
  return (a, b) => {
    const x = key(a);
    const y = key(b);
    if (x !== y) {
      if (x === null) return 1;
      if (y === null) return -1;
      return (x < y ? -1 : 1) * (down ? -1 : 1);
    }
    return a.number < b.number ? -1 : 1;
  };
}
