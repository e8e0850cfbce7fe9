import type { Rules } from '@shared/schemas/member';
import { at } from './linear';

/** The fewest fasteners by going through every division of the grid, kept in tables. */

export interface Zone {
  from: number;
  to: number;
  spacing: number;
}

export type ZoneRules = Omit<Rules, 'deflectionLimit' | 'composite'>;

/** Places where a zone may begin or end: multiples of the grid from the left end, and the ends. */
export function gridBorders(length: number, rules: ZoneRules): number[] {
  const borders = [0];
  const last = rules.mirror ? length / 2 : length;
  for (let i = 1; i * rules.zoneGrid < last - 1e-6; i += 1) borders.push(i * rules.zoneGrid);
  if (!rules.mirror) return [...borders, length];
  return [...borders, ...[...borders].reverse().map((x) => length - x)];
}

/** Smallest and largest spacing allowed; null where no multiple of the step lies within the limits. */
function allowedSpacings(rules: ZoneRules): { least: number; most: number } | null {
  const least = Math.ceil(rules.spacingMin / rules.spacingStep - 1e-9) * rules.spacingStep;
  const most = Math.floor(rules.spacingMax / rules.spacingStep + 1e-9) * rules.spacingStep;
  return least > most + 1e-9 ? null : { least, most };
}

/** The largest allowed spacing of a zone in which spacing × `demand` may not pass 1; null where even the least may not be. */
function spacingUnder(demand: number, rules: ZoneRules): number | null {
  const allowed = allowedSpacings(rules);
  if (allowed === null) return null;
  if (demand === 0) return allowed.most;
  const steps = Math.floor(1 / demand / rules.spacingStep + 1e-9);
  const spacing = Math.min(allowed.most, steps * rules.spacingStep);
  return spacing < allowed.least - 1e-9 ? null : spacing;
}

interface Plan {
  cost: number;
  zones: number;
  borders: number[];
}

const better = (a: Plan, b: Plan | null): boolean =>
  b === null || a.cost < b.cost * (1 - 1e-12) || (a.cost <= b.cost * (1 + 1e-12) && a.zones < b.zones);

/**
 * Cheapest division with up to `most` zones of the cells between borders 0 … n, ending at each border: plans[j] are those that
 * end at border j, by number of zones.
 */
function divide(
  borders: readonly number[],
  demands: readonly number[],
  most: number,
  rules: ZoneRules,
): (Plan | null)[][] {
  const n = borders.length - 1;
  const plans: (Plan | null)[][] = Array.from({ length: n + 1 }, () =>
    Array.from({ length: most + 1 }, () => null),
  );
  at(plans, 0)[0] = { cost: 0, zones: 0, borders: [0] };
  for (let i = 0; i < n; i += 1) {
    let demand = 0;
    for (let j = i + 1; j <= n; j += 1) {
      demand = Math.max(demand, at(demands, j - 1));
      const length = at(borders, j) - at(borders, i);
      if (length < rules.minZoneLength - 1e-6) continue;
      const spacing = spacingUnder(demand, rules);
      if (spacing === null) break;
      for (let k = 0; k < most; k += 1) {
        const before = at(plans, i)[k] ?? null;
        if (before === null) continue;
        const plan: Plan = { cost: before.cost + length / spacing, zones: k + 1, borders: before.borders };
        if (better(plan, at(plans, j)[k + 1] ?? null))
          at(plans, j)[k + 1] = { ...plan, borders: [...before.borders, j] };
      }
    }
  }
  return plans;
}

/** Zones between chosen borders, each with the largest spacing its demand allows. */
function zonesOf(
  places: readonly number[],
  demandIn: (from: number, to: number) => number,
  rules: ZoneRules,
): Zone[] {
  return places.slice(1).map((to, i) => {
    const from = at(places, i);
    return { from, to, spacing: spacingUnder(demandIn(from, to), rules) ?? rules.spacingMin };
  });
}

const best = (plans: readonly (Plan | null)[]): Plan | null =>
  plans.reduce<Plan | null>((least, plan) => (plan !== null && better(plan, least) ? plan : least), null);

type DemandIn = (from: number, to: number) => number;

function fewestFromLeft(length: number, rules: ZoneRules, demandIn: DemandIn): Zone[] | null {
  const grid = gridBorders(length, rules);
  const demands = grid.slice(1).map((to, i) => demandIn(at(grid, i), to));
  const plan = best(divide(grid, demands, rules.maxZones, rules).at(-1) ?? []);
  if (plan === null) return null;
  const places = plan.borders.map((i) => at(grid, i));
  return zonesOf(places, demandIn, rules);
}

/** Halves that read the same, about one zone across midspan. */
function fewestMirrored(length: number, rules: ZoneRules, demandIn: DemandIn): Zone[] | null {
  const both = (from: number, to: number): number =>
    Math.max(demandIn(from, to), demandIn(length - to, length - from));
  const grid = gridBorders(length, rules);
  const left = grid.slice(0, grid.length / 2);
  const demands = left.slice(1).map((to, i) => both(at(left, i), to));
  const halves = divide(left, demands, Math.floor((rules.maxZones - 1) / 2), rules);
  const whole = halves.flatMap((plans, j): Plan[] => {
    const border = at(left, j);
    const across = length - 2 * border;
    const spacing = spacingUnder(both(border, length - border), rules);
    if (spacing === null || across < rules.minZoneLength - 1e-6) return [];
    return plans.flatMap((half) =>
      half === null
        ? []
        : [{ cost: 2 * half.cost + across / spacing, zones: 2 * half.zones + 1, borders: half.borders }],
    );
  });
  const plan = best(whole);
  if (plan === null) return null;
  const places = plan.borders.map((i) => at(left, i));
  return zonesOf([...places, ...[...places].reverse().map((x) => length - x)], both, rules);
}

/**
 * The schedule with the fewest Σ length/spacing, then the fewest zones; null where there is none.
 *
 * @param demandIn largest flow over limit (1/mm) between two borders
 */
export function fewest(length: number, rules: ZoneRules, demandIn: DemandIn): Zone[] | null {
  return rules.mirror ? fewestMirrored(length, rules, demandIn) : fewestFromLeft(length, rules, demandIn);
}
