/** Dense linear algebra of the second method: small systems, solved plainly. */

/** The value at an index that is known to be there; throws RangeError where it is not. */
export function at<T>(list: ArrayLike<T>, index: number): T {
  const value = list[index];
  if (value === undefined) throw new RangeError(`no entry ${index} in a list of ${list.length}`);
  return value;
}

/** A matrix of zeros, as rows. */
export function zeros(rows: number, columns: number): Float64Array[] {
  return Array.from({ length: rows }, () => new Float64Array(columns));
}

/** Adds to one entry of a matrix. */
export function add(matrix: readonly Float64Array[], row: number, column: number, value: number): void {
  const entries = at(matrix, row);
  entries[column] = at(entries, column) + value;
}

/** Sum of products of two lists of one length. */
export function dot(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < a.length; i += 1) sum += at(a, i) * at(b, i);
  return sum;
}

function takeMultiple(row: Float64Array, other: Float64Array, factor: number, start: number): void {
  for (let j = start; j < row.length; j += 1) row[j] = at(row, j) - factor * at(other, j);
}

/**
 * Solves A X = B by Gauss–Jordan elimination with row exchanges.
 *
 * @param matrix n rows of n
 * @param right n rows of m
 * @returns X, n rows of m
 * @throws RangeError where the matrix is singular to working precision
 */
export function solve(matrix: readonly Float64Array[], right: readonly Float64Array[]): Float64Array[] {
  const n = matrix.length;
  const rows = matrix.map((row, i) => {
    const wide = new Float64Array(n + at(right, i).length);
    wide.set(row);
    wide.set(at(right, i), n);
    return wide;
  });
  for (let c = 0; c < n; c += 1) {
    let pivot = c;
    for (let r = c + 1; r < n; r += 1) {
      if (Math.abs(at(at(rows, r), c)) > Math.abs(at(at(rows, pivot), c))) pivot = r;
    }
    const chosen = at(rows, pivot);
    const size = at(chosen, c);
    if (Math.abs(size) < 1e-300) throw new RangeError('the system has no single solution');
    rows[pivot] = at(rows, c);
    rows[c] = chosen;
    for (let j = c; j < chosen.length; j += 1) chosen[j] = at(chosen, j) / size;
    for (let r = 0; r < n; r += 1) {
      const row = at(rows, r);
      const factor = at(row, c);
      if (r !== c && factor !== 0) takeMultiple(row, chosen, factor, c);
    }
  }
  return rows.map((row) => row.slice(n));
}

/**
 * The inverse of a symmetric positive definite matrix, scaled to a unit diagonal first so that deflections
 * and rotations are of one size.
 */
export function invertPositive(matrix: readonly Float64Array[]): Float64Array[] {
  const n = matrix.length;
  const scale = matrix.map((row, i) => 1 / Math.sqrt(at(row, i)));
  const scaled = matrix.map((row, i) => row.map((value, j) => value * at(scale, i) * at(scale, j)));
  const identity = zeros(n, n);
  for (let i = 0; i < n; i += 1) at(identity, i)[i] = 1;
  return solve(scaled, identity).map((row, i) => row.map((value, j) => value * at(scale, i) * at(scale, j)));
}
