import type { MovingLoad } from '@shared/schemas/member';
import type { Influence, InfluenceLine } from './influence';

/** A moving load made ready: axles in order, and the stretches of travel over which nothing changes sides. */
export interface Train {
  /** where it stands in the document */
  caseIndex: number;
  loadIndex: number;
  on: string | undefined;
  offsets: Float64Array;
  values: Float64Array;
  from: number;
  to: number;
  /** travel cut where an axle passes a node: stretch k runs from stops[k] to ends[k] (may have no length) */
  stops: Float64Array;
  ends: Float64Array;
  /** span of axle i on stretch k at spans[k·axles + i], −1 off the beam */
  spans: Int32Array;
}

/** Largest and smallest effect of a train, and the position of its offset 0 for each. */
export interface TrainExtremes {
  max: number;
  maxAt: number;
  min: number;
  minAt: number;
}

/** Prepares a moving load for a beam. An axle beyond the beam's ends carries nothing; on an end it counts. */
export function prepareTrain(
  load: MovingLoad,
  caseIndex: number,
  loadIndex: number,
  influence: Influence,
): Train {
  const axles = mergeAxles(load);
  const { starts } = influence;
  const length = starts[starts.length - 1] ?? 0;
  const stretches: [number, number][] = [];
  const places = new Set<number>([load.from, load.to]);
  const entries = new Set<number>();
  for (const { offset } of axles) {
    starts.forEach((x, n) => {
      const p = x - offset;
      if (p >= load.from && p <= load.to) {
        places.add(p);
        if (n === 0 || n === starts.length - 1) entries.add(p);
      }
    });
  }
  if (load.from === load.to) entries.add(load.from);
  const sorted = [...places].sort((a, b) => a - b);
  sorted.forEach((p, i) => {
    // A stretch of no length: just here an axle stands on the beam's very end.
    if (entries.has(p)) stretches.push([p, p]);
    const next = sorted[i + 1];
    if (next !== undefined) stretches.push([p, next]);
  });
  const n = axles.length;
  const spans = new Int32Array(stretches.length * n);
  stretches.forEach(([a, b], k) => {
    axles.forEach(({ offset }, i) => {
      let place = (a + b) / 2 + offset;
      if (a === b) {
        // Take back the rounding of x − offset + offset.
        if (Math.abs(place) < 1e-9 * length) place = 0;
        if (Math.abs(place - length) < 1e-9 * length) place = length;
      }
      spans[k * n + i] = place < 0 || place > length ? -1 : influence.system.spanAt(place);
    });
  });
  return {
    caseIndex,
    loadIndex,
    on: load.on,
    offsets: Float64Array.from(axles, (a) => a.offset),
    values: Float64Array.from(axles, (a) => a.value),
    from: load.from,
    to: load.to,
    stops: Float64Array.from(stretches, ([a]) => a),
    ends: Float64Array.from(stretches, ([, b]) => b),
    spans,
  };
}

/** Axles in order along the beam; those at one place are one axle, as nothing can stand between them. */
function mergeAxles(load: MovingLoad): { offset: number; value: number }[] {
  const merged: { offset: number; value: number }[] = [];
  for (const axle of [...load.axles].sort((a, b) => a.offset - b.offset)) {
    const last = merged[merged.length - 1];
    if (last && last.offset === axle.offset) last.value += axle.value;
    else merged.push({ ...axle });
  }
  return merged;
}

/** Value and slope of an influence line summed over the axles, on the piece that holds the middle of a stretch. */
export class TrainSum {
  value = 0;
  slope = 0;

  constructor(
    readonly train: Train,
    readonly line: InfluenceLine,
    readonly influence: Influence,
  ) {}

  /** Evaluates at p with the pieces that hold at `middle`, on stretch k. */
  at(k: number, p: number, middle: number): void {
    const { train, line, influence } = this;
    const { offsets, values, spans } = train;
    const n = offsets.length;
    let value = 0;
    let slope = 0;
    for (let i = 0; i < n; i++) {
      const e = spans[k * n + i] ?? -1;
      if (e < 0) continue;
      const offset = offsets[i] ?? 0;
      let piece = line.first[e] ?? 0;
      const last = (line.first[e + 1] ?? 0) - 1;
      while (piece < last && (line.edges[piece + 1] ?? 0) < middle + offset) piece++;
      const length = influence.lengths[e] ?? 1;
      const t = (p + offset - (influence.starts[e] ?? 0)) / length;
      const j = 4 * piece;
      const c1 = line.cubic[j + 1] ?? 0;
      const c2 = line.cubic[j + 2] ?? 0;
      const c3 = line.cubic[j + 3] ?? 0;
      const load = values[i] ?? 0;
      value += load * ((line.cubic[j] ?? 0) + t * (c1 + t * (c2 + t * c3)));
      slope += (load * (c1 + t * (2 * c2 + t * 3 * c3))) / length;
    }
    this.value = value;
    this.slope = slope;
  }
}

