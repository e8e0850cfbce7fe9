/**
 * Polynomials as coefficients in rising powers of a local coordinate u that runs from 0 to 1 over a stretch.
 * Local coordinates keep every term of the size of the value itself; powers of a global x would cancel.
 */

/** Value at u, by Horner's rule. */
export function evaluate(c: ArrayLike<number>, u: number, from = 0, count = c.length): number {
  let value = 0;
  for (let i = from + count - 1; i >= from; i--) value = value * u + (c[i] ?? 0);
  return value;
}

/** Coefficients of the derivative with respect to u. */
export function derivative(c: readonly number[]): number[] {
  const d: number[] = [];
  for (let i = 1; i < c.length; i++) d.push((c[i] ?? 0) * i);
  return d;
}

/** Product of two polynomials. */
export function multiply(a: readonly number[], b: readonly number[]): number[] {
  const product = new Array<number>(a.length + b.length - 1).fill(0);
  a.forEach((x, i) => {
    b.forEach((y, j) => {
      product[i + j] = (product[i + j] ?? 0) + x * y;
    });
  });
  return product;
}

/** The same polynomial over the stretch [a, b] of u: coefficients in (u − a)/(b − a). */
export function restrict(
  c: ArrayLike<number>,
  from: number,
  count: number,
  a: number,
  b: number,
  out: number[],
): void {
  // Taylor shift to a, then scaling by b − a.
  for (let i = 0; i < count; i++) out[i] = c[from + i] ?? 0;
  if (out.length !== count) out.length = count;
  if (a !== 0) {
    for (let i = 0; i < count - 1; i++) {
      for (let j = count - 2; j >= i; j--) out[j] = (out[j] ?? 0) + a * (out[j + 1] ?? 0);
    }
  }
  const h = b - a;
  if (h === 1) return;
  let power = h;
  for (let i = 1; i < count; i++) {
    out[i] = (out[i] ?? 0) * power;
    power *= h;
  }
}

/**
 * Roots within 0 < u < 1 at which the polynomial changes sign, in rising order. Between the roots of the
 * derivative a polynomial is monotone, so each sign change is bracketed and found to the last digit.
 */
export function signChanges(c: readonly number[]): number[] {
  let top = c.length - 1;
  let scale = 0;
  for (const x of c) scale = Math.max(scale, Math.abs(x));
  if (scale === 0) return [];
  while (top > 0 && Math.abs(c[top] ?? 0) < scale * 1e-300) top--;
  if (top <= 0) return [];
  if (top === 1) {
    const root = -(c[0] ?? 0) / (c[1] ?? 1);
    return root > 0 && root < 1 ? [root] : [];
  }
  if (top === 2) return quadraticRoots(c[0] ?? 0, c[1] ?? 0, c[2] ?? 0);
  const trimmed = c.slice(0, top + 1);
  const stops = [0, ...signChanges(derivative(trimmed)), 1];
  const roots: number[] = [];
  for (let i = 0; i + 1 < stops.length; i++) {
    const a = stops[i] ?? 0;
    const b = stops[i + 1] ?? 1;
    const fa = evaluate(trimmed, a);
    const fb = evaluate(trimmed, b);
    if (fa === 0 && a > 0) roots.push(a);
    else if (fa * fb < 0) roots.push(bracketedRoot(trimmed, a, b, fa));
  }
  return roots;
}

/** Roots of c0 + c1 u + c2 u² within 0 < u < 1, without cancellation. */
function quadraticRoots(c0: number, c1: number, c2: number): number[] {
  const discriminant = c1 * c1 - 4 * c2 * c0;
  if (!(discriminant >= 0)) return [];
  const s = -0.5 * (c1 + (c1 >= 0 ? 1 : -1) * Math.sqrt(discriminant));
  const first = c2 === 0 ? NaN : s / c2;
  const second = s === 0 ? NaN : c0 / s;
  const roots: number[] = [];
  if (first > 0 && first < 1) roots.push(first);
  if (second > 0 && second < 1 && second !== first) roots.push(second);
  return roots.sort((p, q) => p - q);
}

/** The root of a monotone stretch by false position with bisection where it stalls. */
function bracketedRoot(c: readonly number[], a: number, b: number, fa: number): number {
  let low = a;
  let high = b;
  let fLow = fa;
  let fHigh = evaluate(c, b);
  let side = 0;
  for (let i = 0; i < 200 && high - low > 2e-16 * Math.max(Math.abs(low), Math.abs(high)); i++) {
    let u = i % 3 === 2 ? (low + high) / 2 : (low * fHigh - high * fLow) / (fHigh - fLow);
    if (!(u > low && u < high)) u = (low + high) / 2;
    if (u <= low || u >= high) break;
    const f = evaluate(c, u);
    if (f === 0) return u;
    if (f * fLow > 0) {
      low = u;
      fLow = f;
      if (side === -1) fHigh /= 2;
      side = -1;
    } else {
      high = u;
      fHigh = f;
      if (side === 1) fLow /= 2;
      side = 1;
    }
  }
  return (low + high) / 2;
}

/** Where in 0 ≤ u ≤ 1 the polynomial is largest, and the value there; the smallest u of equals. */
export function maximum(c: readonly number[]): { u: number; value: number } {
  let best = { u: 0, value: c[0] ?? 0 };
  for (const u of [...signChanges(derivative(c)), 1]) {
    const value = evaluate(c, u);
    if (value > best.value) best = { u, value };
  }
  return best;
}

/**
 * An upper bound of the polynomial on 0 ≤ u ≤ 1: its largest Bernstein coefficient (a polynomial lies in the
 * hull of its control points; Farouki, CAGD 29, 2012).
 */
export function upperBound(c: ArrayLike<number>, from: number, count: number): number {
  const n = count - 1;
  let bound = -Infinity;
  for (let i = 0; i <= n; i++) {
    // b_i = Σ_{k ≤ i} C(i,k)/C(n,k) c_k
    let b = 0;
    let ratio = 1;
    for (let k = 0; k <= i; k++) {
      b += ratio * (c[from + k] ?? 0);
      ratio *= (i - k) / (n - k);
    }
    if (b > bound) bound = b;
  }
  return bound;
}
