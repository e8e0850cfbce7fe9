import { elementAt, elementStiffness, shapes, type Beam } from './beam';
import { at } from './linear';

/**
 * A unit load anywhere on the finite elements. Its consistent loads touch four freedoms only, so any effect is a row of
 * numbers, one for each freedom, times four of Hermite's values; inside the loaded element its fixed-end part is added.
 */

export interface UnitLoad {
  /** effects at x of a unit load at a, both on the beam; beside a = x the shear jumps by 1 */
  shearAt: (x: number) => (a: number) => number;
  momentAt: (x: number) => (a: number) => number;
  deflectionAt: (x: number) => (a: number) => number;
  /** ∫V dx over [from, to] */
  shearOver: (from: number, to: number) => (a: number) => number;
  /** upward force and moment of a support */
  reactionOf: (support: number) => (a: number) => number;
  supportMomentOf: (support: number) => (a: number) => number;
}

interface Rows {
  shear: Float64Array;
  moment: Float64Array;
  deflection: Float64Array;
  rotation: Float64Array;
}

function combine(rows: readonly Float64Array[], factors: readonly number[]): Float64Array {
  const sum = new Float64Array(at(rows, 0).length);
  rows.forEach((row, i) => {
    const factor = at(factors, i);
    if (factor === 0) return;
    for (let j = 0; j < sum.length; j += 1) sum[j] = at(sum, j) + factor * at(row, j);
  });
  return sum;
}

/** Prepares the rows of every element and support; the functions returned are cheap to call again and again. */
export function prepareUnitLoad(beam: Beam): UnitLoad {
  const { elements, compliance, EI } = beam;
  const rows = elements.map((element): Rows => {
    const own = elementStiffness(EI, element.to - element.from);
    const moved = element.freedoms.map((freedom) => at(compliance, freedom));
    return {
      shear: combine(
        moved,
        at(own, 0).map((value) => -value),
      ),
      moment: combine(moved, at(own, 1)),
      deflection: at(moved, 0),
      rotation: at(moved, 1),
    };
  });

  const last = elements.length - 1;
  // called millions of times: searched, read and shaped in place not through other files’ functions
  const froms = Float64Array.from(elements, ({ from }) => from);
  const lengths = Float64Array.from(elements, ({ from, to }) => to - from);
  const freedoms = Int32Array.from(elements.flatMap((element) => element.freedoms));
  const holding = (a: number): number => {
    let low = 0;
    let high = last;
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if ((froms[middle] ?? 0) <= a) low = middle;
      else high = middle - 1;
    }
    return low;
  };
  const spread = (row: Float64Array, a: number, e: number): number => {
    const h = lengths[e] ?? 1;
    const s = a - (froms[e] ?? 0);
    const u = s / h;
    const v = 1 - u;
    const f = 4 * e;
    return (
      (row[freedoms[f] ?? 0] ?? 0) * v * v * (1 + 2 * u) +
      (row[freedoms[f + 1] ?? 0] ?? 0) * s * v * v +
      (row[freedoms[f + 2] ?? 0] ?? 0) * u * u * (3 - 2 * u) -
      (row[freedoms[f + 3] ?? 0] ?? 0) * s * u * v
    );
  };
  /** Fixed-end shear and moment at the left end of the loaded element. */
  const fixedEnds = (e: number, a: number): { shear: number; moment: number } => {
    const n = shapes(a - (froms[e] ?? 0), lengths[e] ?? 1);
    return { shear: n[0], moment: -n[1] };
  };

  const shearAt = (x: number) => {
    const e = elementAt(beam, x);
    const row = at(rows, e).shear;
    return (a: number): number => {
      const loaded = holding(a);
      const far = spread(row, a, loaded);
      if (loaded !== e) return far;
      return far + fixedEnds(e, a).shear - (x > a ? 1 : 0);
    };
  };

  const momentAt = (x: number) => {
    const e = elementAt(beam, x);
    const s = x - at(elements, e).from;
    const row = combine([at(rows, e).moment, at(rows, e).shear], [1, s]);
    return (a: number): number => {
      const loaded = holding(a);
      const far = spread(row, a, loaded);
      if (loaded !== e) return far;
      const ends = fixedEnds(e, a);
      return far + ends.moment + ends.shear * s - Math.max(0, x - a);
    };
  };

  const deflectionAt = (x: number) => {
    const e = elementAt(beam, x);
    const s = x - at(elements, e).from;
    const { deflection, rotation, moment, shear } = at(rows, e);
    const row = combine([deflection, rotation, moment, shear], [1, s, (-s * s) / 2 / EI, -(s ** 3) / 6 / EI]);
    return (a: number): number => {
      const loaded = holding(a);
      const far = spread(row, a, loaded);
      if (loaded !== e) return far;
      const ends = fixedEnds(e, a);
      const past = Math.max(0, x - a);
      return far + (-(ends.moment * s * s) / 2 - (ends.shear * s ** 3) / 6 + past ** 3 / 6) / EI;
    };
  };

  const shearOver = (from: number, to: number) => {
    const overlap = elements.map((element) =>
      Math.max(0, Math.min(to, element.to) - Math.max(from, element.from)),
    );
    const row = combine(
      rows.map((each) => each.shear),
      overlap,
    );
    return (a: number): number => {
      const e = holding(a);
      const far = spread(row, a, e);
      const covered = overlap[e] ?? 0;
      if (covered === 0) return far;
      const behind = Math.max(0, Math.min(to, at(elements, e).to) - Math.max(from, a));
      return far + fixedEnds(e, a).shear * covered - behind;
    };
  };

  const reactionOf = (support: number) => {
    const { w, stiffness } = at(beam.supports, support);
    // of a spring k·w; of a rigid support what the elements do not take of the load at its own freedom
    const row =
      stiffness === null
        ? combine(
            compliance,
            [...at(beam.stiffness, w)].map((value) => -value),
          )
        : combine([at(compliance, w)], [stiffness]);
    if (stiffness === null) row[w] = 1;
    return (a: number): number => spread(row, a, holding(a));
  };

  const supportMomentOf = (support: number) => {
    const { rotations, fixed } = at(beam.supports, support);
    if (!fixed) return () => 0;
    const each = rotations.map((r) => {
      const row = combine(compliance, [...at(beam.stiffness, r)]);
      row[r] = -1;
      return row;
    });
    const row = combine(
      each,
      each.map(() => 1),
    );
    return (a: number): number => spread(row, a, holding(a));
  };

  return { shearAt, momentAt, deflectionAt, shearOver, reactionOf, supportMomentOf };
}
