import { at } from './linear';
import type { Model } from './model';
import { GAUSS, type StillLoads } from './still';
import { hull, trainPairs, trainRange, type Pair } from './trains';

/**
 * What is looked at along the beam: a station (shear, and force passed sideways per length) or a stretch (their integrals, which
 * one fastener carries). Both are the same question: along the beam from V, across from the loads put on single plies.
 */

export interface Probe {
  /** of the loads at rest of a case: along from V, and across by stack */
  still: (loadCase: number) => { along: number; across: number[] };
  /** of a unit load at a */
  unitAlong: (a: number) => number;
  unitAcross: (a: number) => number;
  /** where an axle that passes makes a jump or a kink */
  near: number[];
}

/** Ends of the stretch over which a point load crosses: the section's depth each side, cut at the beam's ends. */
function reach(model: Model, a: number): { from: number; to: number } {
  return { from: Math.max(0, a - model.depth), to: Math.min(model.length, a + model.depth) };
}

/** Load per length put on a stack at x. */
function intensity(model: Model, loads: StillLoads, x: number): number {
  let sum = 0;
  for (const { from, to, start, end } of loads.spread) {
    if (x > from && x < to) sum += start + ((end - start) * (x - from)) / (to - from);
  }
  for (const point of loads.points) {
    const { from, to } = reach(model, point.x);
    if (x > from && x < to) sum += point.value / (to - from);
  }
  return sum;
}

const sides = (model: Model, places: readonly number[]): number[] =>
  model.trains.some(({ stack }) => stack !== null)
    ? places.flatMap((place) => [place, place - model.depth, place + model.depth])
    : [...places];

/** A station; at a jump stand beside it. */
export function stationProbe(model: Model, x: number): Probe {
  return {
    still: (c) => {
      const solved = at(model.cases, c);
      return {
        along: solved.still.at(x).shear,
        across: solved.onStack.map((loads) => intensity(model, loads, x)),
      };
    },
    unitAlong: model.unit.shearAt(x),
    unitAcross: (a) => {
      const { from, to } = reach(model, a);
      return x > from && x < to ? 1 / (to - from) : 0;
    },
    near: sides(model, [x]),
  };
}

/** Integrals over a stretch. `events` are the places where V or the loads of plies may break, sorted. */
export function stretchProbe(model: Model, events: readonly number[], from: number, to: number): Probe {
  const cuts = [from, ...events.filter((x) => x > from && x < to), to];
  const over = (f: (x: number) => number): number => {
    let sum = 0;
    for (let i = 1; i < cuts.length; i += 1) {
      const half = (at(cuts, i) - at(cuts, i - 1)) / 2;
      const middle = at(cuts, i - 1) + half;
      for (const { place, weight } of GAUSS) sum += weight * half * f(middle + place * half);
    }
    return sum;
  };
  return {
    still: (c) => {
      const solved = at(model.cases, c);
      return {
        along: over((x) => solved.still.at(x).shear),
        across: solved.onStack.map((loads) =>
          loads.points.length + loads.spread.length === 0 ? 0 : over((x) => intensity(model, loads, x)),
        ),
      };
    },
    unitAlong: model.unit.shearOver(from, to),
    unitAcross: (a) => {
      const spread = reach(model, a);
      const covered = Math.min(to, spread.to) - Math.max(from, spread.from);
      return Math.max(0, covered) / (spread.to - spread.from);
    },
    near: sides(model, [from, to]),
  };
}

export interface Demand {
  /** largest √(along² + across²) */
  value: number;
  along: number;
  across: number;
  combination: number;
}

const sumOf = (a: readonly Pair[], b: readonly Pair[]): Pair[] =>
  hull(a.flatMap((p) => b.map((q) => ({ along: p.along + q.along, across: p.across + q.across }))));

/** Reading of a probe: by case at rest, and by train the corners of what it can bring. */
export interface Reading {
  still: { along: number; across: number[] }[];
  trains: Pair[][];
}

/** Reads a probe: solves nothing, only evaluates. */
export function read(model: Model, probe: Probe): Reading {
  return {
    still: model.cases.map((_, c) => probe.still(c)),
    trains: model.trains.map((train) => {
      if (train.stack !== null)
        return trainPairs(model, train, probe.unitAlong, probe.unitAcross, probe.near);
      const { min, max } = trainRange(model, train, probe.unitAlong, probe.near, model.beam.determinate);
      return [
        { along: min, across: 0 },
        { along: max, across: 0 },
      ];
    }),
  };
}

/** How shear and load put on stacks make themselves felt: at an interface, or flow 1 and nothing across for V itself. */
export interface Felt {
  flow: number;
  /** by stack */
  crossing: readonly number[];
}

/** The demand over all combinations and positions; trains move independently of each other. */
export function demandOn(model: Model, reading: Reading, felt: Felt): Demand {
  const worst: Demand = { value: 0, along: 0, across: 0, combination: -1 };
  model.combinations.forEach(({ factors }, combination) => {
    const start: Pair = { along: 0, across: 0 };
    factors.forEach((factor, c) => {
      if (factor === 0) return;
      const still = at(reading.still, c);
      start.along += factor * felt.flow * still.along;
      felt.crossing.forEach((share, stack) => {
        start.across += factor * share * at(still.across, stack);
      });
    });
    let reached = [start];
    model.trains.forEach((train, t) => {
      const factor = at(factors, train.loadCase);
      if (factor === 0) return;
      const share = train.stack === null ? 0 : (felt.crossing[train.stack] ?? 0);
      const own = at(reading.trains, t).map(({ along, across }) => ({
        along: factor * felt.flow * along,
        across: factor * share * across,
      }));
      reached = sumOf(reached, hull(own));
    });
    for (const { along, across } of reached) {
      const value = Math.hypot(along, across);
      if (value > worst.value * (1 + 1e-12) || worst.combination < 0)
        Object.assign(worst, { value, along, across, combination });
    }
  });
  return worst;
}
