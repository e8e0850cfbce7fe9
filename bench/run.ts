import { readFileSync } from 'node:fs';
import { calculateMember } from '../server/engine/calculate-member';
import { flatLoop, prepare } from './flat-loop';
import { baseSize, generateMember, twoBoards, type Size } from './generate';
import { compare, type Ratio } from './measure';

/**
 * `npm run bench` prints what is timed, as ratios inside this one run; `npm run bench -- --json` prints only
 * `[{ name, ratio, limit, unit }]`. Without `--json` the exit status is 1 where a ratio is over its limit.
 */

interface Row extends Ratio {
  name: string;
  limit: number;
  unit: string;
}

/** The calculation of a document that must be accepted; a refusal would be quick, and no measurement. */
function calculated(input: unknown) {
  const outcome = calculateMember(input);
  if (!outcome.ok) throw new Error(`${outcome.refusal.message} ${JSON.stringify(outcome.refusal.issues)}`);
  return outcome;
}

function heavyMember(): Row {
  const input: unknown = JSON.parse(readFileSync(new URL('heavy-member.json', import.meta.url), 'utf8'));
  const { document, result } = calculated(input);
  const prepared = prepare(document, result.envelope.x);
  return {
    name: 'heavy member: whole calculation ÷ flat loop over V and M',
    limit: 5,
    unit: 'times the flat loop',
    ...compare(
      () => calculated(input),
      () => flatLoop(prepared),
      15,
    ),
  };
}

function doubled(what: keyof Size): Row {
  const once = generateMember(baseSize);
  const twice = generateMember({ ...baseSize, [what]: baseSize[what] * 2 });
  return {
    name: `${what} ${baseSize[what]} → ${baseSize[what] * 2}: cost of the whole calculation`,
    limit: 2.2,
    unit: 'times the cost',
    ...compare(
      () => calculated(twice),
      () => calculated(once),
      11,
    ),
  };
}

function smallMember(): Row {
  const { result } = calculated(twoBoards);
  return {
    name: 'two boards: whole calculation ÷ writing its result as JSON',
    limit: 20,
    unit: 'times the writing',
    ...compare(
      () => calculated(twoBoards),
      () => JSON.stringify(result),
      25,
    ),
  };
}

const rows: Row[] = [
  heavyMember(),
  doubled('cases'),
  doubled('combinations'),
  doubled('pieces'),
  doubled('spans'),
  smallMember(),
];

if (process.argv.includes('--json')) {
  console.log(JSON.stringify(rows.map(({ name, ratio, limit, unit }) => ({ name, ratio, limit, unit }))));
} else {
  for (const row of rows) {
    const times = `${row.measured.toFixed(3)} ms ÷ ${row.yardstick.toFixed(3)} ms`;
    const verdict = row.ratio <= row.limit ? 'within' : 'OVER';
    console.log(
      `${row.name}\n  ${row.ratio.toFixed(2)} ${row.unit} (${times}), limit ${row.limit}: ${verdict}`,
    );
  }
  if (rows.some((row) => row.ratio > row.limit)) process.exitCode = 1;
}
