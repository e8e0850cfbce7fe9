import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import pino from 'pino';
import type { Page } from 'playwright-core';
import { createApp } from '../../server/app';
import { demoPeople, fillDemoOffice } from '../../server/cli/demo-office';
import { openDatabase } from '../../server/db/open';
import { calculateMember } from '../../server/engine/calculate-member';
import { engineVersion } from '../../server/engine/version';

const root = fileURLToPath(new URL('../..', import.meta.url));

/** The demo office, served for one test file from a folder that goes with it. */
export interface Office {
  address: string;
  close: () => Promise<void>;
}

/** Builds the client, fills a fresh database, and serves both on a port that is free. */
export async function openOffice(): Promise<Office> {
  const folder = mkdtempSync(join(tmpdir(), 'seamwright-e2e-'));
  const client = join(folder, 'client');
  execFileSync(
    process.execPath,
    [
      join(root, 'node_modules/vite/bin/vite.js'),
      'build',
      '--outDir',
      client,
      '--emptyOutDir',
      '--logLevel',
      'warn',
    ],
    { cwd: root, stdio: 'inherit', env: { ...process.env, NODE_ENV: 'production' } },
  );
  const database = openDatabase(join(folder, 'office.db'));
  await fillDemoOffice(database.db, Date.now());
  const app = createApp({
    database,
    calculate: calculateMember,
    engineVersion,
    clock: () => Date.now(),
    log: pino({ level: 'silent' }),
    settings: {
      version: 'test',
      publicUrl: null,
      trustProxy: false,
      signInsPerMinute: null,
      requestsPerMinute: null,
      staticFolder: client,
    },
  });
  const server = createServer(app);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const bound = server.address();
  if (bound === null || typeof bound === 'string') throw new Error('the server has no port');
  return {
    address: `http://127.0.0.1:${bound.port}`,
    close: async () => {
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
      database.close();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}

/** One of the demo office's people. */
export function personCalled(key: (typeof demoPeople)[number]['key']) {
  const person = demoPeople.find((one) => one.key === key);
  if (!person) throw new Error(`nobody is called ${key}`);
  return person;
}

/** Signs in at the page's context without the form. */
export async function signIn(
  page: Page,
  office: Office,
  key: (typeof demoPeople)[number]['key'],
): Promise<void> {
  const { email, password } = personCalled(key);
  const answer = await page.request.post(`${office.address}/api/session`, { data: { email, password } });
  if (!answer.ok()) throw new Error(`signing in: ${answer.status()} ${await answer.text()}`);
}

/** A member as the interface answers it to the page's person. */
export async function memberOf(page: Page, office: Office, id: string) {
  const answer = await page.request.get(`${office.address}/api/members/${id}`);
  if (!answer.ok()) throw new Error(`reading ${id}: ${answer.status()} ${await answer.text()}`);
  return answer.json();
}
