import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';

/** What has to be true of the files themselves, so that a fresh clone works on any machine. */
const root = fileURLToPath(new URL('../../', import.meta.url));
const read = (path: string): string => readFileSync(`${root}${path}`, 'utf8');

/** Folders that are made, not kept. */
const made = new Set(['node_modules', 'dist', 'data', 'coverage', '.git', '.vite']);

function filesBelow(folder: string): string[] {
  return readdirSync(`${root}${folder}`, { withFileTypes: true }).flatMap((entry) => {
    const path = folder === '' ? entry.name : `${folder}/${entry.name}`;
    if (entry.isDirectory()) return made.has(entry.name) ? [] : filesBelow(path);
    return entry.isFile() ? [path] : [];
  });
}

const files = filesBelow('');
const textFiles = files.filter(
  (path) =>
    /\.(ts|tsx|js|json|md|css|html|sql|yml)$/.test(path) || /(^|\/)(run|\.npmrc|\.gitignore)$/.test(path),
);

/** Paths and line numbers of lines that match, in text files but for those left out. */
function linesWith(pattern: RegExp, leftOut: (path: string) => boolean = () => false): string[] {
  return textFiles
    .filter((path) => !leftOut(path))
    .flatMap((path) =>
      read(path)
        .split('\n')
        .flatMap((line, i) => (pattern.test(line) ? [`${path}:${i + 1}`] : [])),
    );
}

// written in two halves, so that this file does not find itself
const either = (...halves: [string, string][]): string => halves.map((pair) => pair.join('')).join('|');

interface Manifest {
  scripts: Record<string, string>;
  dependencies: Record<string, string>;
  devDependencies: Record<string, string>;
}
const manifest: Manifest = JSON.parse(read('package.json'));

describe('package.json', () => {
  it.each(['demo', 'start', 'dev', 'test', 'check', 'build', 'calc', 'bench', 'types', 'lint', 'format'])(
    'has the script %s',
    (script) => {
      expect(manifest.scripts[script]).toBeTruthy();
    },
  );

  it('runs files that exist', () => {
    for (const command of Object.values(manifest.scripts)) {
      for (const [, file = ''] of command.matchAll(/((?:server|bench)\/[\w/-]+\.ts)/g)) {
        expect(existsSync(`${root}${file}`), file).toBe(true);
      }
    }
  });

  it('names every version exactly, so that two installs are the same', () => {
    for (const [name, version] of Object.entries({ ...manifest.dependencies, ...manifest.devDependencies })) {
      expect(version, name).toMatch(/^\d+\.\d+\.\d+$/);
    }
  });

  it('lists no package that nothing uses', () => {
    // used by their commands in the scripts, by the compiler alone, or by name in vitest's settings
    const tools = /^(@types\/|tsx$|typescript$|prettier$|eslint$|drizzle-kit$|vite$|jsdom$)/;
    const sources = textFiles.filter((path) => /\.(ts|tsx|js|css)$/.test(path)).map(read);
    for (const name of Object.keys({ ...manifest.dependencies, ...manifest.devDependencies })) {
      if (tools.test(name)) continue;
      const used = new RegExp(
        `(from|import|require\\(|resolve\\(|import\\(|@import)\\s*\\(?['"]${name}(/[^'"]*)?['"]`,
      );
      expect(
        sources.some((text) => used.test(text)),
        name,
      ).toBe(true);
    }
  });

  it('checks types, lint, format and tests in one go', () => {
    const said = manifest.scripts['check'] ?? '';
    for (const part of ['types', 'lint', 'format:check', 'test:unit'])
      expect(said).toContain(`npm run ${part}`);
  });
});

describe('the lockfile', () => {
  it('names no address that a package was fetched from', () => {
    expect(read('package-lock.json')).not.toMatch(/"resolved"\s*:\s*"https?:/);
  });
});

describe('README.md', () => {
  const readme = read('README.md');

  it.each(['npm ci && npm run demo', 'npm ci && npm test'])('gives the command %s', (command) => {
    expect(readme).toContain(command);
  });

  it('names only scripts that exist', () => {
    const named = [...readme.matchAll(/npm run (?:--silent )?([a-z:]+)/g)].map(([, name = '']) => name);
    expect(named.length).toBeGreaterThan(5);
    for (const name of named) expect(manifest.scripts, name).toHaveProperty([name]);
  });

  it('carries the cautions', () => {
    for (const caution of [
      'licensed engineer',
      'local code governs',
      'guard rails or fall arrest',
      'Temporary works',
    ]) {
      expect(readme.replaceAll('\n', ' ')).toContain(caution);
    }
  });
});

describe('documents', () => {
  it.each(textFiles.filter((path) => path.endsWith('.md')))('%s links only to files that exist', (path) => {
    const folder = path.includes('/') ? path.slice(0, path.lastIndexOf('/') + 1) : '';
    for (const [, target = ''] of read(path).matchAll(/\]\(([^)#\s]+)[^)]*\)/g)) {
      if (/^https?:/.test(target)) continue;
      expect(existsSync(`${root}${folder}${target}`), target).toBe(true);
    }
  });

  const decisions = files.filter((path) => path.startsWith('docs/decisions/'));
  it('decisions are numbered without a gap', () => {
    const numbers = decisions.map((path) =>
      Number(path.slice('docs/decisions/'.length, 'docs/decisions/'.length + 4)),
    );
    expect(numbers.sort((a, b) => a - b)).toEqual(decisions.map((_, i) => i + 1));
  });
  it.each(decisions)('%s says why, what, what follows and what enforces it, by files that exist', (path) => {
    const text = read(path);
    const parts = ['**Context.**', '**Decision.**', '**Consequences.**', '\nEnforced by: '].map((part) =>
      text.indexOf(part),
    );
    expect(parts).not.toContain(-1);
    expect(parts).toEqual([...parts].sort((a, b) => a - b));
    for (const [, named = ''] of text
      .slice(parts[3])
      .matchAll(/`([\w./-]*\/[\w./-]*|[\w.-]+\.(?:js|ts|json))`/g)) {
      if (named === 'boundaries/dependencies') continue; // a rule, not a file
      expect(existsSync(`${root}${named}`), named).toBe(true);
    }
  });
});

describe('no file that is kept', () => {
  it('names a path of one machine', () => {
    const places = either(
      ['/wo', 'rk/'],
      ['/ro', 'ot/'],
      ['/ho', 'me/[a-z]'],
      ['/Us', 'ers/[a-zA-Z]'],
      ['/tm', 'p/[a-z]'],
      ['C:', '\\\\\\\\'],
    );
    expect(linesWith(new RegExp(`(^|[^\\w.])(${places})`))).toEqual([]);
  });

  it('names the host of a package registry', () => {
    expect(
      linesWith(new RegExp(either(['registry.', 'npmjs'], ['registry.', 'yarnpkg'], ['deb.', 'debian']))),
    ).toEqual([]);
  });

  it('is unfinished by its own words', () => {
    const marks = either(['TO', 'DO'], ['FIX', 'ME'], ['HA', 'CK']);
    expect(linesWith(new RegExp(`\\b(${marks})\\b`), (path) => path === 'package-lock.json')).toEqual([]);
  });

  it('is larger than a megabyte', () => {
    expect(files.filter((path) => statSync(`${root}${path}`).size > 2 ** 20)).toEqual([]);
  });
});

describe('.ci/run', () => {
  it('can be executed', () => {
    expect(statSync(`${root}.ci/run`).mode & 0o111).not.toBe(0);
  });
});
