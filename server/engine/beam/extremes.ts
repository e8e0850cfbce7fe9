import { evaluate, maximum, upperBound } from '../numeric/polynomial';
import type { Beam, CombinedLoads } from './combinations';
import type { InfluenceLine } from './influence';
import type { Station, StationValues } from './stations';
import { trainExtremes } from './train';

/** Where offset 0 of a train stands; `train` counts the beam's trains. */
export interface Position {
  train: number;
  x: number;
}

/** A largest magnitude, signed, with what brings it about. */
export interface Extreme {
  value: number;
  x: number;
  /** which side of x, where the quantity jumps */
  side: -1 | 1;
  /** index of the combination, −1 where the value is nothing everywhere */
  combination: number;
  positions: Position[];
}

/** Two values are the same where they agree to nine digits; then the earlier combination, then the smaller x counts. */
const same = 1 + 1e-9;

export function largestShear(beam: Beam): Extreme {
  const best: Extreme = { value: 0, x: 0, side: 1, combination: -1, positions: [] };
  beam.combinations.forEach(({ shearPeak }, c) => {
    if (Math.abs(shearPeak.value) > Math.abs(best.value) * same) {
      best.value = shearPeak.value;
      best.x = shearPeak.x;
      best.combination = c;
    }
  });
  const winner = beam.combinations[best.combination];
  if (winner) Object.assign(best, shearPositions(beam, winner, best.x, best.value));
  return best;
}

/** The side of x on which a combination has the given shear, and where its trains stand then. */
export function shearPositions(
  beam: Beam,
  loads: CombinedLoads,
  x: number,
  value: number,
): { side: -1 | 1; positions: Position[] } {
  const { influence, events, system } = beam;
  let best: { side: -1 | 1; positions: Position[] } = { side: x < beam.length ? 1 : -1, positions: [] };
  let error = Infinity;
  for (const side of [1, -1] as const) {
    if ((side === 1 && x >= beam.length) || (side === -1 && x <= 0)) continue;
    const place = placeOn(events, x, side);
    let shear = evaluate(loads.fields.shear, place.u, 3 * place.index, 3);
    const positions: Position[] = [];
    if (influence) {
      const node = system.nodes.findIndex((n) => Math.abs(n.x - x) < 1e-9 * beam.length);
      const span =
        node < 0 ? system.spanAt(x) : Math.min(Math.max(side === 1 ? node : node - 1, 0), system.spans - 1);
      // An axle may stand a hair either side of x: the line is split there.
      const line = influence.shear(x, span);
      for (const { train, factor } of loads.trains) {
        const t = beam.trains[train];
        if (!t) continue;
        const e = trainExtremes(t, line, influence);
        const up = factor > 0 === value > 0;
        shear += factor * (up ? e.max : e.min);
        positions.push({ train, x: up ? e.maxAt : e.minAt });
      }
    }
    const off = Math.abs(shear - value);
    if (off < error * (1 - 1e-9) - 1e-12 * Math.abs(value)) {
      error = off;
      best = { side, positions };
    }
  }
  return best;
}

function placeOn(events: readonly number[], x: number, side: -1 | 1): { index: number; u: number } {
  let index = 0;
  while (
    index < events.length - 2 &&
    (side === 1 ? (events[index + 1] ?? 0) <= x + 1e-9 : (events[index + 1] ?? 0) < x - 1e-9)
  ) {
    index++;
  }
  const a = events[index] ?? 0;
  const b = events[index + 1] ?? 1;
  return { index, u: Math.min(1, Math.max(0, (x - a) / (b - a))) };
}

/** Which of the two fields with one value at each x, and how to get at it. */
interface Quantity {
  field: 'moment' | 'bend';
  count: number;
  max: (v: StationValues) => Float64Array;
  min: (v: StationValues) => Float64Array;
  line: (x: number, span: number) => InfluenceLine | null;
}

