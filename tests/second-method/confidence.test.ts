import { describe, expect, it } from 'vitest';
import { toleranceFactor } from '../../server/engine/second-method/capacity';

/** Φ by Simpson's rule over the density, nothing of the code under test. */
function normalIntegral(x: number): number {
  const n = 2000;
  const low = -10;
  if (x <= low) return 0;
  const h = (x - low) / n;
  let sum = 0;
  for (let i = 0; i <= n; i += 1) {
    const weight = i === 0 || i === n ? 1 : i % 2 === 1 ? 4 : 2;
    sum += weight * Math.exp(-((low + i * h) ** 2) / 2);
  }
  return (sum * h) / 3 / Math.sqrt(2 * Math.PI);
}

/**
 * P(ȳ − k s ≤ 5 % fractile) of n standard normal values, from its meaning: ∫ Φ(√n(k s − 1.6449)) over the density of s, with
 * Simpson's rule. ln Γ of whole and half numbers by recurrence from Γ(1) = 1 and Γ(½) = √π.
 */
function confidence(k: number, n: number): number {
  const f = n - 1;
  let lnGamma = f % 2 === 0 ? 0 : 0.5 * Math.log(Math.PI);
  for (let a = f % 2 === 0 ? 1 : 0.5; a < f / 2; a += 1) lnGamma += Math.log(a);
  const density = (s: number): number =>
    s === 0
      ? 0
      : Math.exp(Math.log(2) + (f / 2) * Math.log(f / 2) + (f - 1) * Math.log(s) - (f * s * s) / 2 - lnGamma);
  const steps = 600;
  const h = 5 / steps;
  let sum = 0;
  for (let i = 0; i <= steps; i += 1) {
    const weight = i === 0 || i === steps ? 1 : i % 2 === 1 ? 4 : 2;
    const s = i * h;
    sum += weight * density(s) * normalIntegral(Math.sqrt(n) * (k * s - 1.6448536269514722));
  }
  return (sum * h) / 3;
}

describe('The tolerance factor by its meaning', () => {
  it.each([5, 8, 17, 40])(
    'in 75 of 100 samples of %i, ȳ − k_s·s lies below the 5 % value (EN 14358:2016, from memory; integrated)',
    (n) => {
      expect(Math.abs(confidence(toleranceFactor(n), n) - 0.75)).toBeLessThan(1e-9);
      // a thousandth more or less of k_s would be seen
      expect(confidence(toleranceFactor(n) * 1.001, n) - 0.75).toBeGreaterThan(1e-5);
    },
  );
});