/** Calls `visit` for each part of the travel on which the sum over the axles is one cubic. */
export function eachStretch(
  train: Train,
  line: InfluenceLine,
  visit: (stretch: number, from: number, to: number) => void,
  extra: readonly number[] = [],
): void {
  const { stops, ends, offsets } = train;
  const cuts: number[] = [...extra];
  for (const x of line.splits) for (const offset of offsets) cuts.push(x - offset);
  cuts.sort((a, b) => a - b);
  let next = 0;
  for (let k = 0; k < stops.length; k++) {
    let from = stops[k] ?? 0;
    const to = ends[k] ?? 0;
    while (next < cuts.length && (cuts[next] ?? 0) <= from) next++;
    while (next < cuts.length && (cuts[next] ?? 0) < to) {
      const cut = cuts[next] ?? 0;
      if (cut > from) visit(k, from, cut);
      from = cut;
      next++;
    }
    visit(k, from, to);
  }
}

/**
 * Largest and smallest effect of a train over its travel, exactly: the sum of the axles' cubics at the ends of
 * every stretch and where its slope vanishes inside. Ties go to the position farthest left.
 */
export function trainExtremes(train: Train, line: InfluenceLine, influence: Influence): TrainExtremes {
  const result: TrainExtremes = { max: -Infinity, maxAt: train.from, min: Infinity, minAt: train.from };
  const sum = new TrainSum(train, line, influence);
  const { stops, ends, offsets } = train;
  const cuts: number[] = [];
  for (const x of line.splits) for (let i = 0; i < offsets.length; i++) cuts.push(x - (offsets[i] ?? 0));
  if (line.splits.length > 0 && cuts.length > 1) cuts.sort(ascending);
  let next = 0;
  for (let k = 0; k < stops.length; k++) {
    let from = stops[k] ?? 0;
    const end = ends[k] ?? 0;
    while (next < cuts.length && (cuts[next] ?? 0) <= from) next++;
    for (;;) {
      const cut = cuts[next];
      const inside = cut !== undefined && cut < end;
      const to = inside ? cut : end;
      extremesOfStretch(sum, k, from, to, result);
      if (!inside) break;
      from = to;
      next++;
      while (next < cuts.length && (cuts[next] ?? 0) <= from) next++;
    }
  }
  return result;
}

function ascending(a: number, b: number): number {
  return a - b;
}

function extremesOfStretch(sum: TrainSum, k: number, a: number, b: number, result: TrainExtremes): void {
  const middle = (a + b) / 2;
  sum.at(k, a, middle);
  const fa = sum.value;
  const h = b - a;
  const sa = h * sum.slope;
  note(result, a, fa);
  if (h === 0) return;
  sum.at(k, b, middle);
  const fb = sum.value;
  note(result, b, fb);
  const roots = stationary(fb - fa, sa, h * sum.slope);
  for (let i = 0; i < roots.length; i++) {
    const u = roots[i] ?? -1;
    if (!(u > 0 && u < 1)) continue;
    sum.at(k, a + u * h, middle);
    note(result, a + u * h, sum.value);
  }
}

function note(result: TrainExtremes, p: number, value: number): void {
  if (value > result.max) {
    result.max = value;
    result.maxAt = p;
  }
  if (value < result.min) {
    result.min = value;
    result.minAt = p;
  }
}

const none: readonly number[] = [];

/** Where a cubic with the given rise and end slopes (per unit of u) has no slope; candidates in and out of 0…1. */
export function stationary(rise: number, slopeAtStart: number, slopeAtEnd: number): readonly number[] {
  // Monotone when both slopes go with the rise and are at most three times it (Fritsch and Carlson 1980).
  if (rise !== 0) {
    const alpha = slopeAtStart / rise;
    const beta = slopeAtEnd / rise;
    if (alpha >= 0 && beta >= 0 && alpha <= 3 && beta <= 3) return none;
  } else if (slopeAtStart === 0 && slopeAtEnd === 0) return none;
  // d/du = s0 + 2(3r − 2s0 − s1)u + 3(s0 + s1 − 2r)u²
  const c0 = slopeAtStart;
  const c1 = 2 * (3 * rise - 2 * slopeAtStart - slopeAtEnd);
  const c2 = 3 * (slopeAtStart + slopeAtEnd - 2 * rise);
  const discriminant = c1 * c1 - 4 * c2 * c0;
  if (!(discriminant >= 0)) return none;
  const s = -0.5 * (c1 + (c1 >= 0 ? 1 : -1) * Math.sqrt(discriminant));
  return [c2 === 0 ? NaN : s / c2, s === 0 ? NaN : c0 / s];
}
