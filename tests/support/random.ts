/** A random generator with a seed: the same seed gives the same sequence on any machine. */
export interface Random {
  /** 0 up to, not including, 1 */
  next: () => number;
  between: (low: number, high: number) => number;
  /** with a number of decimals, the way people write figures */
  decimal: (low: number, high: number, places: number) => number;
  whole: (low: number, high: number) => number;
  chance: (part: number) => boolean;
  pick: <T>(...options: readonly [T, ...T[]]) => T;
  shuffled: <T>(list: readonly T[]) => T[];
}

/** Mulberry32: 32 bits of state, enough to make test data with. */
export function randomFrom(seed: number): Random {
  let state = seed >>> 0;
  const next = (): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
  const between = (low: number, high: number): number => low + (high - low) * next();
  const whole = (low: number, high: number): number => low + Math.floor((high - low + 1) * next());
  return {
    next,
    between,
    decimal: (low, high, places) => Math.round(between(low, high) * 10 ** places) / 10 ** places,
    whole,
    chance: (part) => next() < part,
    pick: (...options) => options[whole(0, options.length - 1)] ?? options[0],
    shuffled: (list) =>
      list
        .map((item) => ({ item, order: next() }))
        .sort((a, b) => a.order - b.order)
        .map(({ item }) => item),
  };
}
