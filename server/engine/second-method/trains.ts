import { distinct } from './beam';
import { at } from './linear';
import type { Model, Train } from './model';
import { golden } from './search';

/**
 * Trains by placing them: at every position that brings an axle to a support, hinge, end or place looked at, a hair
 * before and behind it, and at even samples between. On a statically determinate beam influence lines of V, M and reactions are
 * straight between those positions, so that nothing is missed; elsewhere the samples are refined by golden section.
 */

/** Sum of the axles' effects with offset 0 at p; an axle beyond the beam's ends carries nothing. */
export function trainEffect(model: Model, train: Train, unit: (a: number) => number, p: number): number {
  const margin = model.hair / 4;
  let sum = 0;
  for (const axle of train.axles) {
    const a = p + axle.offset;
    if (a < -margin || a > model.length + margin) continue;
    sum += axle.value * unit(Math.min(Math.max(a, 0), model.length));
  }
  return sum;
}

const beside = (p: number, hair: number): number[] => [p - hair, p, p + hair];

const fixedPositions = new WeakMap<Train, number[]>();

/** Positions with an axle at a break of the influence lines, whatever the place looked at. */
function fixedOf(model: Model, train: Train): number[] {
  const known = fixedPositions.get(train);
  if (known !== undefined) return known;
  const places = [...model.beam.breaks];
  if (train.stack !== null) places.push(model.depth, model.length - model.depth);
  const positions = places.flatMap((place) =>
    train.axles.flatMap(({ offset }) => beside(place - offset, model.hair)),
  );
  const within = [train.from, train.to, ...positions.filter((p) => p > train.from && p < train.to)];
  const sorted = distinct(within, model.hair / 4);
  fixedPositions.set(train, sorted);
  return sorted;
}

/**
 * Positions to try.
 *
 * @param near places where an axle that passes makes a jump or a kink
 * @param between samples in each stretch between those positions
 */
export function positionsToTry(
  model: Model,
  train: Train,
  near: readonly number[],
  between: number,
): number[] {
  const all = [...fixedOf(model, train)];
  for (const place of near) {
    for (const { offset } of train.axles) {
      for (const p of beside(place - offset, model.hair)) if (p > train.from && p < train.to) all.push(p);
    }
  }
  if (between === 0) return all;
  const sorted = distinct(all, model.hair / 4);
  const tried: number[] = [];
  sorted.forEach((p, i) => {
    tried.push(p);
    const next = sorted[i + 1];
    if (next === undefined || next - p < 4 * model.hair) return;
    for (let k = 1; k <= between; k += 1) tried.push(p + ((next - p) * k) / (between + 1));
  });
  return tried;
}

export interface Range {
  min: number;
  max: number;
}

/** Samples this near to the best (as a part of the whole range) may hide a larger value beside them. */
const NEAR_BEST = 0.05;

/** Largest of samples, each top among its neighbours refined by golden section. */
function refinedLargest(
  positions: readonly number[],
  values: readonly number[],
  effect: (p: number) => number,
): number {
  let largest = -Infinity;
  let least = Infinity;
  for (const value of values) {
    largest = Math.max(largest, value);
    least = Math.min(least, value);
  }
  const worthwhile = largest - NEAR_BEST * (largest - least);
  let best = largest;
  values.forEach((value, i) => {
    const before = i > 0 ? i - 1 : i;
    const after = i + 1 < values.length ? i + 1 : i;
    if (value < worthwhile || value < at(values, before) || value < at(values, after)) return;
    if (value === at(values, before) && value === at(values, after)) return;
    best = Math.max(best, golden(effect, at(positions, before), at(positions, after), 25).value);
  });
  return best;
}

/** Least and largest effect of a train over all its positions. */
export function trainRange(
  model: Model,
  train: Train,
  unit: (a: number) => number,
  near: readonly number[],
  straight: boolean,
): Range {
  const positions = positionsToTry(model, train, near, straight ? 0 : 4);
  const effect = (p: number): number => trainEffect(model, train, unit, p);
  const values = positions.map(effect);
  if (straight) return { min: Math.min(...values), max: Math.max(...values) };
  const opposite = values.map((value) => -value);
  return {
    min: -refinedLargest(positions, opposite, (p) => -effect(p)),
    max: refinedLargest(positions, values, effect),
  };
}

export interface Pair {
  along: number;
  across: number;
}

/** The corners of the convex hull of some pairs (Andrew's monotone chain). */
export function hull(pairs: readonly Pair[]): Pair[] {
  const sorted = [...pairs].sort((p, q) => p.along - q.along || p.across - q.across);
  if (sorted.length < 3) return sorted;
  const half = (points: readonly Pair[]): Pair[] => {
    const chain: Pair[] = [];
    for (const point of points) {
      for (;;) {
        const b = chain.at(-1);
        const a = chain.at(-2);
        if (a === undefined || b === undefined) break;
        const turn =
          (b.along - a.along) * (point.across - a.across) - (b.across - a.across) * (point.along - a.along);
        if (turn > 0) break;
        chain.pop();
      }
      chain.push(point);
    }
    chain.pop();
    return chain;
  };
  return [...half(sorted), ...half([...sorted].reverse())];
}

/** All pairs that a train can bring about at one place: the corners of their hull. */
export function trainPairs(
  model: Model,
  train: Train,
  along: (a: number) => number,
  across: (a: number) => number,
  near: readonly number[],
): Pair[] {
  return hull(
    positionsToTry(model, train, near, 20).map((p) => ({
      along: trainEffect(model, train, along, p),
      across: trainEffect(model, train, across, p),
    })),
  );
}
