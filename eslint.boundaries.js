/**
 * Who may import whom. Every file of the project belongs to exactly one part of the house (the first pattern
 * that matches); what is not allowed below is an error. tests/house/boundaries.test.ts plants a bad import for each
 * of these rules and sees it caught.
 */

/** Parts of the house, the more particular before the more general. */
const parts = [
  { category: 'test', pattern: ['tests/**', '**/*.test.ts', '**/*.test.tsx'] },
  { category: 'bench', pattern: 'bench/**' },
  { category: 'examples', pattern: 'examples/**' },
  { category: 'settings', pattern: ['*.ts', '*.js', '*.json'] },

  { category: 'shared', pattern: 'shared/**' },

  { category: 'second-method', pattern: 'server/engine/second-method/**' },
  { category: 'engine', pattern: 'server/engine/**' },
  { category: 'repo', pattern: 'server/features/*/repo.ts', capture: ['feature'] },
  { category: 'server-feature', pattern: 'server/features/*/**', capture: ['feature'] },
  { category: 'documents', pattern: 'server/documents/**' },
  { category: 'db', pattern: 'server/db/**' },
  { category: 'http', pattern: 'server/http/**' },
  { category: 'outside', pattern: ['server/mail/**', 'server/files/**'] },
  { category: 'cli', pattern: 'server/cli/**' },
  { category: 'server-app', pattern: 'server/*.ts' },

  { category: 'app', pattern: 'src/app/**' },
  { category: 'feature', pattern: 'src/features/*/**', capture: ['feature'] },
  { category: 'components', pattern: 'src/components/**' },
  { category: 'lib', pattern: 'src/lib/**' },
  { category: 'client-entry', pattern: 'src/*' },
];

export const boundarySettings = {
  'boundaries/root-path': import.meta.dirname,
  'boundaries/files': parts,
  'boundaries/files-single-match': true,
  'boundaries/legacy-templates': false,
};

const part = (...names) => ({ file: { categories: { anyOf: names } } });
const packages = (...names) => ({ module: { origin: 'external', source: names } });
const anyPackage = { module: { origin: 'external' } };
const nodeItself = { module: { origin: 'core' } };
const sameFeature = (category) => ({
  file: { categories: { anyOf: [category] }, captured: { feature: '{{ from.file.captured.feature }}' } },
});

/** Packages that only the database's own places may import. */
const database = ['drizzle-orm', 'better-sqlite3', 'drizzle-kit'];
/** Lucia is in maintenance only: one file of the session feature knows it. */
const lucia = ['lucia', '@lucia-auth/*'];
/** Packages of the browser, which the server has no use for. */
const browser = ['react', 'react-dom', 'react-router-dom', '@tanstack/*', '@testing-library/*'];
/** Packages of the server, which must never reach the browser. */
const serverOnly = [
  'express',
  'express-rate-limit',
  'helmet',
  'compression',
  'pino',
  'pino-http',
  '@node-rs/*',
];

const serverParts = part('server-feature', 'repo', 'documents', 'db', 'http', 'outside', 'cli', 'server-app');
const clientParts = part('client-entry', 'app', 'feature', 'components', 'lib');

const may = (from, ...allowed) => ({ from, allow: { to: allowed } });

const mayNot = (from, ...refused) => ({ from, disallow: { to: refused } });

export const dependencyRule = [
  'error',
  {
    default: 'disallow',
    checkAllOrigins: true,
    checkUnknownLocals: true,
    checkInternals: true,
    message:
      'A file of “{{ from.file.categories }}” must not import “{{ dependency.source }}”: eslint.boundaries.js says which way the arrows point.',
    policies: [
      may(part('shared'), part('shared'), packages('zod')),

      // The calculation and its independent double: pure, and strangers to each other.
      may(part('engine'), part('engine', 'shared')),
      may(part('second-method'), part('second-method', 'shared')),

      may(part('db'), part('db', 'shared'), packages(...database), nodeItself),
      may(part('repo'), part('db', 'shared'), sameFeature('server-feature'), packages(...database)),
      may(
        part('server-feature'),
        part('server-feature', 'engine', 'second-method', 'documents', 'outside', 'http', 'shared'),
        sameFeature('repo'),
        anyPackage,
        nodeItself,
      ),
      may(part('documents'), part('documents', 'engine', 'shared'), anyPackage, nodeItself),
      may(part('http'), part('http', 'shared'), anyPackage, nodeItself),
      may(part('outside'), part('outside', 'shared'), anyPackage, nodeItself),
      may(
        part('cli'),
        part(
          'cli',
          'server-app',
          'server-feature',
          'repo',
          'documents',
          'engine',
          'db',
          'http',
          'outside',
          'shared',
          'examples',
        ),
        anyPackage,
        packages(...database),
        nodeItself,
      ),
      may(
        part('server-app'),
        part('server-app', 'server-feature', 'repo', 'db', 'http', 'outside', 'engine', 'shared'),
        anyPackage,
        nodeItself,
      ),

      // The client: app knows every feature, a feature knows itself, and nothing of the server reaches the browser.
      may(part('client-entry'), part('client-entry', 'app'), anyPackage),
      may(part('app'), part('app', 'feature', 'components', 'lib', 'shared', 'client-entry'), anyPackage),
      may(part('feature'), sameFeature('feature'), part('components', 'lib', 'shared'), anyPackage),
      may(part('components'), part('components', 'lib', 'shared'), anyPackage),
      may(part('lib'), part('lib', 'shared'), anyPackage),

      // Packages that have their places, and no others.
      mayNot(serverParts, packages(...browser, ...lucia)),
      mayNot(part('server-feature', 'documents', 'http', 'outside', 'server-app'), packages(...database)),
      mayNot(clientParts, packages(...database, ...lucia, ...serverOnly)),
      may({ file: { path: 'server/features/session/lucia.ts' } }, part('db'), packages(...lucia)),

      may(part('settings'), part('settings'), anyPackage, nodeItself),
      may(
        part('bench'),
        part('bench', 'engine', 'second-method', 'shared', 'examples'),
        anyPackage,
        nodeItself,
      ),
      may(part('test'), { module: { origin: ['local', 'external', 'core'] } }),
    ],
  },
];

const impure = (name) => ({
  name,
  message: 'The engine is pure: time, chance and the world outside come in as arguments.',
});

/** Rules for server/engine: nothing that could make the same document give another result. */
export const enginePurity = {
  'no-restricted-globals': [
    'error',
    ...[
      'Date',
      'performance',
      'process',
      'console',
      'crypto',
      'fetch',
      'globalThis',
      'global',
      'window',
      'document',
      'setTimeout',
      'setInterval',
      'setImmediate',
      'queueMicrotask',
      'Intl',
      'localStorage',
      'require',
    ].map(impure),
  ],
  'no-restricted-properties': [
    'error',
    {
      object: 'Math',
      property: 'random',
      message: 'The engine is pure: random numbers come in as arguments.',
    },
    ...['toLocaleString', 'toLocaleLowerCase', 'toLocaleUpperCase', 'localeCompare'].map((property) => ({
      property,
      message: 'The same document gives the same result on any machine, whatever its language.',
    })),
  ],
};
