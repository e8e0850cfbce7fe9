import type { MemberDocument } from '@shared/schemas/member';

/** Places closer than this (mm) are one place: what counts as touching in a section counts along a beam. */
export const touching = 1e-6;

/**
 * The places between which V, M and w are single polynomials: the beam's ends, supports, hinges, ends of
 * distributed loads, point loads and couples of every load case. Sorted, mm, first 0 and last the length.
 */
export function beamEvents(document: MemberDocument): number[] {
  const places = [0, document.length, ...document.hinges, ...document.supports.map((s) => s.x)];
  for (const loadCase of document.loadCases) {
    for (const load of loadCase.loads) {
      if (load.kind === 'uniform' || load.kind === 'varying') places.push(load.from, load.to);
      else if (load.kind === 'point' || load.kind === 'couple') places.push(load.x);
    }
  }
  return mergePlaces(places);
}

/** Sorts places and drops those that coincide. */
export function mergePlaces(places: readonly number[]): number[] {
  const sorted = [...places].sort((a, b) => a - b);
  const kept: number[] = [];
  for (const x of sorted) {
    const last = kept[kept.length - 1];
    if (last === undefined || x - last > touching) kept.push(x);
  }
  return kept;
}

/** Index of the place at x (nearest within touching distance), by bisection in the sorted list. */
export function placeIndex(places: readonly number[], x: number): number {
  let low = 0;
  let high = places.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((places[middle] ?? 0) < x - touching) low = middle + 1;
    else high = middle;
  }
  return low;
}
