import type { MemberInput } from '@shared/schemas/member';
import type { LoadInput } from './members';

/**
 * Shear and moment from the forces themselves: everything left of a cut is added up. Nothing here knows how the
 * reactions were found.
 */
export interface Force {
  x: number;
  /** N, upward */
  up: number;
  /** N·mm, adds to M on its right */
  turn: number;
}
export interface Stretch {
  from: number;
  to: number;
  /** N/mm, downward, at its two ends */
  start: number;
  end: number;
}
export interface FreeBody {
  forces: Force[];
  stretches: Stretch[];
}

/** A free body of loads alone, with a factor. */
export function loadsOf(loads: readonly LoadInput[], factor = 1): FreeBody {
  const body: FreeBody = { forces: [], stretches: [] };
  for (const load of loads) {
    if (load.kind === 'point') body.forces.push({ x: load.x, up: -factor * load.value, turn: 0 });
    if (load.kind === 'couple') body.forces.push({ x: load.x, up: 0, turn: factor * load.value });
    if (load.kind === 'uniform') {
      body.stretches.push({
        from: load.from,
        to: load.to,
        start: factor * load.value,
        end: factor * load.value,
      });
    }
    if (load.kind === 'varying') {
      body.stretches.push({
        from: load.from,
        to: load.to,
        start: factor * load.start,
        end: factor * load.end,
      });
    }
  }
  return body;
}

/** Load of a stretch left of x: its sum and its moment about x. */
function leftOf({ from, to, start, end }: Stretch, x: number): { sum: number; moment: number } {
  const c = Math.min(x, to) - from;
  if (c <= 0) return { sum: 0, moment: 0 };
  const slope = (end - start) / (to - from);
  const sum = start * c + (slope * c * c) / 2;
  // about the stretch's start, then carried over to x
  const aboutStart = (start * c * c) / 2 + (slope * c ** 3) / 3;
  return { sum, moment: sum * (x - from) - aboutStart };
}

/** V and M just left or just right of x. */
export function cut(
  { forces, stretches }: FreeBody,
  x: number,
  side: 'left' | 'right',
): { V: number; M: number } {
  let V = 0;
  let M = 0;
  for (const force of forces) {
    if (force.x > x + 1e-7 || (side === 'left' && force.x > x - 1e-7)) continue;
    V += force.up;
    M += force.up * (x - force.x) + force.turn;
  }
  for (const stretch of stretches) {
    const { sum, moment } = leftOf(stretch, x);
    V -= sum;
    M -= moment;
  }
  return { V, M };
}

/** All places where V, M or the load changes its law. */
export function breaks({ forces, stretches }: FreeBody, length: number): number[] {
  const all = [0, length, ...forces.map(({ x }) => x), ...stretches.flatMap(({ from, to }) => [from, to])];
  return [...new Set(all)].filter((x) => x >= 0 && x <= length).sort((a, b) => a - b);
}

/** The two reactions of a beam on two supports, by moments about each. */
export function twoSupports(member: MemberInput, loads: FreeBody): FreeBody {
  const [a, b] = member.supports;
  if (a === undefined || b === undefined || member.supports.length !== 2)
    throw new Error('two supports are meant');
  const end = cut(loads, member.length, 'right');
  // Ra + Rb = −V, Ra(L−a) + Rb(L−b) = −M, with V and M of the loads alone at the right end
  const leftReaction = (end.V * (member.length - b.x) - end.M) / (b.x - a.x);
  const rightReaction = -end.V - leftReaction;
  return {
    forces: [...loads.forces, { x: a.x, up: leftReaction, turn: 0 }, { x: b.x, up: rightReaction, turn: 0 }],
    stretches: loads.stretches,
  };
}
