/**
 * A banded system of linear equations, factorised once by Gaussian elimination with row exchanges and solved
 * for as many right-hand sides as needed. Rows are scaled first, so that pivots are comparable.
 */
export class BandedSystem {
  readonly size: number;
  private readonly lower: number;
  private readonly width: number;
  private readonly rows: Float64Array[];
  private readonly scale: Float64Array;
  private readonly pivots: Int32Array;
  private readonly factors: Float64Array[];

  /** @param lower how far below, @param upper how far above the diagonal entries may stand */
  constructor(size: number, lower: number, upper: number) {
    this.size = size;
    this.lower = lower;
    // Row exchanges let entries fill in up to lower + upper above the diagonal.
    this.width = 2 * lower + upper + 1;
    this.rows = Array.from({ length: size }, () => new Float64Array(this.width));
    this.scale = new Float64Array(size);
    this.pivots = new Int32Array(size);
    this.factors = Array.from({ length: size }, () => new Float64Array(lower));
  }

  /** Adds to the entry in a row and column within the band. */
  add(row: number, column: number, value: number): void {
    const offset = column - row + this.lower;
    const line = this.rows[row];
    if (line === undefined || offset < 0 || offset >= this.width) {
      throw new RangeError(`entry ${row}, ${column} lies outside the band`);
    }
    line[offset] = (line[offset] ?? 0) + value;
  }

  /**
   * Factorises in place. Returns false where a pivot vanishes, that is, where the system is singular.
   * After the call, row i holds its entries from column i on, starting at index 0.
   */
  factorise(): boolean {
    const { size, lower, width, rows, scale } = this;
    rows.forEach((line, i) => {
      let largest = 0;
      for (const value of line) largest = Math.max(largest, Math.abs(value));
      const s = largest > 0 ? 1 / largest : 1;
      scale[i] = s;
      for (let k = 0; k < width; k++) line[k] = (line[k] ?? 0) * s;
    });
    // Left-align each row on its own first column: row i then starts at column max(0, i − lower).
    for (let i = 0; i < Math.min(lower, size); i++) {
      const line = rows[i];
      if (line) {
        line.copyWithin(0, lower - i);
        line.fill(0, width - (lower - i));
      }
    }
    for (let column = 0; column < size; column++) {
      // Rows column … column + lower start at this column now.
      const last = Math.min(size - 1, column + lower);
      let pivotRow = column;
      let largest = 0;
      for (let r = column; r <= last; r++) {
        const value = Math.abs(rows[r]?.[0] ?? 0);
        if (value > largest) {
          largest = value;
          pivotRow = r;
        }
      }
      if (!(largest > 1e-14)) return false;
      this.pivots[column] = pivotRow;
      const pivot = rows[pivotRow];
      const top = rows[column];
      if (!pivot || !top) return false;
      rows[pivotRow] = top;
      rows[column] = pivot;
      const diagonal = pivot[0] ?? 1;
      for (let r = column + 1; r <= last; r++) {
        const line = rows[r];
        const kept = this.factors[column];
        if (!line || !kept) continue;
        const factor = (line[0] ?? 0) / diagonal;
        kept[r - column - 1] = factor;
        for (let k = 1; k < width; k++) line[k - 1] = (line[k] ?? 0) - factor * (pivot[k] ?? 0);
        line[width - 1] = 0;
      }
    }
    return true;
  }

  /** Solves for one right-hand side of length `size`; the argument is left as it is. */
  solve(rightHandSide: Float64Array): Float64Array {
    const { size, lower, width, rows } = this;
    const x = new Float64Array(size);
    for (let i = 0; i < size; i++) x[i] = (rightHandSide[i] ?? 0) * (this.scale[i] ?? 1);
    for (let column = 0; column < size; column++) {
      const pivotRow = this.pivots[column] ?? column;
      const value = x[pivotRow] ?? 0;
      x[pivotRow] = x[column] ?? 0;
      x[column] = value;
      const kept = this.factors[column];
      if (!kept || value === 0) continue;
      const last = Math.min(size - 1, column + lower);
      for (let r = column + 1; r <= last; r++) x[r] = (x[r] ?? 0) - (kept[r - column - 1] ?? 0) * value;
    }
    for (let i = size - 1; i >= 0; i--) {
      const line = rows[i];
      if (!line) continue;
      let value = x[i] ?? 0;
      for (let k = 1; k < width && i + k < size; k++) value -= (line[k] ?? 0) * (x[i + k] ?? 0);
      x[i] = value / (line[0] ?? 1);
    }
    return x;
  }
}
