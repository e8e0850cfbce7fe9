/**
 * Influence lines of a continuous beam on unyielding supports, one EI throughout: the yardstick's own small
 * statics, independent of the engine. Three-moment equation (Clapeyron), closed form.
 */

/** Cubic coefficients c0 … c3 in t, the load's place within its span as a part of 1. */
export type Cubic = [number, number, number, number];

/** Sagging moment at every support as cubics of a unit load's place: `[span][support]`. */
function supportMoments(spans: readonly number[]): Cubic[][] {
  const inner = spans.length - 1;
  const flexibility = inverse(
    Array.from({ length: inner }, (_, row) =>
      Array.from({ length: inner }, (_, column) => {
        const left = spans[row] ?? 0;
        const right = spans[row + 1] ?? 0;
        if (column === row) return 2 * (left + right);
        if (column === row + 1) return right;
        return column === row - 1 ? left : 0;
      }),
    ),
  );
  return spans.map((length, span) =>
    Array.from({ length: spans.length + 1 }, (_, support): Cubic => {
      if (support === 0 || support === spans.length) return [0, 0, 0, 0];
      // the loaded span's terms: L²t(1−t)(2−t) at its left support, L²t(1−t)(1+t) at its right one
      const atLeft = flexibility[support - 1]?.[span - 1] ?? 0;
      const atRight = flexibility[support - 1]?.[span] ?? 0;
      const square = length * length;
      return [0, -square * (2 * atLeft + atRight), 3 * square * atLeft, -square * (atLeft - atRight)];
    }),
  );
}

/** Gauss–Jordan; the three-moment matrix is diagonally dominant, so no pivoting is needed. */
function inverse(matrix: number[][]): number[][] {
  const size = matrix.length;
  const rows = matrix.map((row, i) => [...row, ...Array.from({ length: size }, (_, j) => (i === j ? 1 : 0))]);
  rows.forEach((pivotRow, pivot) => {
    const scale = pivotRow[pivot] ?? Number.NaN;
    pivotRow.forEach((value, column) => {
      pivotRow[column] = value / scale;
    });
    rows.forEach((row, i) => {
      if (i === pivot) return;
      const factor = row[pivot] ?? 0;
      row.forEach((value, column) => {
        row[column] = value - factor * (pivotRow[column] ?? 0);
      });
    });
  });
  return rows.map((row) => row.slice(size));
}

export interface Station {
  x: number;
  /** index of the span it is read in: at a support, the left value belongs to the span on the left */
  span: number;
  /** true for the left one of two values at one x */
  left: boolean;
}

/**
 * Influence lines of V and M at the stations, one cubic for each span the load may be in, twice: for a load left
 * of the station and for one right of it, which differ in the station's own span only. One further span of zeros
 * takes the axles that are off the beam. Layout: `[station][span][left, right][c0 … c3]`, flat.
 */
export function influenceLines(spans: readonly number[], stations: readonly Station[]) {
  const supports = supportMoments(spans);
  const starts = spans.reduce<number[]>((list, length) => [...list, (list.at(-1) ?? 0) + length], [0]);
  const perStation = (spans.length + 1) * 8;
  const shear = new Float64Array(stations.length * perStation);
  const moment = new Float64Array(stations.length * perStation);
  stations.forEach((station, index) => {
    const length = spans[station.span] ?? Number.NaN;
    const part = (station.x - (starts[station.span] ?? 0)) / length;
    spans.forEach((loaded, span) => {
      const first = supports[span]?.[station.span] ?? [0, 0, 0, 0];
      const second = supports[span]?.[station.span + 1] ?? [0, 0, 0, 0];
      for (const side of [0, 1]) {
        const at = index * perStation + span * 8 + side * 4;
        for (let power = 0; power < 4; power += 1) {
          const m0 = first[power] ?? 0;
          const m1 = second[power] ?? 0;
          moment[at + power] = m0 * (1 - part) + m1 * part;
          shear[at + power] = (m1 - m0) / length;
        }
        if (span !== station.span) continue;
        // simple span: M = aL(1−ξ) left of the station, ξL(1−a) right of it; V = −a, 1−a
        if (side === 0) {
          moment[at + 1] = (moment[at + 1] ?? 0) + loaded * (1 - part);
          shear[at + 1] = (shear[at + 1] ?? 0) - 1;
        } else {
          moment[at] = (moment[at] ?? 0) + loaded * part;
          moment[at + 1] = (moment[at + 1] ?? 0) - loaded * part;
          shear[at] = (shear[at] ?? 0) + 1;
          shear[at + 1] = (shear[at + 1] ?? 0) - 1;
        }
      }
    });
  });
  return { shear, moment, perStation, starts };
}
