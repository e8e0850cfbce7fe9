import { spawnSync } from 'node:child_process';
import { chmodSync, copyFileSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

/** `.ci/run` with an `npm` of our own in its way: what it prints last has to be true, whatever happens. */
const script = fileURLToPath(new URL('../../.ci/run', import.meta.url));
let place = '';

const FAKE_NPM = `#!/usr/bin/env bash
if [ "$1" = ci ]; then exit "$FAKE_INSTALL"; fi
for argument in "$@"; do
  case "$argument" in --outputFile.json=*) file="\${argument#*=}" ;; esac
done
[ -z "$FAKE_FIGURES" ] || printf '%s' "$FAKE_FIGURES" > "$file"
echo '12 passed, 0 failed, says somebody else'
exit "$FAKE_STATUS"
`;

beforeAll(() => {
  place = mkdtempSync(join(tmpdir(), 'ci-run-'));
  mkdirSync(join(place, 'project/.ci'), { recursive: true });
  mkdirSync(join(place, 'bin'));
  copyFileSync(script, join(place, 'project/.ci/run'));
  writeFileSync(join(place, 'bin/npm'), FAKE_NPM);
  for (const name of ['apt-get', 'sudo', 'python3', 'make', 'g++']) {
    writeFileSync(join(place, 'bin', name), '#!/usr/bin/env bash\nexit 0\n');
  }
  for (const name of ['npm', 'apt-get', 'sudo', 'python3', 'make', 'g++'])
    chmodSync(join(place, 'bin', name), 0o755);
});

afterAll(() => {
  rmSync(place, { recursive: true, force: true });
});

interface Figures {
  passed: number;
  failed: number;
  /** begun and never ended */
  lost?: number;
  files?: { status: string; tests: string[] }[];
}

function run(install: number, status: number, figures: Figures | string) {
  const json =
    typeof figures === 'string'
      ? figures
      : JSON.stringify({
          numPassedTests: figures.passed,
          numFailedTests: figures.failed,
          numTotalTests: figures.passed + figures.failed + (figures.lost ?? 0),
          testResults: (figures.files ?? []).map((file) => ({
            status: file.status,
            assertionResults: file.tests.map((test) => ({ status: test })),
          })),
        });
  const { stdout, status: code } = spawnSync('bash', [join(place, 'project/.ci/run')], {
    encoding: 'utf8',
    env: {
      ...process.env,
      PATH: `${join(place, 'bin')}:${process.env['PATH'] ?? ''}`,
      FAKE_INSTALL: String(install),
      FAKE_STATUS: String(status),
      FAKE_FIGURES: json,
    },
  });
  const lines = stdout.split('\n');
  expect(lines.at(-1)).toBe('');
  return { last: lines.at(-2), code };
}

describe('.ci/run', () => {
  it('all pass', () => {
    expect(run(0, 0, { passed: 41, failed: 0 })).toEqual({ last: '41 passed, 0 failed', code: 0 });
  });
  it('some fail', () => {
    expect(run(0, 1, { passed: 37, failed: 4 })).toEqual({ last: '37 passed, 4 failed', code: 1 });
  });
  it('the status of the tests is kept', () => {
    expect(run(0, 3, { passed: 37, failed: 4 })).toEqual({ last: '37 passed, 4 failed', code: 3 });
  });
  it('installing fails', () => {
    expect(run(7, 0, { passed: 41, failed: 0 })).toEqual({ last: '0 passed, 1 failed', code: 1 });
  });
  it('a file that cannot be loaded is a failure', () => {
    const files = [
      { status: 'passed', tests: ['passed', 'passed'] },
      { status: 'failed', tests: [] },
      { status: 'failed', tests: ['failed', 'passed'] },
    ];
    expect(run(0, 1, { passed: 3, failed: 1, files })).toEqual({ last: '3 passed, 2 failed', code: 1 });
  });
  it('tests that were never ended, because their process died, are failures', () => {
    expect(run(0, 1, { passed: 41, failed: 2, lost: 4 })).toEqual({ last: '41 passed, 6 failed', code: 1 });
  });
  it('something outside the tests goes wrong', () => {
    expect(run(0, 1, { passed: 41, failed: 0 })).toEqual({ last: '41 passed, 1 failed', code: 1 });
  });
  it('no test at all is no success', () => {
    expect(run(0, 0, { passed: 0, failed: 0 })).toEqual({ last: '0 passed, 1 failed', code: 1 });
  });
  it('failures with a status that says nothing of them', () => {
    expect(run(0, 0, { passed: 5, failed: 2 })).toEqual({ last: '5 passed, 2 failed', code: 1 });
  });
  it.each(['', '{"numPassedTests": 4', '{"numPassedTests":4,"numFailedTests":0,"testResults":[]}'])(
    'figures that cannot be read: %s',
    (figures) => {
      expect(run(0, 0, figures)).toEqual({ last: '0 passed, 1 failed', code: 1 });
    },
  );
});
