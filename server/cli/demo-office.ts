import { readFileSync } from 'node:fs';
import { z } from 'zod';
import type { Db } from '../db/open';
import { calculateMember } from '../engine/calculate-member';
import { engineVersion } from '../engine/version';
import { memberRepo } from '../features/members/repo';
import { workOut } from '../features/members/service';
import { projectRepo } from '../features/projects/repo';
import { hashPassword } from '../features/session/passwords';
import { sessionRepo } from '../features/session/repo';

/** The demo office's people. All of it is invented; nobody can sign in with these anywhere else. */
export const demoPeople = [
  {
    key: 'ines',
    name: 'Ines Vale',
    role: 'lead',
    email: 'ines@office.example',
    password: 'spruce and larch 1',
    does: 'lead engineer',
  },
  {
    key: 'rolf',
    name: 'Rolf Amber',
    role: 'staff',
    email: 'rolf@office.example',
    password: 'nailed twice over 2',
    does: 'designer',
  },
  {
    key: 'mira',
    name: 'Mira Stone',
    role: 'staff',
    email: 'mira@office.example',
    password: 'every line by hand 3',
    does: 'checker',
  },
] as const;

const officeSchema = z.object({
  projects: z.array(
    z.object({
      number: z.string(),
      name: z.string(),
      client: z.string(),
      siteAddress: z.string(),
      designer: z.string(),
      checker: z.string(),
      due: z.iso.date().nullable(),
    }),
  ),
  members: z.array(z.object({ file: z.string(), project: z.string(), mark: z.string() })),
});

const examples = new URL('../../examples/', import.meta.url);

/** Reads one of the example members, or the office's list of them. */
export function readExample(file: string): unknown {
  return JSON.parse(readFileSync(new URL(file, examples), 'utf8'));
}

/** Fills an empty database with the demo office. Ids count up, so that links stay from one start to the next. */
export async function fillDemoOffice(db: Db, now: number): Promise<void> {
  const office = officeSchema.parse(readExample('office.json'));
  const sessions = sessionRepo(db);
  const projects = projectRepo(db);
  const members = memberRepo(db);
  for (const { key, name, role, email, password } of demoPeople) {
    sessions.insert({
      id: key,
      name,
      role,
      email,
      active: true,
      units: 'metric',
      theme: 'system',
      passwordHash: await hashPassword(password),
      createdAt: now,
    });
  }
  const ids = new Map<string, string>();
  office.projects.forEach((project, i) => {
    const id = `p${i + 1}`;
    ids.set(project.number, id);
    projects.insert({
      id,
      number: project.number,
      name: project.name,
      client: project.client,
      siteAddress: project.siteAddress,
      designerId: project.designer,
      checkerId: project.checker,
      due: project.due,
      createdAt: now,
    });
  });
  office.members.forEach(({ file, project, mark }, i) => {
    const document = readExample(file);
    const title =
      typeof document === 'object' &&
      document !== null &&
      'title' in document &&
      typeof document.title === 'string'
        ? document.title
        : mark;
    members.insert({
      id: `m${i + 1}`,
      projectId: ids.get(project) ?? '',
      mark,
      title,
      state: 'draft',
      revision: 'A',
      document: JSON.stringify(document),
      version: 1,
      ...workOut({ calculate: calculateMember, engineVersion }, document),
      savedAt: now - i * 3_600_000,
      savedBy: 'rolf',
    });
  });
}
