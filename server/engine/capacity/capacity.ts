import type { Connection } from '@shared/schemas/member';
import { nonCentralTQuantile } from './special';

/** The statistics of a test series (EN 14358:2016 3.2, lognormal). */
export interface TestStatistics {
  n: number;
  /** mean and deviation of the natural logarithms of the values in N (or MPa, N/mm) */
  mean: number;
  deviation: number;
  /** the deviation used, at least 0.05 */
  used: number;
  ks: number;
  /** lower 5 % value at 75 % confidence */
  characteristic: number;
}

/** What one fastener (N), one mm of line (N/mm) or one mm² of adhesive (MPa) may carry, and how that came about. */
export interface WorkedCapacity {
  value: number;
  statistics: TestStatistics | null;
}

const quantiles = new Map<number, number>();

/**
 * k_s for the lower 5 % value at 75 % confidence with the deviation unknown: the non-central t quantile over √n
 * (EN 14358:2016 3.2, from memory; the quantile by integration).
 */
export function testFactor(n: number): number {
  const known = quantiles.get(n);
  if (known !== undefined) return known;
  const ks = nonCentralTQuantile(0.75, n - 1, 1.6448536269514722 * Math.sqrt(n)) / Math.sqrt(n);
  quantiles.set(n, ks);
  return ks;
}

/** Lower 5 % value at 75 % confidence of a test series: m_k = exp(ȳ − k_s·max(s_y, 0.05)). */
export function testStatistics(values: readonly number[]): TestStatistics {
  const n = values.length;
  const logarithms = values.map((v) => Math.log(v));
  const mean = logarithms.reduce((sum, y) => sum + y, 0) / n;
  const deviation = Math.sqrt(logarithms.reduce((sum, y) => sum + (y - mean) ** 2, 0) / (n - 1));
  const used = Math.max(deviation, 0.05);
  const ks = testFactor(n);
  return { n, mean, deviation, used, ks, characteristic: Math.exp(mean - ks * used) };
}

/** R from the connection's basis. Yield-model bases are refused before this is reached. */
export function workOutCapacity(connection: Connection): WorkedCapacity {
  const { capacity } = connection;
  switch (capacity.basis) {
    case 'ultimate':
      return { value: capacity.value / capacity.factorOfSafety, statistics: null };
    case 'allowable':
      return { value: capacity.value, statistics: null };
    case 'test': {
      const statistics = testStatistics(capacity.values);
      return { value: statistics.characteristic / capacity.factorOfSafety, statistics };
    }
    case 'nds':
    case 'ec5':
      throw new Error(`the basis ${capacity.basis} has to be refused on input`);
  }
}
