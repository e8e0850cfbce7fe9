import { copyFileSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Express } from 'express';
import pino from 'pino';
import supertest from 'supertest';
import { createApp, type Settings } from '../../server/app';
import { demoPeople, fillDemoOffice } from '../../server/cli/demo-office';
import { openDatabase, type OpenDatabase } from '../../server/db/open';
import { calculateMember } from '../../server/engine/calculate-member';
import { engineVersion } from '../../server/engine/version';
import { hashPassword } from '../../server/features/session/passwords';
import { sessionRepo } from '../../server/features/session/repo';

/** A demo office for one test, with a clock that the test moves. */
export interface Desk {
  app: Express;
  database: OpenDatabase;
  clock: { now: number };
  close: () => void;
}

let template: Promise<{ folder: string; file: string }> | null = null;

/** Hashing three passwords and calculating ten members takes a second: it is done once, then copied. */
async function makeTemplate(): Promise<{ folder: string; file: string }> {
  const folder = mkdtempSync(join(tmpdir(), 'seamwright-api-'));
  const file = join(folder, 'template.db');
  const database = openDatabase(file);
  await fillDemoOffice(database.db, start);
  sessionRepo(database.db).insert({
    id: 'odd',
    name: 'Odd Finch',
    email: 'odd@office.example',
    role: 'staff',
    active: true,
    units: 'metric',
    theme: 'system',
    passwordHash: await hashPassword(oddsPassword),
    createdAt: start,
  });
  database.close();
  return { folder, file };
}

const start = Date.now();
/** Of a colleague who is on no project. */
const oddsPassword = 'nobody asked me yet 4';

export async function openDesk(settings: Partial<Settings> = {}): Promise<Desk> {
  template ??= makeTemplate();
  const { folder, file } = await template;
  const own = mkdtempSync(join(folder, 'desk-'));
  const copy = join(own, 'office.db');
  copyFileSync(file, copy);
  const database = openDatabase(copy);
  const clock = { now: start };
  const app = createApp({
    database,
    calculate: calculateMember,
    engineVersion,
    clock: () => clock.now,
    log: pino({ level: 'silent' }),
    settings: {
      version: 'test',
      publicUrl: null,
      trustProxy: false,
      signInsPerMinute: null,
      requestsPerMinute: null,
      staticFolder: null,
      ...settings,
    },
  });
  return {
    app,
    database,
    clock,
    close: () => {
      database.close();
      rmSync(own, { recursive: true, force: true });
    },
  };
}

export function credentials(key: 'ines' | 'rolf' | 'mira' | 'odd'): { email: string; password: string } {
  if (key === 'odd') return { email: 'odd@office.example', password: oddsPassword };
  const person = demoPeople.find((p) => p.key === key);
  if (!person) throw new Error(`nobody is called ${key}`);
  return { email: person.email, password: person.password };
}

/** An agent that keeps its cookie, signed in. */
export async function signedIn(desk: Desk, key: Parameters<typeof credentials>[0]) {
  const agent = supertest.agent(desk.app);
  const answer = await agent.post('/api/session').send(credentials(key));
  if (answer.status !== 200) throw new Error(`${key} was not let in: ${answer.text}`);
  return agent;
}
