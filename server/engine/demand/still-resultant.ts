import type { CombinedLoads } from '../beam/combinations';
import { eachOverlap, type Piecewise } from '../numeric/piecewise';
import { maximum, multiply, restrict } from '../numeric/polynomial';

/**
 * The resultant of q = flow·V and of a flow passed sideways that stands still. Its square is a polynomial on
 * each piece, so that its largest value is found exactly.
 */
interface Squares {
  breaks: number[];
  /** (flow·V)² + t² for the largest and for the smallest V, seven coefficients each */
  pieces: { square: number[]; shear: number[]; across: number[] }[][];
}

function squares(loads: CombinedLoads, still: Piecewise, flow: number): Squares {
  const edges = loads.shearMax === loads.shearMin ? [loads.shearMax] : [loads.shearMax, loads.shearMin];
  const all = [...edges, still].flatMap((f) =>
    Array.from({ length: f.breaks.length }, (_, i) => f.breaks[i] ?? 0),
  );
  all.sort((a, b) => a - b);
  const end = all[all.length - 1] ?? 0;
  const breaks = all.filter((x, i) => i === 0 || x - (all[i - 1] ?? 0) > 1e-12 * end);
  breaks[breaks.length - 1] = end;
  const pointer = (f: Piecewise): ((a: number, b: number) => number[]) => {
    let k = 0;
    return (a, b) => {
      while (k < f.breaks.length - 2 && (f.breaks[k + 1] ?? 0) < (a + b) / 2) k++;
      const from = f.breaks[k] ?? 0;
      const h = (f.breaks[k + 1] ?? 0) - from;
      const out: number[] = [];
      restrict(f.cubic, 4 * k, 4, (a - from) / h, (b - from) / h, out);
      return out;
    };
  };
  const shears = edges.map(pointer);
  const acrossOf = pointer(still);
  const pieces: Squares['pieces'] = [];
  for (let i = 0; i + 1 < breaks.length; i++) {
    const a = breaks[i] ?? 0;
    const b = breaks[i + 1] ?? 0;
    const across = acrossOf(a, b);
    const t2 = multiply(across, across);
    pieces.push(
      shears.map((of) => {
        const shear = of(a, b);
        const v2 = multiply(shear, shear);
        return { square: v2.map((v, d) => flow * flow * v + (t2[d] ?? 0)), shear, across };
      }),
    );
  }
  return { breaks, pieces };
}

/** The worst place of one combination: the smallest x of those equal to nine digits. */
export function peakOfResultant(
  loads: CombinedLoads,
  still: Piecewise,
  flow: number,
): { value: number; x: number; shear: number; along: number; across: number } {
  const { breaks, pieces } = squares(loads, still, flow);
  let best = { value: 0, x: 0, shear: 0, along: 0, across: 0 };
  pieces.forEach((list, i) => {
    for (const { square, shear, across } of list) {
      const top = maximum(square);
      const value = Math.sqrt(Math.max(0, top.value));
      if (value <= best.value * (1 + 1e-9)) continue;
      const a = breaks[i] ?? 0;
      const at = (c: readonly number[]): number => c.reduceRight((sum, k) => sum * top.u + k, 0);
      const v = at(shear);
      best = {
        value,
        x: a + top.u * ((breaks[i + 1] ?? 0) - a),
        shear: v,
        along: Math.abs(v) * flow,
        across: Math.abs(at(across)),
      };
    }
  });
  return best;
}

/** The largest resultant within each cell of a grid, N/mm. */
export function raiseResultantCells(
  loads: CombinedLoads,
  still: Piecewise,
  flow: number,
  grid: readonly number[],
): Float64Array {
  const { breaks, pieces } = squares(loads, still, flow);
  const cells = new Float64Array(grid.length - 1);
  const own: number[] = [];
  eachOverlap(breaks, grid, (cell, piece, a, b) => {
    for (const { square } of pieces[piece] ?? []) {
      restrict(square, 0, square.length, a, b, own);
      const value = Math.sqrt(Math.max(0, maximum(own).value));
      if (value > (cells[cell] ?? 0)) cells[cell] = value;
    }
  });
  return cells;
}
