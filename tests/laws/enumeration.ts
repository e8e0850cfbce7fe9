import type { RulesInput } from './members';

/** The rules of a schedule with their defaults. */
export interface Limits {
  step: number;
  min: number;
  max: number;
  zones: number;
  grid: number;
  shortest: number;
  mirror: boolean;
}
export const limitsOf = (rules: RulesInput): Limits => ({
  step: rules.spacingStep ?? 5,
  min: rules.spacingMin ?? 40,
  max: rules.spacingMax ?? 300,
  zones: rules.maxZones ?? 3,
  grid: rules.zoneGrid ?? 100,
  shortest: rules.minZoneLength ?? 300,
  mirror: rules.mirror ?? false,
});

/** Places where a zone may end: multiples of the grid from the left end (both ends, mirrored), and the beam's ends. */
export function boundaries(length: number, { grid, mirror }: Limits): number[] {
  const reach = mirror ? length / 2 : length;
  const left: number[] = [];
  for (let i = 0; i * grid <= reach + 1e-9; i += 1) left.push(i * grid);
  const all = mirror ? [...left, ...left.map((x) => length - x)] : [...left, length];
  return [...new Set(all.map((x) => Math.round(x * 1e6) / 1e6))]
    .filter((x) => x <= length)
    .sort((a, b) => a - b);
}

/** Every schedule there is, the cheapest returned: fasteners (Σ rows·length/spacing), then zones. */
export function byEnumeration(
  length: number,
  limits: Limits,
  rows: number,
  R: number,
  flow: (from: number, to: number) => number,
): { amount: number; zones: number } | null {
  const places = boundaries(length, limits);
  const spacingOf = (from: number, to: number): number => {
    const q = flow(from, to);
    const allowed = Math.min(limits.max, q > 1e-9 ? (rows * R) / q : Infinity);
    const spacing = Math.floor(allowed / limits.step + 1e-9) * limits.step;
    return spacing >= limits.min - 1e-9 && spacing > 0 ? spacing : NaN;
  };
  let best: { amount: number; zones: number } | null = null;
  const visit = (cuts: number[]): void => {
    const from = cuts.at(-1) ?? 0;
    if (from === length) {
      const pairs = cuts.slice(1).map((to, i): [number, number] => [cuts[i] ?? NaN, to]);
      const reads = pairs.map(([a, b]) => ({ length: b - a, spacing: spacingOf(a, b) }));
      if (limits.mirror) {
        const n = pairs.length;
        const same = pairs.every(([a, b], i) => {
          const [c = NaN, d = NaN] = pairs[n - 1 - i] ?? [];
          return Math.abs(a - (length - d)) < 1e-6 && Math.abs(b - (length - c)) < 1e-6;
        });
        if (!same) return;
        // both ends read the same: the closer spacing of the two
        for (let i = 0; i < n / 2; i += 1) {
          const one = reads[i];
          const other = reads[n - 1 - i];
          if (one !== undefined && other !== undefined) {
            one.spacing = other.spacing = Math.min(one.spacing, other.spacing);
          }
        }
      }
      if (reads.some(({ spacing }) => Number.isNaN(spacing))) return;
      const total = reads.reduce((sum, zone) => sum + (rows * zone.length) / zone.spacing, 0);
      const better =
        best === null ||
        total < best.amount * (1 - 1e-12) ||
        (total <= best.amount * (1 + 1e-12) && pairs.length < best.zones);
      if (better) best = { amount: total, zones: pairs.length };
      return;
    }
    if (cuts.length > limits.zones) return;
    for (const to of places) {
      // the shortest zone: a beam shorter than it is one zone
      if (to > from && (to - from >= limits.shortest - 1e-9 || (from === 0 && to === length)))
        visit([...cuts, to]);
    }
  };
  visit([0]);
  return best;
}

/**
 * The same for members too large to try every schedule one by one: the cheapest way to cover the rest of the beam
 * from each place with so many zones left, each worked out once. Not for `mirror`.
 */
export function byRecursion(
  length: number,
  limits: Limits,
  rows: number,
  R: number,
  flow: (from: number, to: number) => number,
): { amount: number; zones: number } | null {
  const places = boundaries(length, limits);
  const cells = places.slice(1).map((to, i) => flow(places[i] ?? NaN, to));
  const known = new Map<string, number>();
  const rest = (at: number, left: number): number => {
    if (at === cells.length) return 0;
    if (left === 0) return Infinity;
    const key = `${at} ${left}`;
    const before = known.get(key);
    if (before !== undefined) return before;
    let least = Infinity;
    let q = 0;
    for (let to = at + 1; to <= cells.length; to += 1) {
      q = Math.max(q, cells[to - 1] ?? NaN);
      const own = (places[to] ?? NaN) - (places[at] ?? NaN);
      if (own < limits.shortest - 1e-9 && !(at === 0 && to === cells.length)) continue;
      const spacing = Math.floor(Math.min(limits.max, (rows * R) / q) / limits.step + 1e-9) * limits.step;
      if (spacing < limits.min - 1e-9 || spacing <= 0) break;
      least = Math.min(least, (rows * own) / spacing + rest(to, left - 1));
    }
    known.set(key, least);
    return least;
  };
  const all = Array.from({ length: limits.zones }, (_, i) => rest(0, i + 1));
  const amount = Math.min(...all);
  if (amount === Infinity) return null;
  return { amount, zones: all.findIndex((one) => one <= amount * (1 + 1e-12)) + 1 };
}
