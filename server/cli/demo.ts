import { execFileSync } from 'node:child_process';
import { existsSync, readdirSync, rmSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { openDatabase } from '../db/open';
import { readEnvironment } from '../http/environment';
import { serve, stopOnSignals } from '../serve';
import { demoPeople, fillDemoOffice } from './demo-office';

/**
 * The demo: builds the client where needed, makes a fresh database of its own, fills it with an invented office,
 * says how to sign in, and serves. What was changed in an earlier demo is gone.
 */
const root = fileURLToPath(new URL('../..', import.meta.url));

function newest(path: string): number {
  const found = statSync(path);
  if (!found.isDirectory()) return found.mtimeMs;
  return Math.max(0, ...readdirSync(path).map((name) => newest(join(path, name))));
}

function buildClient(): void {
  const page = join(root, 'dist/index.html');
  const sources = [
    'src',
    'shared',
    'public',
    'index.html',
    'vite.config.ts',
    'tailwind.config.ts',
    'package.json',
  ];
  const changed = Math.max(
    ...sources
      .map((name) => join(root, name))
      .filter(existsSync)
      .map(newest),
  );
  if (existsSync(page) && statSync(page).mtimeMs >= changed) return;
  console.log('Building the client …');
  execFileSync(
    process.execPath,
    [join(root, 'node_modules/vite/bin/vite.js'), 'build', '--logLevel', 'warn'],
    {
      cwd: root,
      stdio: 'inherit',
    },
  );
}

try {
  const environment = readEnvironment({ LOG_LEVEL: 'warn', ...process.env });
  buildClient();
  // Never DATABASE_FILE: the demo begins by deleting its file.
  const file = join(root, 'data/demo.db');
  for (const end of ['', '-wal', '-shm']) rmSync(`${file}${end}`, { force: true });
  const database = openDatabase(file);
  await fillDemoOffice(database.db, Date.now());
  const serving = await serve(environment, database);
  stopOnSignals(serving);
  console.log(`\nSeamwright, demo office: ${serving.address}\n`);
  console.log('Sign in as');
  for (const { name, does, email, password } of demoPeople) {
    console.log(`  ${name.padEnd(12)} ${does.padEnd(15)} ${email.padEnd(22)} ${password}`);
  }
  console.log('\nCtrl+C stops it. The office is made anew at every start.');
} catch (error) {
  console.error(error instanceof Error ? error.message : error);
  process.exit(1);
}
