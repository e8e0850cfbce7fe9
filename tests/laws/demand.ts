import type { MemberInput } from '@shared/schemas/member';
import type { CalculationResult, InterfaceResult } from '@shared/schemas/result';
import type { LoadInput } from './members';
import { breaks, cut, loadsOf, type FreeBody } from './statics';

/** The member's one load case of fixed loads, with the reactions that the result reports. */
export function bodyOf(member: MemberInput, result: CalculationResult): FreeBody {
  const loads: readonly LoadInput[] = member.loadCases[0]?.loads ?? [];
  const body = loadsOf(loads);
  for (const { support, max, momentMax } of result.reactions) {
    const x = member.supports.find(({ id }) => id === support)?.x ?? NaN;
    body.forces.push({ x, up: max, turn: momentMax });
  }
  return body;
}

/** Flow of unit shear at an interface of the result. */
export const flowPerShear = (result: CalculationResult, { id }: Pick<InterfaceResult, 'id'>): number =>
  result.section.interfaces.find((one) => one.id === id)?.flowPerShear ?? NaN;

/**
 * The largest |V| within [from, to], each end by its own side. Between breaks V is a parabola at most, so its ends
 * and its vertex are all there is.
 */
export function largestShear(body: FreeBody, length: number, from: number, to: number): number {
  const inside = breaks(body, length).filter((x) => x > from + 1e-9 && x < to - 1e-9);
  const ends = [from, ...inside, to];
  let most = 0;
  for (let i = 0; i + 1 < ends.length; i += 1) {
    const a = ends[i] ?? NaN;
    const b = ends[i + 1] ?? NaN;
    const [va, vm, vb] = [cut(body, a, 'right').V, cut(body, (a + b) / 2, 'right').V, cut(body, b, 'left').V];
    most = Math.max(most, Math.abs(va), Math.abs(vb));
    // v(t) = va + p t + r t² on [0, 1] through the three values
    const r = 2 * (va - 2 * vm + vb);
    const p = vb - va - r;
    const vertex = -p / (2 * r);
    if (vertex > 0 && vertex < 1) most = Math.max(most, Math.abs(va + p * vertex + r * vertex ** 2));
  }
  return most;
}

/** ∫V dx over [from, to], by Simpson's rule between breaks: exact for parabolas. */
export function shearArea(body: FreeBody, length: number, from: number, to: number): number {
  const inside = breaks(body, length).filter((x) => x > from && x < to);
  const ends = [from, ...inside, to];
  let sum = 0;
  for (let i = 0; i + 1 < ends.length; i += 1) {
    const a = ends[i] ?? NaN;
    const b = ends[i + 1] ?? NaN;
    const middle = cut(body, (a + b) / 2, 'right').V;
    sum += ((b - a) / 6) * (cut(body, a, 'right').V + 4 * middle + cut(body, b, 'left').V);
  }
  return sum;
}
