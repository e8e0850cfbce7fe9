/** One scale along the beam for everything that is drawn above each other: mm to pixels and back. */
export interface XScale {
  left: number;
  right: number;
  /** mm */
  length: number;
  /** pixels a mm */
  factor: number;
  at: (x: number) => number;
  back: (pixel: number) => number;
}

/** Lays a beam of `length` mm between two pixels. */
export function xScale(length: number, left: number, right: number): XScale {
  const factor = (right - left) / length;
  return {
    left,
    right,
    length,
    factor,
    at: (x) => left + x * factor,
    back: (pixel) => Math.min(length, Math.max(0, (pixel - left) / factor)),
  };
}

const r = (value: number): string => String(Math.round(value * 10) / 10);

/** A line through points given by their x and y in pixels. */
export function polyline(xs: readonly number[], ys: readonly number[]): string {
  return xs.map((x, index) => `${index === 0 ? 'M' : 'L'}${r(x)} ${r(ys[index] ?? 0)}`).join('');
}

/** The area between such a line and a base. */
export function areaTo(xs: readonly number[], ys: readonly number[], base: number): string {
  const first = xs[0];
  const last = xs.at(-1);
  if (first === undefined || last === undefined) return '';
  return `M${r(first)} ${r(base)}L${polyline(xs, ys).slice(1)}L${r(last)} ${r(base)}Z`;
}

/** Index of the largest value by `weigh`; −1 of an empty list. */
export function indexOfMost(values: readonly number[], weigh: (value: number) => number): number {
  let best = -1;
  let most = -Infinity;
  values.forEach((value, index) => {
    if (weigh(value) > most) {
      most = weigh(value);
      best = index;
    }
  });
  return best;
}

/** A stretch of the beam on which something is constant. */
export interface Step {
  from: number;
  to: number;
  value: number;
}

/**
 * Where a curve given at stations (x may repeat at a jump) lies above a step function: polygons of (x, curve, step),
 * cut where they cross.
 */
export function stretchesAbove(
  x: readonly number[],
  curve: readonly number[],
  steps: readonly Step[],
): { x: number; curve: number; step: number }[][] {
  const found: { x: number; curve: number; step: number }[][] = [];
  for (const step of steps) {
    let open: { x: number; curve: number; step: number }[] = [];
    const close = () => {
      if (open.length > 1) found.push(open);
      open = [];
    };
    for (let i = 1; i < x.length; i += 1) {
      const cut = cutSegment(x[i - 1] ?? 0, curve[i - 1] ?? 0, x[i] ?? 0, curve[i] ?? 0, step);
      if (cut === null) continue;
      const last = open.at(-1);
      if (last !== undefined && Math.abs(last.x - cut[0].x) > 1e-6) close();
      open.push(...cut);
    }
    close();
  }
  return found;
}

type Point = { x: number; curve: number; step: number };

const cutSegment = (x0: number, y0: number, x1: number, y1: number, step: Step): [Point, Point] | null => {
  const a = Math.max(x0, step.from);
  const b = Math.min(x1, step.to);
  if (b < a || (b === a && x1 !== x0)) return null;
  const y = (x: number) => (x1 === x0 ? y0 : y0 + ((y1 - y0) * (x - x0)) / (x1 - x0));
  const [ya, yb] = x1 === x0 ? [y0, y1] : [y(a), y(b)];
  const limit = step.value * (1 + 1e-9);
  if (ya <= limit && yb <= limit) return null;
  const crossing = yb === ya ? a : a + ((b - a) * (step.value - ya)) / (yb - ya);
  const from: Point =
    ya > limit ? { x: a, curve: ya, step: step.value } : { x: crossing, curve: step.value, step: step.value };
  const to: Point =
    yb > limit ? { x: b, curve: yb, step: step.value } : { x: crossing, curve: step.value, step: step.value };
  return [from, to];
};

/** A written figure that wants its place; those that come first keep theirs. */
export interface WantedLabel {
  x: number;
  y: number;
  text: string;
  anchor: 'start' | 'middle' | 'end';
}

const CHARACTER = 6.2;

/** The pixels that a label takes from left to right. */
export const labelSpan = ({ x, text, anchor }: WantedLabel): [number, number] => {
  const wide = text.length * CHARACTER;
  const from = anchor === 'start' ? x : anchor === 'end' ? x - wide : x - wide / 2;
  return [from, from + wide];
};

/** Leaves out labels that would run into one that is already written. */
export function withoutCollisions<T extends WantedLabel>(labels: readonly T[], lineHeight = 12): T[] {
  const kept: T[] = [];
  for (const label of labels) {
    const [from, to] = labelSpan(label);
    const free = kept.every((other) => {
      const [start, end] = labelSpan(other);
      return to + 4 < start || from - 4 > end || Math.abs(other.y - label.y) >= lineHeight;
    });
    if (free) kept.push(label);
  }
  return kept;
}

/** Where a label at `x` is anchored so that it stays between the ends of the scale. */
export function anchorAt(
  x: number,
  scale: XScale,
  text: string,
): { x: number; anchor: 'start' | 'middle' | 'end' } {
  const half = (text.length * CHARACTER) / 2;
  if (x - half < scale.left) return { x: Math.max(x, scale.left) + 4, anchor: 'start' };
  if (x + half > scale.right) return { x: Math.min(x, scale.right) - 4, anchor: 'end' };
  return { x, anchor: 'middle' };
}
