import { spawn } from 'node:child_process';
import { mkdtemp, open, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { z } from 'zod';
import { resultSchema } from '@shared/schemas/result';
import { calculateMember } from '../../server/engine/calculate-member';

const root = fileURLToPath(new URL('../..', import.meta.url));
const example = join(root, 'examples', 'two-flat-boards.json');

interface Run {
  status: number | null;
  stdout: string;
  stderr: string;
  milliseconds: number;
}

/** Runs the command line the way `npm run calc` does, without npm. */
function calc(args: string[], input?: string): Promise<Run> {
  return new Promise((resolve, reject) => {
    const started = performance.now();
    const child = spawn(process.execPath, ['--import', 'tsx', 'server/cli/calc.ts', ...args], { cwd: root });
    const out: Buffer[] = [];
    const err: Buffer[] = [];
    child.stdout.on('data', (chunk: Buffer) => out.push(chunk));
    child.stderr.on('data', (chunk: Buffer) => err.push(chunk));
    child.on('error', reject);
    child.on('close', (status) =>
      resolve({
        status,
        stdout: Buffer.concat(out).toString('utf8'),
        stderr: Buffer.concat(err).toString('utf8'),
        milliseconds: performance.now() - started,
      }),
    );
    // a program that refuses early closes its input; that is its right
    child.stdin.on('error', () => undefined);
    child.stdin.end(input ?? '');
  });
}

const refusalSchema = z
  .object({
    error: z
      .object({
        code: z.string(),
        message: z.string().min(5),
        issues: z.array(z.object({ path: z.string(), message: z.string().min(5) }).strict()).min(1),
      })
      .strict(),
  })
  .strict();

function expectRefused({ status, stdout, stderr }: Run): z.infer<typeof refusalSchema>['error'] {
  expect({ status, stdout }).toEqual({ status: 2, stdout: '' });
  return refusalSchema.parse(JSON.parse(stderr)).error;
}

let folder = '';
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'seamwright-calc-'));
});
afterAll(async () => {
  await rm(folder, { recursive: true, force: true });
});

describe('the command line', () => {
  it('prints the result of a file and ends with 0', async () => {
    const run = await calc([example]);
    expect({ status: run.status, stderr: run.stderr }).toEqual({ status: 0, stderr: '' });
    const printed: unknown = JSON.parse(run.stdout);
    expect(resultSchema.safeParse(printed).success).toBe(true);
    const outcome = calculateMember(JSON.parse(await readFile(example, 'utf8')));
    expect(printed).toEqual(outcome.ok ? outcome.result : null);
  });

  it('reads standard input for -, and prints the same bytes', async () => {
    const [fromFile, fromInput] = await Promise.all([
      calc([example]),
      calc(['-'], await readFile(example, 'utf8')),
    ]);
    expect(fromInput.status).toBe(0);
    expect(fromInput.stdout).toBe(fromFile.stdout);
  });

  it('refuses what is not JSON: truncated, empty, NaN, not text', async () => {
    for (const text of [
      '{"schema": 1,',
      '',
      '   ',
      '{"schema": NaN}',
      '{"length": Infinity}',
      '\u0000\u0001',
      '{"a":1}{"b":2}',
    ]) {
      expect(expectRefused(await calc(['-'], text)).code, text).toBe('not-json');
    }
  }, 60_000);

  it('refuses a file cut off in the middle', async () => {
    const text = await readFile(example, 'utf8');
    const path = join(folder, 'cut.json');
    await writeFile(path, text.slice(0, text.length / 2));
    expect(expectRefused(await calc([path])).code).toBe('not-json');
  });

  it('refuses JSON that is no document', async () => {
    for (const text of ['null', '[]', '7', '"member"', '{}']) {
      expect(expectRefused(await calc(['-'], text)).code, text).toBe('invalid-document');
    }
  }, 60_000);

  it('says where a document is wrong', async () => {
    const document: unknown = JSON.parse(await readFile(example, 'utf8'));
    if (typeof document !== 'object' || document === null) throw new Error('no document');
    const run = await calc(['-'], JSON.stringify({ ...document, length: -4 }));
    expect(expectRefused(run).issues.map(({ path }) => path)).toContain('length');
  });

  it('refuses a folder, a missing file, no file and two files', async () => {
    for (const args of [[folder], [join(folder, 'nothing.json')], [], [example, example]])
      expectRefused(await calc(args));
  }, 60_000);

  it('refuses a file of 200 MB without reading it', async () => {
    const path = join(folder, 'huge.json');
    const file = await open(path, 'w');
    await file.truncate(200 * 2 ** 20);
    await file.close();
    const [small, huge] = [await calc([join(folder, 'nothing.json')]), await calc([path])];
    expect(expectRefused(huge).code).toBe('too-large');
    expect(huge.milliseconds).toBeLessThan(small.milliseconds + 2000);
  });

  it('refuses more than 4 MB on standard input, and takes 4 MB of spaces around a document', async () => {
    expect(expectRefused(await calc(['-'], ' '.repeat(4 * 2 ** 20 + 1))).code).toBe('too-large');
    const text = await readFile(example, 'utf8');
    const bytes = Buffer.byteLength(text);
    const run = await calc(['-'], text + ' '.repeat(4 * 2 ** 20 - bytes));
    expect(run.status).toBe(0);
  }, 60_000);

  it('refuses nesting a hundred thousand deep', async () => {
    expectRefused(await calc(['-'], '['.repeat(100_000) + ']'.repeat(100_000)));
    expectRefused(await calc(['-'], `{"schema":1,"pieces":${'['.repeat(50_000)}${']'.repeat(50_000)}}`));
  }, 60_000);
});
