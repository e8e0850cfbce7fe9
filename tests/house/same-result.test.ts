import { execFileSync } from 'node:child_process';
import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { calculateMember } from '../../server/engine/calculate-member';

const root = fileURLToPath(new URL('../../', import.meta.url));
const members = readdirSync(`${root}examples`)
  .filter((name) => name.endsWith('.json') && name !== 'office.json')
  .map((name) => `examples/${name}`);

/** The same document gives the same result, byte for byte: alone in a new process, or after others in this one. */
describe('the same document, the same result', () => {
  it('there are members to calculate', () => {
    expect(members.length).toBeGreaterThanOrEqual(8);
  });

  it.each(members)('%s', (path) => {
    const text = readFileSync(`${root}${path}`, 'utf8');
    const input: unknown = JSON.parse(text);
    const first = calculateMember(input);
    if (!first.ok) throw new Error(first.refusal.message);
    expect(JSON.stringify(input), 'the input is left as it was').toBe(JSON.stringify(JSON.parse(text)));

    const again = calculateMember(JSON.parse(text));
    expect(JSON.stringify(again)).toBe(JSON.stringify(first));

    const printed = execFileSync(process.execPath, ['--import', 'tsx', 'server/cli/calc.ts', path], {
      cwd: root,
      encoding: 'utf8',
    });
    expect(JSON.stringify(JSON.parse(printed))).toBe(JSON.stringify(first.result));
  });

  it('the document that comes back gives the result that came with it', () => {
    for (const path of members) {
      const first = calculateMember(JSON.parse(readFileSync(`${root}${path}`, 'utf8')));
      if (!first.ok) throw new Error(first.refusal.message);
      const again = calculateMember(first.document);
      if (!again.ok) throw new Error(again.refusal.message);
      // what the parsed document no longer holds can no longer be remarked on
      const { notices: _first, ...result } = first.result;
      const { notices: _again, ...repeated } = again.result;
      expect(JSON.stringify(repeated)).toBe(JSON.stringify(result));
    }
  });
});
