import { distinct } from './beam';
import { at } from './linear';
import type { Model } from './model';
import { demandOn, read, stationProbe, type Demand, type Felt, type Reading } from './probe';
import { largestBetween } from './search';
import { trainRange, type Range } from './trains';

/** Scanning the beam: gaps between events, and in each gap samples and the search about the best of them. */

/** A stretch in which nothing begins, ends or acts; the demand in it is that at its worst place. */
export interface Gap {
  from: number;
  to: number;
}

export interface Peak extends Demand {
  x: number;
}

/** Places where a train's envelope may break: each axle at each of the positions that count for all stations. */
function trainEvents(model: Model): number[] {
  return model.trains.flatMap((train) => {
    const places = [...model.beam.breaks];
    if (train.stack !== null) places.push(model.depth, model.length - model.depth);
    const positions = [
      train.from,
      train.to,
      ...places.flatMap((place) => train.axles.map(({ offset }) => place - offset)),
    ].filter((p) => p >= train.from && p <= train.to);
    const reached = positions.flatMap((p) => train.axles.map(({ offset }) => p + offset));
    return train.stack === null ? reached : reached.flatMap((x) => [x, x - model.depth, x + model.depth]);
  });
}

/** Every place where V, M or the load of a ply may break, and the borders given; sorted, within the beam. */
export function eventsOf(model: Model, borders: readonly number[]): number[] {
  const events = [...model.beam.breaks, ...trainEvents(model), ...borders];
  for (const loadCase of model.document.loadCases) {
    for (const load of loadCase.loads) {
      if (load.kind === 'couple') events.push(load.x);
      else if (load.kind === 'point') {
        events.push(load.x);
        if (load.on !== undefined) events.push(load.x - model.depth, load.x + model.depth);
      } else if (load.kind !== 'moving') events.push(load.from, load.to);
    }
  }
  const inside = events.filter((x) => x >= 0 && x <= model.length);
  return distinct(inside, Math.max(1e-6, 20 * model.hair));
}

/** The gaps between events, each drawn in by three hairs so that it sees its own side of every jump. */
export function gapsBetween(model: Model, events: readonly number[]): Gap[] {
  const margin = 3 * model.hair;
  return events.slice(1).flatMap((to, i): Gap[] => {
    const from = at(events, i);
    return to - from > 4 * margin ? [{ from: from + margin, to: to - margin }] : [];
  });
}

/** Readings of stations, each taken once. */
export function stationReader(model: Model): (x: number) => Reading {
  const known = new Map<number, Reading>();
  return (x) => {
    const before = known.get(x);
    if (before !== undefined) return before;
    const reading = read(model, stationProbe(model, x));
    known.set(x, reading);
    return reading;
  };
}

/** The worst place of each gap. */
export function peaksOf(
  model: Model,
  gaps: readonly Gap[],
  reader: (x: number) => Reading,
  felt: Felt,
): Peak[] {
  return gaps.map((gap) => {
    const { x } = largestBetween((place) => demandOn(model, reader(place), felt).value, gap.from, gap.to, 3);
    return { ...demandOn(model, reader(x), felt), x };
  });
}

export type Quantity = 'shear' | 'moment' | 'deflection';

/** By combination, the range of V, M or w at x over all positions. */
export function rangesAt(model: Model, quantity: Quantity, x: number): Range[] {
  const still = model.cases.map((solved) => solved.still.at(x)[quantity]);
  const unit = {
    shear: model.unit.shearAt,
    moment: model.unit.momentAt,
    deflection: model.unit.deflectionAt,
  }[quantity](x);
  const straight = quantity !== 'deflection' && model.beam.determinate;
  const trains = model.trains.map((train) => trainRange(model, train, unit, [x], straight));
  return combineRanges(model, still, trains);
}

/** By combination: factored sums of values at rest (by case) and of the trains' ranges. */
export function combineRanges(model: Model, still: readonly number[], trains: readonly Range[]): Range[] {
  return model.combinations.map(({ factors }) => {
    let rest = 0;
    factors.forEach((factor, c) => {
      rest += factor * at(still, c);
    });
    const range = { min: rest, max: rest };
    model.trains.forEach((train, t) => {
      const factor = at(factors, train.loadCase);
      const { min, max } = at(trains, t);
      range.min += Math.min(factor * min, factor * max);
      range.max += Math.max(factor * min, factor * max);
    });
    return range;
  });
}

export interface Extreme {
  value: number;
  x: number;
  combination: number;
}

/** The largest magnitude of M or w anywhere, signed. */
export function extremeOf(model: Model, gaps: readonly Gap[], quantity: 'moment' | 'deflection'): Extreme {
  const best: Extreme = { value: 0, x: 0, combination: -1 };
  const worstAt = (x: number): Extreme => {
    const worst: Extreme = { value: 0, x, combination: -1 };
    rangesAt(model, quantity, x).forEach(({ min, max }, combination) => {
      const value = Math.abs(max) >= Math.abs(min) ? max : min;
      if (Math.abs(value) > Math.abs(worst.value) || worst.combination < 0)
        Object.assign(worst, { value, combination });
    });
    return worst;
  };
  for (const gap of gaps) {
    const { x } = largestBetween((place) => Math.abs(worstAt(place).value), gap.from, gap.to, 4);
    const worst = worstAt(x);
    if (Math.abs(worst.value) > Math.abs(best.value) || best.combination < 0) Object.assign(best, worst);
  }
  return best;
}
