import { evaluate, maximum, restrict, upperBound } from './polynomial';

/**
 * A function of x made of cubics: piece i holds between breaks[i] and breaks[i+1] with four coefficients in
 * the local u. It may jump at a break; each side keeps its own value there.
 */
export interface Piecewise {
  breaks: ArrayLike<number>;
  cubic: ArrayLike<number>;
}

export interface Peak {
  value: number;
  x: number;
}

/** Index of the piece that holds x; at a break the piece on the given side. */
export function pieceAt(f: Piecewise, x: number, side: -1 | 1): number {
  let low = 0;
  let high = f.breaks.length - 2;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    const at = f.breaks[middle] ?? 0;
    if (side === 1 ? at <= x + 1e-9 : at < x - 1e-9) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** Value at x; at a break the limit from the given side. */
export function valueAt(f: Piecewise, x: number, side: -1 | 1): number {
  const i = pieceAt(f, x, side);
  const a = f.breaks[i] ?? 0;
  const b = f.breaks[i + 1] ?? 0;
  return evaluate(f.cubic, Math.min(1, Math.max(0, (x - a) / (b - a))), 4 * i, 4);
}

/** Weighted sum of functions over one beam, on the union of their breaks. */
export function weightedSum(parts: readonly { f: Piecewise; weight: number }[]): Piecewise {
  const used = parts.filter((p) => p.weight !== 0);
  const [only] = used;
  if (used.length === 1 && only?.weight === 1) return only.f;
  const first = (only ?? parts[0])?.f;
  if (!first) throw new RangeError('a sum needs at least one function');
  const { breaks: like } = first;
  const end = like[like.length - 1] ?? 0;
  const all: number[] = [];
  for (const { f } of used) for (let i = 0; i < f.breaks.length; i++) all.push(f.breaks[i] ?? 0);
  if (used.length === 0) all.push(like[0] ?? 0, end);
  if (used.length > 1) all.sort((a, b) => a - b);
  const sliver = end * 1e-12;
  const breaks: number[] = [];
  for (const x of all) {
    const last = breaks[breaks.length - 1];
    if (last === undefined || x - last > sliver) breaks.push(x);
  }
  breaks[breaks.length - 1] = end;
  const pieces = breaks.length - 1;
  const cubic = new Float64Array(4 * pieces);
  const own: number[] = [];
  for (const { f, weight } of used) {
    let k = 0;
    for (let i = 0; i < pieces; i++) {
      const a = breaks[i] ?? 0;
      const b = breaks[i + 1] ?? 0;
      const middle = (a + b) / 2;
      while (k < f.breaks.length - 2 && (f.breaks[k + 1] ?? 0) < middle) k++;
      const from = f.breaks[k] ?? 0;
      const h = (f.breaks[k + 1] ?? 0) - from;
      restrict(f.cubic, 4 * k, 4, (a - from) / h, (b - from) / h, own);
      for (let d = 0; d < 4; d++) cubic[4 * i + d] = (cubic[4 * i + d] ?? 0) + weight * (own[d] ?? 0);
    }
  }
  return { breaks, cubic };
}

/**
 * Largest value of sign·f over the whole beam and where; the smallest x of those that are equal to nine
 * digits.
 */
export function peakOf(f: Piecewise, sign: 1 | -1): Peak {
  let best: Peak = { value: -Infinity, x: 0 };
  const c: number[] = [0, 0, 0, 0];
  for (let i = 0; i + 1 < f.breaks.length; i++) {
    for (let d = 0; d < 4; d++) c[d] = sign * (f.cubic[4 * i + d] ?? 0);
    if (upperBound(c, 0, 4) <= best.value) continue;
    const top = maximum(c);
    if (best.value === -Infinity || top.value > best.value + 1e-9 * Math.abs(best.value)) {
      const a = f.breaks[i] ?? 0;
      best = { value: top.value, x: a + top.u * ((f.breaks[i + 1] ?? 0) - a) };
    }
  }
  return best;
}

/** Overlaps shorter than this (mm) are rounding: a break meant to fall on a cell's edge. */
const sliverOfCell = 1e-6;

/** Calls `visit` for each piece with each cell of the grid it reaches into. */
export function eachOverlap(
  breaks: ArrayLike<number>,
  grid: readonly number[],
  visit: (cell: number, piece: number, a: number, b: number) => void,
): void {
  let cell = 0;
  for (let i = 0; i + 1 < breaks.length; i++) {
    const from = breaks[i] ?? 0;
    const to = breaks[i + 1] ?? 0;
    while (cell > 0 && (grid[cell] ?? 0) > from) cell--;
    while (cell < grid.length - 2 && (grid[cell + 1] ?? 0) <= from) cell++;
    for (let k = cell; k < grid.length - 1 && (grid[k] ?? 0) < to; k++) {
      const a = Math.max(from, grid[k] ?? 0);
      const b = Math.min(to, grid[k + 1] ?? 0);
      if (b - a <= Math.min(sliverOfCell, (to - from) / 2)) continue;
      visit(k, i, (a - from) / (to - from), (b - from) / (to - from));
    }
  }
}

/** Raises cells[k] to the largest of sign·f within cell k; limits at a cell's edges are taken from inside. */
export function raiseCells(f: Piecewise, grid: readonly number[], sign: 1 | -1, cells: Float64Array): void {
  const c: number[] = [0, 0, 0, 0];
  eachOverlap(f.breaks, grid, (cell, piece, a, b) => {
    const k = 4 * piece;
    const most =
      Math.abs(f.cubic[k] ?? 0) +
      Math.abs(f.cubic[k + 1] ?? 0) +
      Math.abs(f.cubic[k + 2] ?? 0) +
      Math.abs(f.cubic[k + 3] ?? 0);
    if (most <= (cells[cell] ?? 0)) return;
    restrict(f.cubic, 4 * piece, 4, a, b, c);
    if (sign === -1) for (let d = 0; d < 4; d++) c[d] = -(c[d] ?? 0);
    const known = cells[cell] ?? 0;
    if (upperBound(c, 0, 4) <= known) return;
    const top = maximum(c).value;
    if (top > known) cells[cell] = top;
  });
}
