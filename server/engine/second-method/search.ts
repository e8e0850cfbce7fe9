import { at } from './linear';

/** Plain search for the largest value of a function of one variable. */

export interface Found {
  x: number;
  value: number;
}

const GOLDEN = (Math.sqrt(5) - 1) / 2;

/** Golden-section search for a largest value between two places. */
export function golden(f: (x: number) => number, from: number, to: number, steps = 30): Found {
  let low = from;
  let high = to;
  let left = high - GOLDEN * (high - low);
  let right = low + GOLDEN * (high - low);
  let atLeft = f(left);
  let atRight = f(right);
  for (let i = 0; i < steps; i += 1) {
    if (atLeft < atRight) {
      low = left;
      left = right;
      atLeft = atRight;
      right = low + GOLDEN * (high - low);
      atRight = f(right);
    } else {
      high = right;
      right = left;
      atRight = atLeft;
      left = high - GOLDEN * (high - low);
      atLeft = f(left);
    }
  }
  return atLeft > atRight ? { x: left, value: atLeft } : { x: right, value: atRight };
}

/**
 * Largest value of a function that is smooth between two places: even samples, then golden section about the best
 * of them. Where the best is an end, a place beside it says whether the function still rises inward.
 */
export function largestBetween(f: (x: number) => number, from: number, to: number, samples: number): Found {
  const places = Array.from({ length: samples + 2 }, (_, i) => from + ((to - from) * i) / (samples + 1));
  places[samples + 1] = to;
  const values = places.map(f);
  let best = 0;
  values.forEach((value, i) => {
    if (value > at(values, best)) best = i;
  });
  const top = { x: at(places, best), value: at(values, best) };
  const low = at(places, Math.max(0, best - 1));
  const high = at(places, Math.min(samples + 1, best + 1));
  const inward = best === 0 ? from + (to - from) * 1e-3 : to - (to - from) * 1e-3;
  const flat = 1e-12 * Math.abs(top.value);
  if ((best === 0 || best === samples + 1) && f(inward) <= top.value + flat) return top;
  if (values[best - 1] === top.value && values[best + 1] === top.value) return top;
  const refined = golden(f, low, high);
  return refined.value > top.value ? refined : top;
}
