import { open, stat } from 'node:fs/promises';
import { documentLimits } from '@shared/schemas/member';
import type { Refusal } from '@shared/schemas/refusal';
import { calculateMember } from '../engine/calculate-member';

/**
 * `calc FILE`, or `calc -` for standard input: prints the result of a member document as JSON.
 * Exit status 0 with the result; 2 where the input is refused, told on standard error; 1 for a fault of ours.
 */
async function main(args: readonly string[]): Promise<number> {
  const [name, ...rest] = args;
  if (name === undefined || rest.length > 0) {
    return refused({
      code: 'not-json',
      message: 'Name one file with a member document, or - for standard input.',
      issues: [{ path: '', message: 'Name one file with a member document, or - for standard input.' }],
    });
  }
  const text = await readLimited(name);
  if (typeof text !== 'string') return refused(text);
  let input: unknown;
  try {
    input = JSON.parse(text);
  } catch (error) {
    const why = error instanceof Error ? error.message : 'it cannot be parsed';
    const message = `The input is not JSON: ${why.slice(0, 200)}.`;
    return refused({ code: 'not-json', message, issues: [{ path: '', message }] });
  }
  const outcome = calculateMember(input);
  if (!outcome.ok) return refused(outcome.refusal);
  await write(process.stdout, `${JSON.stringify(outcome.result)}\n`);
  return 0;
}

const tooLarge: Refusal = (() => {
  const message = `The document is larger than ${documentLimits.bytes} bytes (4 MB), the most that is read.`;
  return { code: 'too-large', message, issues: [{ path: '', message }] };
})();

/** Reads a file or standard input, but never more than a document may hold. */
async function readLimited(name: string): Promise<string | Refusal> {
  if (name === '-') return collect(process.stdin);
  try {
    const found = await stat(name);
    if (found.isDirectory()) return unreadable(`${name} is a folder.`);
    if (found.size > documentLimits.bytes) return tooLarge;
    const file = await open(name);
    try {
      return await collect(file.createReadStream());
    } finally {
      await file.close();
    }
  } catch (error) {
    return unreadable(error instanceof Error ? error.message : String(error));
  }
}

function unreadable(why: string): Refusal {
  const message = `The document cannot be read: ${why}`;
  return { code: 'not-json', message, issues: [{ path: '', message }] };
}

async function collect(stream: AsyncIterable<Buffer | string>): Promise<string | Refusal> {
  const chunks: Buffer[] = [];
  let size = 0;
  for await (const chunk of stream) {
    const bytes = Buffer.from(chunk);
    size += bytes.length;
    if (size > documentLimits.bytes) return tooLarge;
    chunks.push(bytes);
  }
  return Buffer.concat(chunks).toString('utf8');
}

async function refused(error: Refusal): Promise<number> {
  await write(process.stderr, `${JSON.stringify({ error })}\n`);
  return 2;
}

/** Resolves when the text has left the process: a pipe may be slower than we are. */
function write(stream: NodeJS.WriteStream, text: string): Promise<void> {
  return new Promise((resolve, reject) => {
    stream.write(text, (error) => (error ? reject(error) : resolve()));
  });
}

main(process.argv.slice(2)).then(
  (status) => process.exit(status),
  (error: unknown) => {
    process.stderr.write(`${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`);
    process.exit(1);
  },
);
