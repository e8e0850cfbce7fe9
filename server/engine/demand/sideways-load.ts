import type { MemberDocument } from '@shared/schemas/member';
import type { Beam } from '../beam/combinations';
import { mergePlaces } from '../beam/events';
import { stackOfLoad, type Sideways } from '../flow/sideways';
import type { Piecewise } from '../numeric/piecewise';

/** The length over which a load at one place spreads: the section's depth each side, cut at the beam's ends. */
export function spread(place: number, depth: number, length: number): { from: number; to: number } {
  return { from: Math.max(0, place - depth), to: Math.min(length, place + depth) };
}

/**
 * The load per length that one load case puts on one stack, as a function of x, N/mm; null where it puts none.
 * Point loads are spread; a couple puts none.
 */
export function stackLoad(
  document: MemberDocument,
  caseIndex: number,
  stack: number,
  sideways: Sideways,
  depth: number,
): Piecewise | null {
  const { length, loadCases } = document;
  const ramps: { from: number; to: number; start: number; end: number }[] = [];
  for (const load of loadCases[caseIndex]?.loads ?? []) {
    if (stackOfLoad(document, sideways, load.on) !== stack) continue;
    if (load.kind === 'uniform')
      ramps.push({ from: load.from, to: load.to, start: load.value, end: load.value });
    else if (load.kind === 'varying')
      ramps.push({ from: load.from, to: load.to, start: load.start, end: load.end });
    else if (load.kind === 'point') {
      const over = spread(load.x, depth, length);
      const value = load.value / (over.to - over.from);
      ramps.push({ ...over, start: value, end: value });
    }
  }
  if (ramps.length === 0) return null;
  const breaks = mergePlaces([0, length, ...ramps.flatMap((r) => [r.from, r.to])]);
  breaks[breaks.length - 1] = length;
  const cubic = new Float64Array(4 * (breaks.length - 1));
  for (const { from, to, start, end } of ramps) {
    const slope = (end - start) / (to - from);
    for (let i = 0; i + 1 < breaks.length; i++) {
      const a = breaks[i] ?? 0;
      const b = breaks[i + 1] ?? 0;
      const middle = (a + b) / 2;
      if (middle < from || middle > to) continue;
      cubic[4 * i] = (cubic[4 * i] ?? 0) + start + slope * (a - from);
      cubic[4 * i + 1] = (cubic[4 * i + 1] ?? 0) + slope * (b - a);
    }
  }
  return { breaks, cubic };
}

/** Loads on stacks, case by case, and the stack each train is on. */
export interface StackLoads {
  /** still[case][stack] */
  still: (Piecewise | null)[][];
  /** stack of each train of the beam, null where its load is put on no piece */
  trainStack: (number | null)[];
}

export function stackLoads(
  document: MemberDocument,
  beam: Beam,
  sideways: Sideways,
  depth: number,
): StackLoads {
  const stacks = Array.from({ length: sideways.stacks }, (_, s) => s);
  return {
    still: document.loadCases.map((_, c) =>
      stacks.map((s) => (sideways.stacks > 1 ? stackLoad(document, c, s, sideways, depth) : null)),
    ),
    trainStack: beam.trains.map((t) => (sideways.stacks > 1 ? stackOfLoad(document, sideways, t.on) : null)),
  };
}
