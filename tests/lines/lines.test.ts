import { readdirSync, readFileSync } from 'node:fs';
import { all, create, type Unit } from 'mathjs';
import { describe, expect, it } from 'vitest';
import type { CalculationLine } from '@shared/schemas/result';
import { calculateMember } from '../../server/engine/calculate-member';
import { figureTopics, readCases } from '../reference/reference-data';

const math = create(all ?? {});

const examples = new URL('../../examples/', import.meta.url);
const members: { name: string; member: unknown }[] = [
  ...readdirSync(examples)
    .filter((name) => name.endsWith('.json') && name !== 'office.json')
    .map((name) => ({ name, member: JSON.parse(readFileSync(new URL(name, examples), 'utf8')) as unknown })),
  ...figureTopics.flatMap((topic) =>
    readCases(topic).map(({ id, member }) => ({ name: `${topic} ${id}`, member })),
  ),
];

const quantity = (value: number, unit: string): number | Unit =>
  unit === '' ? value : math.unit(value, unit);

/** Works the line's formula out again from its inputs, with units, and says what is wrong with it. */
function wrongWith(line: CalculationLine): string[] {
  const scope = new Map<string, unknown>(
    line.inputs.map(({ symbol, value, unit }) => [symbol, quantity(value, unit)]),
  );
  const label = `${line.id} ${line.symbol} = ${line.formula}`;
  let found: unknown;
  try {
    found = math.evaluate(line.formula, scope);
  } catch (error) {
    return [`${label}: ${error instanceof Error ? error.message : String(error)}`];
  }
  let value: number;
  if (line.unit === '') {
    if (typeof found !== 'number') return [`${label}: ${String(found)} has a unit, the line has none`];
    value = found;
  } else {
    if (!math.isUnit(found)) return [`${label}: ${String(found)} is no ${line.unit}`];
    if (!found.equalBase(math.unit(1, line.unit)))
      return [`${label}: ${found.toString()} is no ${line.unit}`];
    value = found.toNumber(line.unit);
  }
  const largest = Math.max(Math.abs(line.value), ...terms(line));
  return Math.abs(value - line.value) <= 1e-9 * Math.max(Math.abs(line.value), largest * 1e-3)
    ? []
    : [`${label}: ${value} against ${line.value} ${line.unit}`];
}

/** A difference of large inputs of the line's own unit keeps their digits, not its own. */
const terms = ({ inputs, unit }: CalculationLine): number[] =>
  inputs.filter((input) => input.unit === unit).map(({ value }) => Math.abs(value));

describe('the calculation lines', () => {
  it.each(members)('$name', ({ member }) => {
    const outcome = calculateMember(member);
    if (!outcome.ok) throw new Error(JSON.stringify(outcome.refusal));
    const { result } = outcome;
    expect(result.lines.length).toBeGreaterThan(5);
    for (const lines of [result.lines, ...result.interfaces.map(({ capacityLines }) => capacityLines)]) {
      expect(lines.flatMap(wrongWith)).toEqual([]);
    }
    const earlier = new Map<string, CalculationLine>();
    let last: [number, number] = [0, 0];
    for (const line of result.lines) {
      expect(earlier.has(line.id), `${line.id} is used once`).toBe(false);
      const [group = NaN, number = NaN] = line.id.split('.').map(Number);
      expect(
        group > last[0] || (group === last[0] && number > last[1]),
        `${line.id} after ${last.join('.')}`,
      ).toBe(true);
      last = [group, number];
      for (const text of [line.label, line.symbol, line.formula, line.substituted, line.group, line.source]) {
        expect(text.trim(), line.id).not.toBe('');
      }
      for (const { symbol, value, unit, from } of line.inputs) {
        expect(Number.isFinite(value), `${line.id} ${symbol}`).toBe(true);
        if (from === null) continue;
        const source = earlier.get(from);
        expect(source, `${line.id}: ${symbol} from ${from}`).toBeDefined();
        expect({ value, unit }, `${line.id}: ${symbol} from ${from}`).toEqual({
          value: source?.value,
          unit: source?.unit,
        });
      }
      earlier.set(line.id, line);
    }
  });

  it('lead to what the result says: each interface’s required spacing, capacity and peak flow are on a line', () => {
    for (const { name, member } of members) {
      const outcome = calculateMember(member);
      if (!outcome.ok) throw new Error(JSON.stringify(outcome.refusal));
      const { result } = outcome;
      const printed = (value: number) =>
        result.lines.some((line) => Math.abs(line.value - value) <= 1e-9 * Math.abs(value));
      expect(printed(result.section.EI), `${name}: EI`).toBe(true);
      for (const one of result.interfaces) {
        if (one.requiredSpacing !== null)
          expect(printed(one.requiredSpacing), `${name}: ${one.id} spacing`).toBe(true);
        expect(printed(one.capacity), `${name}: ${one.id} capacity`).toBe(true);
        if (one.peakFlow.value > 1e-9)
          expect(printed(one.peakFlow.value), `${name}: ${one.id} flow`).toBe(true);
      }
    }
  });
});
