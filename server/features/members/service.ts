import { documentLimits } from '@shared/schemas/member';
import type { CalculationResult, Status } from '@shared/schemas/result';
import type { Change, Draft, Member, MemberList, Person } from '@shared/schemas/api';
import type { Issue, Refusal } from '@shared/schemas/refusal';
import { may } from '@shared/roles';
import type { Outcome } from '../../engine/calculate-member';
import { HttpProblem } from '../../http/problems';
import type { ProjectService } from '../projects/service';
import { differingPaths } from './differences';
import type { MemberRepo, MemberRow, Saved } from './repo';

export interface MemberDeps {
  repo: MemberRepo;
  projects: ProjectService;
  calculate: (document: unknown) => Outcome;
  engineVersion: string;
  clock: () => number;
}

export interface MemberService {
  list: (person: Person, projectId: string) => MemberList;
  get: (person: Person, id: string) => Member;
  /** saves a draft over `version`; null saves over whatever stands */
  save: (person: Person, id: string, document: Record<string, unknown>, version: number | null) => Draft;
}

type Worked = Pick<Saved, 'result' | 'refusal' | 'engine' | 'outcome' | 'utilisation'>;

export function memberService(deps: MemberDeps): MemberService {
  const { repo, projects, clock } = deps;

  const find = (person: Person, id: string) => {
    const row = repo.byId(id);
    const missing = new HttpProblem('not-found', 'There is no such member, or it is not yours to see.');
    if (!row) throw missing;
    let project;
    try {
      project = projects.assigned(person, row.projectId);
    } catch {
      throw missing;
    }
    return { row: upToDate(row), project };
  };

  /** A result of an older engine is worked out again: a draft shows what this engine says. */
  const upToDate = (row: MemberRow): MemberRow => {
    if (row.engine === deps.engineVersion) return row;
    const worked = workOut(deps, JSON.parse(row.document));
    repo.keepResult(row.id, row.version, worked);
    return { ...row, ...worked };
  };

  const changeOf = (row: Pick<MemberRow, 'savedAt' | 'savedBy'>): Change => ({
    at: new Date(row.savedAt).toISOString(),
    by: row.savedBy === null ? null : { id: row.savedBy, name: repo.nameOf(row.savedBy) },
  });

  const draftOf = (row: MemberRow): Draft => {
    const refusal = row.refusal === null ? null : parseRefusal(row.refusal);
    return {
      document: parseObject(row.document),
      result: row.result === null ? null : parseResult(row.result),
      refusal: refusal?.message ?? null,
      issues: refusal?.issues ?? [],
      version: row.version,
      saved: changeOf(row),
    };
  };

  const summaryOf = (row: Omit<MemberRow, 'document' | 'result' | 'refusal' | 'version' | 'engine'>) => ({
    id: row.id,
    projectId: row.projectId,
    mark: row.mark,
    title: row.title,
    state: row.state,
    revision: row.revision,
    outcome: row.outcome,
    utilisation: row.utilisation,
    lastChange: changeOf(row),
  });

  return {
    list: (person, projectId) => {
      projects.assigned(person, projectId);
      const items = repo.ofProject(projectId).map(summaryOf).sort(byMark);
      return { items, nextCursor: null };
    },
    get: (person, id) => {
      const { row, project } = find(person, id);
      return {
        ...summaryOf(row),
        ...draftOf(row),
        project: { id: row.projectId, number: project.number, name: project.name },
        may: { edit: row.state === 'draft' && may(person, 'edit-draft', project) },
      };
    },
    save: (person, id, document, version) => {
      const { row, project } = find(person, id);
      if (!may(person, 'edit-draft', project)) {
        throw new HttpProblem('not-yours', 'Only the project’s designer may change this member.');
      }
      const text = JSON.stringify(document);
      if (Buffer.byteLength(text) > documentLimits.bytes) {
        throw new HttpProblem('too-large', 'A document may have 4 MB at most.');
      }
      const base = version ?? row.version;
      const saved: Saved = {
        ...workOut(deps, document),
        document: text,
        title: typeof document.title === 'string' ? document.title.slice(0, documentLimits.text) : row.title,
        savedAt: clock(),
        savedBy: person.id,
      };
      if (base !== row.version || !repo.saveOver(id, base, saved)) {
        const now = repo.byId(id) ?? row;
        const change = changeOf(now);
        throw new HttpProblem(
          'saved-by-another',
          `${change.by?.name ?? 'Somebody'} saved this member in the meantime; nothing of yours was saved.`,
          {
            conflict: {
              version: now.version,
              saved: change,
              paths: differingPaths(JSON.parse(now.document), document),
            },
          },
        );
      }
      return draftOf(repo.byId(id) ?? row);
    },
  };
}

/** Calculates a document for keeping: a document that is refused is kept with its issues. */
export function workOut(
  { calculate, engineVersion }: Pick<MemberDeps, 'calculate' | 'engineVersion'>,
  document: unknown,
): Worked {
  const outcome = calculate(document);
  if (!outcome.ok) {
    return {
      result: null,
      refusal: JSON.stringify(outcome.refusal),
      engine: engineVersion,
      outcome: 'refused',
      utilisation: null,
    };
  }
  const { interfaces } = outcome.result;
  const statuses = new Set<Status>(interfaces.map((i) => i.status));
  return {
    result: JSON.stringify(outcome.result),
    refusal: null,
    engine: engineVersion,
    outcome: statuses.has('over') ? 'over' : statuses.has('advice') ? 'advice' : 'ok',
    utilisation: interfaces.reduce((most, i) => Math.max(most, i.utilisation), 0),
  };
}

/** B2 before B10. */
function byMark(a: { mark: string }, b: { mark: string }): number {
  return a.mark.localeCompare(b.mark, 'en', { numeric: true });
}

// What these read was written by `workOut` and `save` above, from values that had these types.
const parseResult = (text: string): CalculationResult => JSON.parse(text) as CalculationResult;
const parseRefusal = (text: string): Refusal & { issues: Issue[] } => JSON.parse(text) as Refusal;
const parseObject = (text: string): Record<string, unknown> => JSON.parse(text) as Record<string, unknown>;