/** The largest |M| over combinations and positions. */
export function largestMoment(
  beam: Beam,
  stations: readonly Station[],
  values: readonly (StationValues | null)[],
  floor: number,
): Extreme {
  return largest(beam, stations, values, floor, {
    field: 'moment',
    count: 4,
    max: (v) => v.momentMax,
    min: (v) => v.momentMin,
    line: (x, span) => beam.influence?.moment(x, span) ?? null,
  });
}

/** The largest |w| over combinations and positions. */
export function largestDeflection(
  beam: Beam,
  stations: readonly Station[],
  values: readonly (StationValues | null)[],
  floor: number,
): Extreme {
  const found = largest(beam, stations, values, floor, {
    field: 'bend',
    count: 6,
    max: (v) => v.bendMax,
    min: (v) => v.bendMin,
    line: (x, span) => beam.influence?.bend(x, span) ?? null,
  });
  return { ...found, value: found.value / beam.EI };
}

/** @param floor the largest magnitude that the stations show already: it bounds the search between them */
function largest(
  beam: Beam,
  stations: readonly Station[],
  values: readonly (StationValues | null)[],
  floor: number,
  q: Quantity,
): Extreme {
  const best: Extreme = { value: 0, x: 0, side: 1, combination: -1, positions: [] };
  beam.combinations.forEach((loads, c) => {
    const v = values[c] ?? null;
    const least = Math.max(floor * (1 - 1e-9), Math.abs(best.value));
    const found = v ? largestMoving(beam, stations, loads, v, q, least) : largestStill(beam, loads, q, least);
    if (found && Math.abs(found.value) > Math.abs(best.value) * same)
      Object.assign(best, found, { combination: c });
  });
  return best;
}

function largestStill(
  beam: Beam,
  loads: CombinedLoads,
  q: Quantity,
  floor: number,
): Omit<Extreme, 'combination'> | null {
  const { events } = beam;
  const coefficients = loads.fields[q.field];
  let best: Omit<Extreme, 'combination'> | null = null;
  let size = floor;
  const c: number[] = new Array<number>(q.count).fill(0);
  for (let i = 0; i + 1 < events.length; i++) {
    let most = 0;
    for (let d = 0; d < q.count; d++) most += Math.abs(coefficients[q.count * i + d] ?? 0);
    if (most <= size) continue;
    for (const sign of [1, -1] as const) {
      for (let d = 0; d < q.count; d++) c[d] = sign * (coefficients[q.count * i + d] ?? 0);
      if (upperBound(c, 0, q.count) <= size) continue;
      const top = maximum(c);
      if (top.value > size && (best === null || top.value > Math.abs(best.value) * same)) {
        const a = events[i] ?? 0;
        const x = a + top.u * ((events[i + 1] ?? 0) - a);
        best = { value: sign * top.value, x, side: top.u === 1 ? -1 : 1, positions: [] };
        size = top.value;
      }
    }
  }
  return best;
}

function largestMoving(
  beam: Beam,
  stations: readonly Station[],
  loads: CombinedLoads,
  values: StationValues,
  q: Quantity,
  floor: number,
): Omit<Extreme, 'combination'> | null {
  let best: Omit<Extreme, 'combination'> | null = null;
  let size = floor;
  for (const sign of [1, -1] as const) {
    const at = sign === 1 ? q.max(values) : q.min(values);
    const note = (x: number, side: -1 | 1, value: number, near: Station): void => {
      if (!(value > size) || (best !== null && value <= Math.abs(best.value) * same)) return;
      size = value;
      best = { value: sign * value, x, side, positions: effect(beam, loads, q, x, near, sign).positions };
    };
    stations.forEach((s, i) => note(s.x, s.side, sign * (at[i] ?? 0), s));
    for (let i = 0; i + 1 < stations.length; i++) {
      const a = stations[i];
      const b = stations[i + 1];
      if (!a || !b || b.x <= a.x) continue;
      const fa = sign * (at[i] ?? 0);
      const fb = sign * (at[i + 1] ?? 0);
      // No value in between can be more than the ends and the steepest slope allow.
      const slope =
        q.field === 'moment'
          ? Math.max(
              ...[i, i + 1].flatMap((k) => [
                Math.abs(values.shearMax[k] ?? 0),
                Math.abs(values.shearMin[k] ?? 0),
              ]),
            )
          : Math.max(Math.abs(fb - fa), ...neighbours(at, i)) / (b.x - a.x);
      if ((fa + fb) / 2 + (slope * (b.x - a.x)) / 2 <= size) continue;
      const near: Station = { ...a, side: 1 };
      const found = peakBetween((x) => effect(beam, loads, q, x, near, sign).value * sign, a.x, b.x, fa, fb);
      note(found.x, 1, found.value, near);
    }
  }
  return best;
}

