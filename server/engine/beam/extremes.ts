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
      // A hair beside x: an axle may stand exactly there, at the end of its travel.
      const beside = Math.min(Math.max(x + side * 1e-11 * beam.length, 0), beam.length);
      const line = influence.shear(beside, system.spanAt(beside));
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
      if (mostBetween(beam, values, q, i, a, b, fa, fb) <= size) continue;
      const near: Station = { ...a, side: 1 };
      const found = peakBetween((x) => effect(beam, loads, q, x, near, sign).value * sign, a.x, b.x, fa, fb);
      note(found.x, 1, found.value, near);
    }
  }
  return best;
}

/**
 * What no value between two stations can exceed: for M what the ends and the steepest shear there allow, for w
 * what the curvature of a span's deflection can add over so short a part of it, five times over.
 */
function mostBetween(
  beam: Beam,
  values: StationValues,
  q: Quantity,
  i: number,
  a: Station,
  b: Station,
  fa: number,
  fb: number,
): number {
  const h = b.x - a.x;
  if (q.field === 'bend') {
    const part = h / beam.system.spanLength(a.span);
    return Math.max(fa, fb) + 5 * part * part * Math.max(Math.abs(fa), Math.abs(fb));
  }
  let slope = 0;
  for (const k of [i, i + 1]) {
    slope = Math.max(slope, Math.abs(values.shearMax[k] ?? 0), Math.abs(values.shearMin[k] ?? 0));
  }
  return (fa + fb + slope * h) / 2;
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
 * The largest value between a and b: eight parts first, as peaks under different axles may lie side by side, then
 * Brent's search (1973) about every part that stands out: parabolas through the best three while they shrink the
 * bracket, golden sections where they do not.
 */
function peakBetween(
  f: (x: number) => number,
  a: number,
  b: number,
  fa: number,
  fb: number,
): { x: number; value: number } {
  const parts = 8;
  const h = (b - a) / parts;
  const values = [fa];
  for (let i = 1; i < parts; i++) values.push(f(a + i * h));
  values.push(fb);
  let best = fa >= fb ? { x: a, value: fa } : { x: b, value: fb };
  const at = (i: number): number => values[i] ?? -Infinity;
  for (let i = 1; i < parts; i++) {
    if (at(i) < at(i - 1) || at(i) < at(i + 1)) continue;
    const found = brentMaximum(f, a + (i - 1) * h, a + i * h, a + (i + 1) * h, at(i));
    if (found.value > best.value) best = found;
  }
  // A peak beside an end shows only in what the last part does.
  for (const [low, high, end] of [
    [a, a + h, at(1) < fa],
    [b - h, b, at(parts - 1) < fb],
  ] as const) {
    if (!end) continue;
    const middle = (low + high) / 2;
    const found = brentMaximum(f, low, middle, high, f(middle));
    if (found.value > best.value) best = found;
  }
  return best;
}

function brentMaximum(
  f: (x: number) => number,
  low: number,
  start: number,
  high: number,
  startValue: number,
): { x: number; value: number } {
  const golden = (3 - Math.sqrt(5)) / 2;
  const tolerance = 1e-8 * (high - low);
  let a = low;
  let b = high;
  let x = start;
  let w = start;
  let v = start;
  let fx = startValue;
  let fw = startValue;
  let fv = startValue;
  let step = 0;
  let before = 0;
  for (let i = 0; i < 60; i++) {
    const middle = (a + b) / 2;
    if (Math.abs(x - middle) <= 2 * tolerance - (b - a) / 2) break;
    let parabola = false;
    if (Math.abs(before) > tolerance) {
      const r = (x - w) * (fx - fv);
      const q0 = (x - v) * (fx - fw);
      let p = (x - v) * q0 - (x - w) * r;
      let q = 2 * (q0 - r);
      if (q > 0) p = -p;
      q = Math.abs(q);
      if (Math.abs(p) < Math.abs((q * before) / 2) && p > q * (a - x) && p < q * (b - x)) {
        before = step;
        step = p / q;
        parabola = true;
        if (x + step - a < 2 * tolerance || b - x - step < 2 * tolerance)
          step = x < middle ? tolerance : -tolerance;
      }
    }
    if (!parabola) {
      before = x < middle ? b - x : a - x;
      step = golden * before;
    }
    const u = Math.abs(step) >= tolerance ? x + step : x + (step > 0 ? tolerance : -tolerance);
    const fu = f(u);
    if (fu >= fx) {
      if (u < x) b = x;
      else a = x;
      [v, fv, w, fw, x, fx] = [w, fw, x, fx, u, fu];
    } else {
      if (u < x) a = u;
      else b = u;
      if (fu >= fw || w === x) [v, fv, w, fw] = [w, fw, u, fu];
      else if (fu >= fv || v === x || v === w) [v, fv] = [u, fu];
    }
  }
  return { x, value: fx };
}
