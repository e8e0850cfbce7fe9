import { stationary, eachStretch, TrainSum, type Train } from './train';
import { signChanges } from '../numeric/polynomial';
import type { Influence } from './influence';

/**
 * The largest (or smallest) shear a train can bring to each x, exactly, as a piecewise cubic of x.
 *
 * While j axles stand left of x, the shear at x depends on the train's position p alone: V(x; p) = F_j(p).
 * The positions that keep j axles left form a window x − o_{j+1} ≤ p ≤ x − o_j that slides with x, so the
 * largest shear is F_j at either end of the window, or at a peak of F_j inside it. The envelope is the upper
 * edge of these few curves, cut where they cross.
 */
export interface PiecewiseCubic {
  /** n + 1 breaks, mm, from 0 to the beam's length */
  breaks: number[];
  /** four coefficients a piece, in the piece's local u from 0 to 1 */
  cubic: number[];
}

/** One curve over part of a span: values at the thirds of [from, to] tell the cubic. */
interface Curve {
  from: number;
  to: number;
  /** coefficients in u from 0 at `from` to 1 at `to` */
  c: [number, number, number, number];
}

/** The envelope for one train: `sign` 1 for the largest, −1 for the smallest shear. */
export function shearEnvelope(train: Train, influence: Influence, sign: 1 | -1): PiecewiseCubic {
  const envelope: PiecewiseCubic = { breaks: [influence.starts[0] ?? 0], cubic: [] };
  for (let m = 0; m < influence.lengths.length; m++) {
    const begin = influence.starts[m] ?? 0;
    const end = influence.starts[m + 1] ?? 0;
    const tracks = spanTracks(train, influence, m, sign);
    upperEdge(tracks, begin, end, sign, envelope);
  }
  return envelope;
}

function spanTracks(train: Train, influence: Influence, m: number, sign: 1 | -1): Curve[][] {
  const { offsets, values } = train;
  const n = offsets.length;
  const begin = influence.starts[m] ?? 0;
  const end = influence.starts[m + 1] ?? 0;
  const left = influence.spanShear(m, -1);
  const right = influence.spanShear(m, 1);
  const tracks: Curve[][] = [];
  for (let j = 0; j <= n; j++) {
    const leftOf = j > 0 ? (offsets[j - 1] ?? 0) : -Infinity; // o_j, the last axle left of x
    const rightOf = j < n ? (offsets[j] ?? 0) : Infinity; // o_{j+1}, the first axle right of x
    const first = j < n ? begin - rightOf : train.from;
    const last = j > 0 ? end - leftOf : train.to;
    const lower: Curve[] = [];
    const upper: Curve[] = [];
    const peaks: { p: number; value: number }[] = [];
    const leftSum = new TrainSum(
      { ...train, values: values.map((v, i) => (i < j ? v : 0)) },
      left,
      influence,
    );
    const rightSum = new TrainSum(
      { ...train, values: values.map((v, i) => (i < j ? 0 : v)) },
      right,
      influence,
    );
    let before = { value: NaN, slope: 0 };
    const cut = [first, last].filter((p) => Number.isFinite(p));
    eachStretch(
      train,
      left,
      (k, a, b) => {
        const middle = (a + b) / 2;
        if (middle < first || middle > last) {
          if (!(a === b && a >= first && a <= last)) return;
        }
        const at = (p: number): { value: number; slope: number } => {
          leftSum.at(k, p, middle);
          rightSum.at(k, p, middle);
          return {
            value: sign * (leftSum.value + rightSum.value),
            slope: sign * (leftSum.slope + rightSum.slope),
          };
        };
        const fa = at(a);
        if (before.value !== fa.value || (before.slope >= 0 && fa.slope <= 0))
          peaks.push({ p: a, value: fa.value });
        const h = b - a;
        if (h === 0) {
          before = { value: NaN, slope: 0 };
          return;
        }
        const fb = at(b);
        const s0 = h * fa.slope;
        const s1 = h * fb.slope;
        const rise = fb.value - fa.value;
        const c: Curve['c'] = [fa.value, s0, 3 * rise - 2 * s0 - s1, s0 + s1 - 2 * rise];
        if (j < n) clip(lower, a + rightOf, b + rightOf, c, begin, end);
        if (j > 0) clip(upper, a + leftOf, b + leftOf, c, begin, end);
        for (const u of stationary(rise, s0, s1)) {
          if (u > 0 && u < 1) peaks.push({ p: a + u * h, value: at(a + u * h).value });
        }
        peaks.push({ p: b, value: fb.value });
        before = fb;
      },
      cut,
    );
    if (lower.length > 0) tracks.push(lower);
    if (upper.length > 0) tracks.push(upper);
    const steps = slidingPeaks(peaks, leftOf, rightOf, begin, end);
    if (steps.length > 0) tracks.push(steps);
  }
  return tracks;
}

/** Adds the part of a curve that lies within the span. */
function clip(track: Curve[], from: number, to: number, c: Curve['c'], begin: number, end: number): void {
  const a = Math.max(from, begin);
  const b = Math.min(to, end);
  if (!(b > a)) return;
  track.push({ from: a, to: b, c: shift(c, (a - from) / (to - from), (b - from) / (to - from)) });
}

function shift(c: Curve['c'], a: number, b: number): Curve['c'] {
  if (a === 0 && b === 1) return c;
  const h = b - a;
  const [c0, c1, c2, c3] = c;
  return [
    c0 + a * (c1 + a * (c2 + a * c3)),
    h * (c1 + a * (2 * c2 + 3 * a * c3)),
    h * h * (c2 + 3 * a * c3),
    h * h * h * c3,
  ];
}

