/** Special functions for the statistics of test series, to double precision. */

/** Distribution function of the standard normal. */
export function normalDistribution(x: number): number {
  return 0.5 * erfc(-x / Math.SQRT2);
}

/**
 * Complementary error function: Maclaurin series of erf below 2 (all terms of one sign after the factor
 * e^(−x²)), continued fraction above (Abramowitz and Stegun 7.1.6, 7.1.14).
 */
export function erfc(x: number): number {
  if (x < 0) return 2 - erfc(-x);
  if (x < 2.5) {
    // erf x = 2/√π e^(−x²) Σ 2ⁿ x^(2n+1)/(1·3·…·(2n+1))
    let term = x;
    let sum = x;
    for (let n = 1; n < 200 && term > sum * 1e-17; n++) {
      term *= (2 * x * x) / (2 * n + 1);
      sum += term;
    }
    return 1 - (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x) * sum;
  }
  if (x > 27) return 0;
  let f = 0;
  for (let n = 80; n >= 1; n--) f = n / 2 / (x + f);
  return Math.exp(-x * x) / Math.sqrt(Math.PI) / (x + f);
}

/**
 * Distribution function of the non-central t with ν degrees of freedom and non-centrality δ:
 * ∫ Φ(t·s − δ)·f(s) ds, s = √(χ²_ν/ν). The weight f is normalised by its own integral, so no gamma function
 * is needed; Simpson's rule over ten deviations either side of its peak.
 */
export function nonCentralT(t: number, freedom: number, delta: number): number {
  const spread = 1 / Math.sqrt(2 * freedom);
  const low = Math.max(0, 1 - 10 * spread);
  const high = 1 + 12 * spread;
  const steps = 600;
  const h = (high - low) / steps;
  let weightSum = 0;
  let sum = 0;
  for (let i = 0; i <= steps; i++) {
    const s = low + i * h;
    const simpson = i === 0 || i === steps ? 1 : i % 2 === 1 ? 4 : 2;
    // s^(ν−1)·e^(−νs²/2), scaled so that it is 1 at s = 1
    const weight =
      s === 0
        ? freedom === 1
          ? Math.exp(freedom / 2)
          : 0
        : Math.exp((freedom - 1) * Math.log(s) - (freedom * (s * s - 1)) / 2);
    weightSum += simpson * weight;
    sum += simpson * weight * normalDistribution(t * s - delta);
  }
  return sum / weightSum;
}

/** Quantile of the non-central t, by the secant rule inside a bracket. */
export function nonCentralTQuantile(probability: number, freedom: number, delta: number): number {
  let low = delta - 10;
  let high = delta + 10 * Math.max(1, delta);
  let fLow = nonCentralT(low, freedom, delta) - probability;
  let fHigh = nonCentralT(high, freedom, delta) - probability;
  for (let i = 0; i < 100 && high - low > 1e-12 * Math.max(1, Math.abs(high)); i++) {
    let t = i % 3 === 2 ? (low + high) / 2 : (low * fHigh - high * fLow) / (fHigh - fLow);
    if (!(t > low && t < high)) t = (low + high) / 2;
    const f = nonCentralT(t, freedom, delta) - probability;
    if (f === 0) return t;
    if (f < 0) {
      low = t;
      fLow = f;
    } else {
      high = t;
      fHigh = f;
    }
  }
  return (low + high) / 2;
}