function neighbours(at: Float64Array, i: number): number[] {
  const rise = (k: number): number => Math.abs((at[k + 1] ?? at[k] ?? 0) - (at[k] ?? 0));
  return [rise(Math.max(0, i - 1)), rise(i), i + 2 < at.length ? rise(i + 1) : 0];
}

/** The largest effect at one x within the segment and span of a station, and the positions that bring it. */
function effect(
  beam: Beam,
  loads: CombinedLoads,
  q: Quantity,
  x: number,
  near: Station,
  sign: 1 | -1,
): { value: number; positions: Position[] } {
  const { events, influence } = beam;
  const a = events[near.segment] ?? 0;
  const u = Math.min(1, Math.max(0, (x - a) / ((events[near.segment + 1] ?? 0) - a)));
  let value = evaluate(loads.fields[q.field], u, q.count * near.segment, q.count);
  const positions: Position[] = [];
  const line = q.line(x, near.span);
  if (line && influence) {
    for (const { train, factor } of loads.trains) {
      const t = beam.trains[train];
      if (!t) continue;
      const e = trainExtremes(t, line, influence);
      const up = factor * sign > 0;
      value += factor * (up ? e.max : e.min);
      positions.push({ train, x: up ? e.maxAt : e.minAt });
    }
  }
  return { value, positions };
}

/**
 * The largest value between a and b, if it is inside: four parts first, as peaks under different axles may lie
 * side by side, then a parabola through the best three, over and over (Brent 1973, without its golden steps
 * while the parabola stays inside). The upper edge of smooth curves has smooth peaks, so this converges fast.
 */
function peakBetween(
  f: (x: number) => number,
  a: number,
  b: number,
  fa: number,
  fb: number,
): { x: number; value: number } {
  const h = (b - a) / 4;
  const values = [fa, f(a + h), f(a + 2 * h), f(a + 3 * h), fb];
  let best = 0;
  for (let i = 1; i < 5; i++) if ((values[i] ?? 0) > (values[best] ?? 0)) best = i;
  const middle = Math.min(3, Math.max(1, best));
  let x0 = a + (middle - 1) * h;
  let x1 = a + middle * h;
  let x2 = a + (middle + 1) * h;
  let f0 = values[middle - 1] ?? 0;
  let f1 = values[middle] ?? 0;
  let f2 = values[middle + 1] ?? 0;
  if (f1 < f0 || f1 < f2) return f0 > f2 ? { x: x0, value: f0 } : { x: x2, value: f2 };
  const close = 1e-8 * (b - a);
  for (let i = 0; i < 30 && x2 - x0 > close; i++) {
    const p = (x1 - x0) * (f1 - f2);
    const q = (x1 - x2) * (f1 - f0);
    const step = (p * (x1 - x0) - q * (x1 - x2)) / (2 * (p - q));
    let x = x1 - step;
    const half = x1 - x0 > x2 - x1 ? (x0 + x1) / 2 : (x1 + x2) / 2;
    if (!(x > x0 && x < x2) || (i % 4 === 3 && Math.abs(x - x1) > close)) x = half;
    if (Math.abs(x - x1) <= close) break;
    const value = f(x);
    if (value >= f1) {
      if (x < x1) {
        x2 = x1;
        f2 = f1;
      } else {
        x0 = x1;
        f0 = f1;
      }
      x1 = x;
      f1 = value;
    } else if (x < x1) {
      x0 = x;
      f0 = value;
    } else {
      x2 = x;
      f2 = value;
    }
  }
  return { x: x1, value: f1 };
}
