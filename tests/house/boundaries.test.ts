import { readdirSync } from 'node:fs';
import { dirname, posix, relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import { ESLint } from 'eslint';
import tseslint from 'typescript-eslint';
import { describe, expect, it } from 'vitest';

/**
 * Plants an import in a file that does not exist and asks ESLint, with the project's own settings, what it says.
 * Type information is switched off, since a planted file is in no TypeScript project; the import rules need none.
 */
const root = fileURLToPath(new URL('../../', import.meta.url));
const eslint = new ESLint({ cwd: root, overrideConfig: [tseslint.configs.disableTypeChecked] });

async function rulesBroken(filePath: string, code: string): Promise<string[]> {
  const results = await eslint.lintText(code, { filePath: `${root}${filePath}` });
  return results.flatMap((result) => result.messages.map((message) => message.ruleId ?? message.message));
}

/** A real file below a folder, so that a planted import resolves; a made-up target would be caught for being unknown. */
function someFile(folder: string, wanted: RegExp = /^(?!.*\.test\.).*\.tsx?$/): string {
  const found = readdirSync(`${root}${folder}`, { recursive: true, encoding: 'utf8' })
    .map((name) => posix.join(folder, name.replaceAll('\\', '/')))
    .filter((name) => wanted.test(name))
    .sort()[0];
  if (found === undefined) throw new Error(`no file under ${folder} matches ${String(wanted)}`);
  return found;
}

function specifier(from: string, to: string): string {
  const path = relative(dirname(from), to)
    .replaceAll('\\', '/')
    .replace(/\.tsx?$/, '');
  return path.startsWith('.') ? path : `./${path}`;
}

const importOf = (from: string, to: string): string =>
  `import * as planted from '${specifier(from, to)}';\nexport const used = planted;\n`;
const importOfPackage = (name: string): string =>
  `import * as planted from '${name}';\nexport const used = planted;\n`;

const features = readdirSync(`${root}src/features`).sort();
const [one = '', other = ''] = features;

const feature = `src/features/${one}/planted.ts`;
const engine = 'server/engine/planted.ts';
const second = 'server/engine/second-method/planted.ts';
const shared = 'shared/planted.ts';
const service = 'server/features/members/planted.ts';
const routes = 'server/features/members/routes.ts';
const repo = 'server/features/members/repo.ts';
const cli = 'server/cli/planted.ts';
const http = 'server/http/planted.ts';
const app = 'src/app/planted.ts';

const engineFile = 'server/engine/calculate-member.ts';
const secondFile = someFile('server/engine/second-method');
const sharedFile = 'shared/schemas/member.ts';
const dbFile = someFile('server/db');
const routesFile = someFile('server/features', /routes\.ts$/);
const repoFile = someFile('server/features', /repo\.ts$/);

describe('imports against the arrows are errors', () => {
  const refused: [string, string, string][] = [
    ['the client never imports the server', feature, engineFile],
    ['not even the app does', app, routesFile],
    ['a feature never imports another', feature, someFile(`src/features/${other}`)],
    ['a feature never imports the app', feature, someFile('src/app')],
    ['drawing and controls know no feature', 'src/components/planted.ts', someFile(`src/features/${one}`)],
    ['lib knows no feature', 'src/lib/planted.ts', someFile(`src/features/${one}`)],
    ['lib knows no component', 'src/lib/planted.ts', someFile('src/components')],
    ['shared imports nothing of the server', shared, engineFile],
    ['shared imports nothing of the client', shared, someFile('src/lib')],
    ['the engine knows no feature', engine, routesFile],
    ['the engine knows no database', engine, dbFile],
    ['the engine knows no HTTP', engine, someFile('server/http')],
    ['the engine knows no command', engine, 'server/cli/calc.ts'],
    ['the engine does not use the second method', engine, secondFile],
    ['the second method does not use the engine', second, engineFile],
    ['routes do not reach the database', routes, dbFile],
    ['a service does not reach the database', service, dbFile],
    ['a service does not reach the repo of another feature', 'server/features/planted/service.ts', repoFile],
    ['http knows no feature', http, routesFile],
    ['the database knows no feature', 'server/db/planted.ts', routesFile],
    ['nothing imports a test', engine, 'tests/house/boundaries.test.ts'],
  ];
  it.each(refused)('%s', async (_name, from, to) => {
    expect(await rulesBroken(from, importOf(from, to))).toEqual(['boundaries/dependencies']);
  });

  const refusedPackages: [string, string, string][] = [
    ['express in the engine', engine, 'express'],
    ['drizzle in the engine', engine, 'drizzle-orm'],
    ['mathjs in the engine', engine, 'mathjs'],
    ['files in the engine', engine, 'node:fs'],
    ['files in the second method', second, 'node:fs'],
    ['drizzle in routes', routes, 'drizzle-orm'],
    ['drizzle in a service', service, 'drizzle-orm/better-sqlite3'],
    ['the driver in a service', service, 'better-sqlite3'],
    ['lucia in a service', service, 'lucia'],
    ['the adapter in a service', service, '@lucia-auth/adapter-drizzle'],
    ['react in the server', service, 'react'],
    ['express in the browser', feature, 'express'],
    ['files in the browser', feature, 'node:fs'],
    ['express in shared', shared, 'express'],
    ['react in shared', shared, 'react'],
  ];
  it.each(refusedPackages)('%s', async (_name, from, name) => {
    expect(await rulesBroken(from, importOfPackage(name))).toEqual(['boundaries/dependencies']);
  });

  it('sees types, exports and dynamic imports too', async () => {
    const path = specifier(engine, routesFile);
    expect(
      await rulesBroken(
        engine,
        `import type * as planted from '${path}';\nexport type Used = typeof planted;\n`,
      ),
    ).toEqual(['boundaries/dependencies']);
    expect(await rulesBroken(engine, `export * from '${path}';\n`)).toEqual(['boundaries/dependencies']);
    expect(await rulesBroken(engine, `export const late = () => import('${path}');\n`)).toEqual([
      'boundaries/dependencies',
    ]);
  });
});

describe('imports along the arrows are not', () => {
  const allowed: [string, string, string][] = [
    ['feature to shared', feature, sharedFile],
    ['feature to itself', feature, someFile(`src/features/${one}`)],
    ['feature to components', feature, someFile('src/components')],
    ['app to a feature', app, someFile(`src/features/${one}`)],
    ['engine to itself', engine, 'server/engine/version.ts'],
    ['engine to shared', engine, sharedFile],
    ['second method to shared', second, sharedFile],
    ['second method to itself', second, secondFile],
    ['service to the engine', service, engineFile],
    ['repo to the database', repo, dbFile],
    ['cli to the engine', cli, engineFile],
    ['cli to the database', cli, dbFile],
  ];
  it.each(allowed)('%s', async (_name, from, to) => {
    expect(await rulesBroken(from, importOf(from, to))).toEqual([]);
  });

  it.each([
    ['drizzle in a repo', repo, 'drizzle-orm'],
    ['express in routes', routes, 'express'],
    ['react in a feature', feature, 'react'],
    ['zod in shared', shared, 'zod'],
  ])('%s', async (_name, from, name) => {
    expect(await rulesBroken(from, importOfPackage(name))).toEqual([]);
  });

  it('the alias of shared is understood, both ways', async () => {
    const code = `import type { Piece } from '@shared/schemas/member';\nexport type Used = Piece;\n`;
    expect(await rulesBroken(engine, code)).toEqual([]);
    const back = `import * as planted from '@/${someFile('src/lib')
      .replace(/^src\//, '')
      .replace(/\.tsx?$/, '')}';\nexport const used = planted;\n`;
    expect(await rulesBroken(shared, back)).toEqual(['boundaries/dependencies']);
  });
});

describe('the engine is pure', () => {
  it.each([
    ['the clock', 'export const now = () => Date.now();', 'no-restricted-globals'],
    ['a date', 'export const today = () => new Date();', 'no-restricted-globals'],
    ['the stopwatch', 'export const t = () => performance.now();', 'no-restricted-globals'],
    ['chance', 'export const r = () => Math.random();', 'no-restricted-properties'],
    ['the process', 'export const e = () => process.env;', 'no-restricted-globals'],
    [
      'the language of the machine',
      'export const s = (x: number) => x.toLocaleString();',
      'no-restricted-properties',
    ],
  ])('%s is refused', async (_name, code, rule) => {
    expect(await rulesBroken(engine, code)).toEqual([rule]);
    expect(await rulesBroken(second, code)).toEqual([rule]);
    expect(await rulesBroken(service, code)).toEqual([]);
  });
});

// put together here, so that a search of the project for either finds only real ones
const switchOff = ['eslint', 'disable'].join('-');
const leftOut = ['it', 'skip'].join('.');

describe('habits are errors, and a comment does not switch them off', () => {
  it.each([
    ['any', 'export const f = (x: any): unknown => x;', '@typescript-eslint/no-explicit-any'],
    [
      'non-null',
      'export const f = (x: string | null): string => x!;',
      '@typescript-eslint/no-non-null-assertion',
    ],
    ['unused', 'const left = 1;', '@typescript-eslint/no-unused-vars'],
    ['default export', 'export default 1;', 'no-restricted-syntax'],
  ])('%s', async (_name, code, rule) => {
    expect(await rulesBroken(service, code)).toEqual([rule]);
    // ESLint reports the comment that it passed over, and then the fault all the same
    expect(await rulesBroken(service, `/* ${switchOff} */\n${code}`)).toContain(rule);
  });

  it('a test that is left out', async () => {
    const code = `import { it } from 'vitest';\n${leftOut}('x', () => {});\n`;
    expect(await rulesBroken('tests/house/planted.test.ts', code)).toContain('no-restricted-syntax');
  });
});