/** The best peak inside the window at each x, as steps: peaks come in rising p (a monotone queue). */
function slidingPeaks(
  peaks: { p: number; value: number }[],
  leftOf: number,
  rightOf: number,
  begin: number,
  end: number,
): Curve[] {
  // Peak p is inside for p + o_j ≤ x ≤ p + o_{j+1}.
  const queue: { opens: number; closes: number; value: number }[] = [];
  const steps: Curve[] = [];
  let x = begin;
  let head = 0;
  const emit = (to: number): void => {
    while (x < to) {
      while (head < queue.length && (queue[head]?.closes ?? 0) <= x) head++;
      const best = queue[head];
      if (!best) {
        x = to;
        return;
      }
      const stop = Math.min(to, best.closes);
      if (stop > x) steps.push({ from: x, to: stop, c: [best.value, 0, 0, 0] });
      x = stop;
    }
  };
  for (const { p, value } of peaks) {
    const opens = Math.max(begin, p + leftOf);
    const closes = Math.min(end, p + rightOf);
    if (opens >= end) break;
    if (closes <= begin) continue;
    emit(opens);
    while (queue.length > head && (queue[queue.length - 1]?.value ?? 0) <= value) queue.pop();
    queue.push({ opens, closes, value });
  }
  emit(end);
  return steps;
}

/** Appends the upper edge of the tracks over one span; nothing where no track holds (no load can act). */
function upperEdge(tracks: Curve[][], begin: number, end: number, sign: 1 | -1, out: PiecewiseCubic): void {
  const smallest = (end - begin) * 1e-12;
  const stops: number[] = [begin, end];
  for (const track of tracks) for (const curve of track) stops.push(curve.from, curve.to);
  stops.sort((a, b) => a - b);
  const pointers = new Int32Array(tracks.length);
  let a = begin;
  for (const b of stops) {
    if (b - a <= smallest) continue;
    const middle = (a + b) / 2;
    const active: Curve['c'][] = [];
    tracks.forEach((track, i) => {
      let k = pointers[i] ?? 0;
      while (k < track.length && (track[k]?.to ?? 0) <= middle) k++;
      pointers[i] = k;
      const curve = track[k];
      if (curve && curve.from < middle) {
        const w = curve.to - curve.from;
        active.push(shift(curve.c, (a - curve.from) / w, (b - curve.from) / w));
      }
    });
    appendUpper(active, a, b, sign, out);
    a = b;
  }
  if (a < end) {
    // Rounding left a sliver: stretch the last piece over it.
    out.breaks[out.breaks.length - 1] = end;
  }
}

function appendUpper(active: Curve['c'][], a: number, b: number, sign: 1 | -1, out: PiecewiseCubic): void {
  const push = (c: Curve['c'], to: number): void => {
    out.breaks.push(to);
    out.cubic.push(sign * c[0], sign * c[1], sign * c[2], sign * c[3]);
  };
  const kept = undominated(active);
  const [only] = kept;
  if (!only) return push([0, 0, 0, 0], b);
  if (kept.length === 1) return push(only, b);
  const cuts = new Set<number>();
  for (let i = 0; i < kept.length; i++) {
    for (let k = i + 1; k < kept.length; k++) {
      const p = kept[i];
      const q = kept[k];
      if (p && q) for (const u of crossings(p, q)) cuts.add(u);
    }
  }
  const stops = [...cuts].filter((u) => u > 1e-12 && u < 1 - 1e-12).sort((x, y) => x - y);
  let from = 0;
  let current: Curve['c'] | null = null;
  let start = 0;
  for (const to of [...stops, 1]) {
    const middle = (from + to) / 2;
    let best = only;
    let value = -Infinity;
    for (const c of kept) {
      const v = c[0] + middle * (c[1] + middle * (c[2] + middle * c[3]));
      if (v > value) {
        value = v;
        best = c;
      }
    }
    if (current && best !== current) {
      push(shift(current, start, from), a + from * (b - a));
      start = from;
    }
    current = best;
    from = to;
  }
  if (current) push(shift(current, start, 1), b);
}

/** Bernstein coefficients of a cubic. */
function control(c: Curve['c']): [number, number, number, number] {
  const b1 = c[0] + c[1] / 3;
  const b2 = b1 + (c[1] + c[2]) / 3;
  return [c[0], b1, b2, c[0] + c[1] + c[2] + c[3]];
}

function undominated(curves: Curve['c'][]): Curve['c'][] {
  const kept: Curve['c'][] = [];
  for (const c of curves) {
    const p = control(c);
    const below = (over: Curve['c']): boolean => {
      const q = control(over);
      return q[0] >= p[0] && q[1] >= p[1] && q[2] >= p[2] && q[3] >= p[3];
    };
    if (kept.some(below)) continue;
    for (let i = kept.length - 1; i >= 0; i--) {
      const q = control(kept[i] ?? c);
      if (p[0] >= q[0] && p[1] >= q[1] && p[2] >= q[2] && p[3] >= q[3]) kept.splice(i, 1);
    }
    kept.push(c);
  }
  return kept;
}

function crossings(p: Curve['c'], q: Curve['c']): number[] {
  const d: number[] = [p[0] - q[0], p[1] - q[1], p[2] - q[2], p[3] - q[3]];
  const size = Math.max(Math.abs(p[0]), Math.abs(q[0]), Math.abs(p[1]), Math.abs(q[1])) * 1e-14;
  // A cubic or square part that is only rounding would send the closed root formula astray.
  while (d.length > 1 && Math.abs(d[d.length - 1] ?? 0) <= size) d.pop();
  return signChanges(d);
}
