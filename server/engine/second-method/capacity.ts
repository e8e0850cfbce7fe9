import type { Capacity, Connection } from '@shared/schemas/member';

/** What a connection may carry; the tolerance-limit factor by a series of incomplete beta functions. */

/** ln Γ(x), x > 0: Stirling's series after raising x to 20 or more (Abramowitz and Stegun 6.1.41). */
export function logGamma(x: number): number {
  let shift = 0;
  let y = x;
  while (y < 20) {
    shift -= Math.log(y);
    y += 1;
  }
  const z = 1 / (y * y);
  const series = (1 / 12 - z * (1 / 360 - z * (1 / 1260 - z * (1 / 1680 - z / 1188)))) / y;
  return shift + (y - 0.5) * Math.log(y) - y + 0.5 * Math.log(2 * Math.PI) + series;
}

/** ln of I_x(a, b) by its power series with positive terms (Abramowitz and Stegun 26.5.4). */
export function logIncompleteBeta(a: number, b: number, x: number): number {
  if (x <= 0) return -Infinity;
  // I_x(a,b) = x^a (1−x)^b Γ(a+b)/(Γ(a+1)Γ(b)) · Σ (a+b)_n/(a+1)_n x^n
  let term = 1;
  let sum = 1;
  for (let n = 0; n < 100_000 && term > sum * 1e-17; n += 1) {
    term *= ((a + b + n) / (a + 1 + n)) * x;
    sum += term;
  }
  const lead = a * Math.log(x) + b * Math.log1p(-x) + logGamma(a + b) - logGamma(a + 1) - logGamma(b);
  return lead + Math.log(sum);
}

/** Standard normal distribution function by its Taylor-like series with positive terms (Abramowitz and Stegun 26.2.11). */
export function normal(x: number): number {
  if (x < -8) return 0;
  let term = Math.abs(x);
  let sum = term;
  for (let n = 1; term > sum * 1e-17; n += 1) {
    term *= (x * x) / (2 * n + 1);
    sum += term;
  }
  const half = (sum * Math.exp((-x * x) / 2)) / Math.sqrt(2 * Math.PI);
  return x < 0 ? 0.5 - half : 0.5 + half;
}

/**
 * Distribution function of the non-central t with f degrees of freedom and non-centrality d > 0, at t > 0:
 * Φ(−d) + ½Σ[p_j I_x(j+½, f/2) + q_j I_x(j+1, f/2)], x = t²/(f+t²), p_j and q_j Poisson-like weights of d²/2
 * (Lenth 1989, algorithm AS 243, from memory).
 */
export function nonCentralT(t: number, f: number, d: number): number {
  const x = (t * t) / (f + t * t);
  const rate = (d * d) / 2;
  const centre = Math.round(rate);
  const reach = Math.ceil(40 + 9 * Math.sqrt(rate));
  let sum = 0;
  for (let j = Math.max(0, centre - reach); j <= centre + reach; j += 1) {
    const p = -rate + j * Math.log(rate) - logGamma(j + 1);
    const q = -rate + (j + 0.5) * Math.log(rate) - logGamma(j + 1.5);
    sum += Math.exp(p + logIncompleteBeta(j + 0.5, f / 2, x));
    sum += Math.exp(q + logIncompleteBeta(j + 1, f / 2, x));
  }
  return normal(-d) + sum / 2;
}

/** 95 % of the standard normal, by bisection of its distribution function. */
function normal95(): number {
  let low = 1;
  let high = 2;
  for (let i = 0; i < 60; i += 1) {
    const middle = (low + high) / 2;
    if (normal(middle) < 0.95) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

const factors = new Map<number, number>();

/** k_s of EN 14358:2016, 3.2 (from memory) for n specimens: 5 % value at 75 % confidence. */
export function toleranceFactor(n: number): number {
  const known = factors.get(n);
  if (known !== undefined) return known;
  const d = normal95() * Math.sqrt(n);
  let low = d / 2;
  let high = 4 * d;
  for (let i = 0; i < 55; i += 1) {
    const middle = (low + high) / 2;
    if (nonCentralT(middle, n - 1, d) < 0.75) low = middle;
    else high = middle;
  }
  const factor = (low + high) / 2 / Math.sqrt(n);
  factors.set(n, factor);
  return factor;
}

/** The lower 5 % value of ultimate test loads: m_k = exp(ȳ − k_s·max(s_y, 0.05)). */
export function characteristicOfTests(values: readonly number[]): number {
  const n = values.length;
  const logs = values.map((value) => Math.log(value));
  const mean = logs.reduce((sum, value) => sum + value, 0) / n;
  const variance = logs.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (n - 1);
  return Math.exp(mean - toleranceFactor(n) * Math.max(Math.sqrt(variance), 0.05));
}

/** R: N a fastener, MPa of an adhesive, N/mm of a line. Throws RangeError for a basis that this method has not. */
export function capacityOf(capacity: Capacity): number {
  switch (capacity.basis) {
    case 'ultimate':
      return capacity.value / capacity.factorOfSafety;
    case 'allowable':
      return capacity.value;
    case 'test':
      return characteristicOfTests(capacity.values) / capacity.factorOfSafety;
    case 'nds':
    case 'ec5':
      throw new RangeError(`no second method for the basis ${capacity.basis}`);
  }
}

export interface Strength {
  R: number;
  rows: number;
  /** whether zones with a spacing are wanted: fasteners and beads */
  spaced: boolean;
  /** spacing × flow may not pass this (N): rows·R, or bead·R; where nothing is spaced, the flow itself (N/mm) */
  limit: number;
}

/** The strength of a connection over its contact width (mm). */
export function strengthOf(connection: Connection, contact: number): Strength {
  const R = capacityOf(connection.capacity);
  const rows = connection.kind === 'fasteners' ? (connection.rows ?? 1) : 1;
  if (connection.kind === 'fasteners') return { R, rows, spaced: true, limit: rows * R };
  if (connection.kind === 'adhesive') return { R, rows, spaced: false, limit: R * contact };
  if (connection.bead !== undefined) return { R, rows, spaced: true, limit: connection.bead * R };
  return { R, rows, spaced: false, limit: R };
}
