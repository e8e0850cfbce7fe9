import { expect } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import type { CalculationResult, InterfaceResult } from '@shared/schemas/result';
import { calculateMember } from '../../server/engine/calculate-member';

/** The result of a member that must be calculable. */
export function calculated(member: MemberInput): CalculationResult {
  const outcome = calculateMember(member);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.refusal));
  return outcome.result;
}

/** Within `rel` of the larger of what is expected and `scale`: what is nothing against the scale may be off by as much. */
export function expectClose(found: number, expected: number, scale: number, label: string, rel = 1e-8): void {
  const allowed = rel * Math.max(Math.abs(expected), scale);
  if (!(Math.abs(found - expected) <= allowed)) {
    expect.fail(`${label}: ${found} against ${expected} (${found - expected} off, ${allowed} allowed)`);
  }
}

/** The largest magnitude in a list, at least `least`. */
export const largest = (values: readonly number[], least = 0): number =>
  values.reduce((most, value) => Math.max(most, Math.abs(value)), least);

/** The values of one envelope at the stations of one x: one, or the left and the right one at a jump. */
export function stationsAt(xs: readonly number[], values: readonly number[], x: number): number[] {
  return values.filter((_, i) => Math.abs((xs[i] ?? NaN) - x) < 1e-6);
}

/** Even steps of a beam that every result has stations at. */
export const evenSteps = (length: number): number[] =>
  Array.from({ length: 101 }, (_, i) => (length * i) / 100);

/** Fasteners before rounding up: Σ rows·length/spacing. */
export const amount = ({ zones, rows }: Pick<InterfaceResult, 'zones' | 'rows'>): number =>
  zones.reduce((sum, { from, to, spacing }) => sum + (rows * (to - from)) / spacing, 0);

/** The interface of two pieces, whichever is named first. */
export function between<T extends { pieces: readonly string[] }>(
  list: readonly T[],
  a: string,
  b: string,
): T {
  const found = list.find(({ pieces }) => pieces.includes(a) && pieces.includes(b));
  if (found === undefined) throw new Error(`no interface of ${a} and ${b}`);
  return found;
}
