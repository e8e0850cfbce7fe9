import type { Rules } from '@shared/schemas/member';

/** A stretch of the beam with one spacing, mm. */
export interface Zone {
  from: number;
  to: number;
  spacing: number;
}

/** The spacings that the rules leave: multiples of the step from `smallest` to `largest`; none where these cross. */
export interface Spacings {
  step: number;
  smallest: number;
  largest: number;
}

/** To spare when a spacing is floored to its step, so that one exactly on a step keeps it. */
const spare = 1e-9;

export function allowedSpacings(rules: Rules): Spacings {
  const step = rules.spacingStep;
  return {
    step,
    smallest: Math.ceil(rules.spacingMin / step - spare) * step,
    largest: Math.floor(rules.spacingMax / step + spare) * step,
  };
}

/** The largest allowed spacing where 1/`need` is the required one; 0 where even the smallest is too wide. */
export function spacingFor(need: number, { step, smallest, largest }: Spacings): number {
  if (largest < smallest || largest <= 0) return 0;
  if (need * largest <= 1) return largest;
  const spacing = Math.floor(1 / (need * step) + spare) * step;
  if (spacing < smallest - spare * step) return 0;
  return Math.min(spacing, largest);
}

/** Multiples of the grid from the left end, and the beam's ends; under `mirror` from both ends to midspan. */
export function zoneGrid(length: number, rules: Rules): number[] {
  const tolerance = 1e-6;
  const points: number[] = [];
  const last = rules.mirror ? length / 2 : length;
  for (let i = 0; i * rules.zoneGrid < last - tolerance; i++) points.push(i * rules.zoneGrid);
  if (!rules.mirror) return [...points, length];
  const middle =
    Math.abs((points[points.length - 1] ?? 0) + rules.zoneGrid - length / 2) <= tolerance ? [length / 2] : [];
  return [...points, ...middle, ...points.map((x) => length - x).reverse()];
}

/**
 * The schedule with the fewest fasteners (Σ length/spacing), then the fewest zones, found exactly by dynamic
 * programming over the grid (Bellman 1957): the best way to cover the beam up to each grid point with 1, 2, …
 * zones. Null where none exists.
 *
 * @param needs for each cell of the grid the largest 1/(required spacing), 1/mm
 */
export function bestZones(
  grid: readonly number[],
  needs: Float64Array,
  spacings: Spacings,
  rules: Rules,
): Zone[] | null {
  const length = grid[grid.length - 1] ?? 0;
  const shortest = Math.min(rules.minZoneLength, length) - 1e-6;
  return rules.mirror
    ? bestMirrored(grid, needs, spacings, rules.maxZones, shortest)
    : bestFree(grid, needs, spacings, rules.maxZones, shortest);
}

/** Costs that differ by less are the same: the same fasteners reached in another order of sums. */
const sameCost = 1e-12;

interface Table {
  zones: number;
  /** cost[j·zones + k]: fewest fasteners a row up to grid point j with k + 1 zones */
  cost: Float64Array;
  previous: Int32Array;
  spacing: Float64Array;
}

function cover(
  points: readonly number[],
  needs: Float64Array,
  spacings: Spacings,
  zones: number,
  shortest: number,
): Table {
  const n = points.length - 1;
  const size = (n + 1) * zones;
  const cost = new Float64Array(size).fill(Infinity);
  const previous = new Int32Array(size);
  const kept = new Float64Array(size);
  for (let j = 1; j <= n; j++) {
    let need = 0;
    let spacing = spacingFor(0, spacings);
    const end = points[j] ?? 0;
    const row = j * zones;
    for (let i = j - 1; i >= 0; i--) {
      const cell = needs[i] ?? 0;
      if (cell > need) {
        need = cell;
        spacing = spacingFor(need, spacings);
      }
      if (spacing <= 0) break;
      const length = end - (points[i] ?? 0);
      if (length < shortest) continue;
      const own = length / spacing;
      if (i === 0) {
        cost[row] = own;
        previous[row] = 0;
        kept[row] = spacing;
        break;
      }
      const from = i * zones;
      const most = Math.min(zones, i + 1);
      for (let k = 1; k < most; k++) {
        const total = (cost[from + k - 1] ?? Infinity) + own;
        if (total < (cost[row + k] ?? Infinity) * (1 - sameCost)) {
          cost[row + k] = total;
          previous[row + k] = i;
          kept[row + k] = spacing;
        }
      }
    }
  }
  return { zones, cost, previous, spacing: kept };
}

function costAt(table: Table, j: number, k: number): number {
  return table.cost[j * table.zones + k] ?? Infinity;
}

function trace(points: readonly number[], table: Table, zones: number, last: number): Zone[] {
  const found: Zone[] = [];
  let j = last;
  for (let k = zones - 1; k >= 0; k--) {
    const at = j * table.zones + k;
    const i = table.previous[at] ?? 0;
    found.push({ from: points[i] ?? 0, to: points[j] ?? 0, spacing: table.spacing[at] ?? 0 });
    j = i;
  }
  return found.reverse();
}

function bestFree(
  grid: readonly number[],
  needs: Float64Array,
  spacings: Spacings,
  maxZones: number,
  shortest: number,
): Zone[] | null {
  const last = grid.length - 1;
  const table = cover(grid, needs, spacings, maxZones, shortest);
  let best = 0;
  let least = Infinity;
  for (let k = 0; k < maxZones; k++) {
    const cost = costAt(table, last, k);
    if (cost < least * (1 - sameCost)) {
      least = cost;
      best = k + 1;
    }
  }
  return best > 0 ? trace(grid, table, best, last) : null;
}

/** Zones that read the same from both ends: z zones on each half about one that lies across midspan. */
function bestMirrored(
  grid: readonly number[],
  needs: Float64Array,
  spacings: Spacings,
  maxZones: number,
  shortest: number,
): Zone[] | null {
  const length = grid[grid.length - 1] ?? 0;
  const cells = grid.length - 1;
  const half = Math.floor(cells / 2); // cells that lie wholly in the left half
  const points = grid.slice(0, half + 1);
  const paired = Float64Array.from({ length: half }, (_, i) =>
    Math.max(needs[i] ?? 0, needs[cells - 1 - i] ?? 0),
  );
  const centre = cells % 2 === 1 ? (needs[half] ?? 0) : 0;
  const sides = Math.floor((maxZones - 1) / 2);
  const table = cover(points, paired, spacings, sides, shortest);
  let least = Infinity;
  let best: { sides: number; at: number; spacing: number } | null = null;
  for (let z = 0; z <= sides; z++) {
    let need = centre;
    for (let i = half; i >= 0; i--) {
      if (i < half) need = Math.max(need, paired[i] ?? 0);
      const spacing = spacingFor(need, spacings);
      if (spacing <= 0) break;
      const across = length - 2 * (points[i] ?? 0);
      if (across < shortest || across <= 0) continue;
      const side = z === 0 ? (i === 0 ? 0 : Infinity) : costAt(table, i, z - 1);
      const cost = 2 * side + across / spacing;
      if (cost < least * (1 - sameCost)) {
        least = cost;
        best = { sides: z, at: i, spacing };
      }
    }
  }
  if (!best) return null;
  const left = trace(points, table, best.sides, best.at);
  const from = points[best.at] ?? 0;
  const mirrored = left
    .map((z) => ({ from: length - z.to, to: length - z.from, spacing: z.spacing }))
    .reverse();
  return [...left, { from, to: length - from, spacing: best.spacing }, ...mirrored];
}
