import { expect } from 'vitest';
import { memberDocumentSchema, type MemberDocument, type MemberInput } from '@shared/schemas/member';

type LoadInput = NonNullable<MemberInput['loadCases'][number]['loads']>[number];

/** E of the wood of these tests, MPa. */
export const E = 10_000;

/** One board 100 × 120 of which EI = 10 000 · 100 · 120³/12 = 1.44e11 N·mm². */
export const EI = (E * 100 * 120 ** 3) / 12;

/** A single board on given supports. */
export function boardMember(
  length: number,
  supports: MemberInput['supports'],
  loads: LoadInput[],
  hinges: number[] = [],
): MemberDocument {
  return memberDocumentSchema.parse({
    schema: 1,
    length,
    supports,
    hinges,
    materials: [{ id: 'w', E }],
    pieces: [{ id: 'P1', material: 'w', y: 0, z: 0, width: 100, depth: 120 }],
    loadCases: [{ id: 'Q', action: 'imposed', loads }],
  } satisfies MemberInput);
}

/** Within 1e-9 of the size of what is expected. */
export function expectNear(found: number | null | undefined, expected: number, tolerance = 1e-9): void {
  expect(found).toBeTypeOf('number');
  const off = Math.abs((found ?? NaN) - expected) / Math.max(Math.abs(expected), 1e-300);
  expect(off, `${found} instead of ${expected}`).toBeLessThanOrEqual(tolerance);
}
