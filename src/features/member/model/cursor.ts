import type { MemberDocument } from '@shared/schemas/member';
import type { CalculationResult, InterfaceResult } from '@shared/schemas/result';

/** Every place where something begins, ends, stands or jumps, ascending, each once. */
export function eventsAlong(document: MemberDocument, outcome: InterfaceResult | null): number[] {
  const loads = document.loadCases.flatMap((one) =>
    one.loads.flatMap((load) =>
      load.kind === 'point' || load.kind === 'couple' ? [load.x] : [load.from, load.to],
    ),
  );
  const zones = outcome?.zones.flatMap((zone) => [zone.from, zone.to]) ?? [];
  const all = [
    0,
    document.length,
    ...document.supports.map((support) => support.x),
    ...document.hinges,
    ...loads,
    ...zones,
    ...(outcome === null ? [] : [outcome.peakFlow.x]),
  ];
  const onBeam = all.filter((x) => x >= 0 && x <= document.length).sort((a, b) => a - b);
  return onBeam.filter((x, index) => index === 0 || x - (onBeam[index - 1] ?? 0) > 1e-6);
}

/** Where a key takes the cursor; null where the key is none of its own. */
export function moveCursor(
  key: { key: string; shiftKey: boolean },
  x: number,
  step: number,
  length: number,
  events: readonly number[],
): number | null {
  const hair = 1e-6;
  switch (key.key) {
    case 'Home':
      return 0;
    case 'End':
      return length;
    case 'ArrowRight':
      return key.shiftKey
        ? (events.find((event) => event > x + hair) ?? length)
        : Math.min(length, (Math.floor(x / step + hair) + 1) * step);
    case 'ArrowLeft':
      return key.shiftKey
        ? (events.findLast((event) => event < x - hair) ?? 0)
        : Math.max(0, (Math.ceil(x / step - hair) - 1) * step);
    default:
      return null;
  }
}

const ROUND = [1, 2, 5];

/** mm; a round distance that is not finer than the eye: 1, 2, 5, 10 … or sixteenths and inches doubled. */
export function pointerGrain(millimetresAPixel: number, system: 'metric' | 'us'): number {
  if (system === 'us') {
    let grain = 25.4 / 16;
    while (grain < millimetresAPixel) grain *= 2;
    return grain;
  }
  for (let power = 0.1; ; power *= 10)
    for (const one of ROUND) if (one * power >= millimetresAPixel) return one * power;
}

/** Where a pointer puts the cursor: on an event that is near enough, else on a round distance. */
export function snap(
  x: number,
  length: number,
  grain: number,
  events: readonly number[],
  near: number,
): number {
  const nearest = events.reduce(
    (best, event) => (Math.abs(event - x) < Math.abs(best - x) ? event : best),
    Infinity,
  );
  if (Math.abs(nearest - x) <= near) return nearest;
  return Math.min(length, Math.max(0, Math.round(x / grain) * grain));
}

/** What a curve is on both sides of a place; both the same where it does not jump. */
export interface Sides {
  left: number;
  right: number;
}

/** Reads a curve at x, linear between stations; stations repeat x where it jumps. */
export function curveAt(stations: readonly number[], values: readonly number[], x: number): Sides {
  const at = (index: number) => values[index] ?? 0;
  const after = stations.findIndex((station) => station > x + 1e-6);
  const right = after < 0 ? stations.length : after;
  const before = stations.findIndex((station) => station >= x - 1e-6);
  const first = before < 0 ? stations.length - 1 : before;
  if (first < right) return { left: at(first), right: at(right - 1) };
  const [x0 = 0, x1 = 0] = [stations[first - 1], stations[first]];
  const share = x1 === x0 ? 0 : (x - x0) / (x1 - x0);
  const value = at(first - 1) + (at(first) - at(first - 1)) * share;
  return { left: value, right: value };
}

/** Index of the zone a place is in; on a border the one to the right. */
export function zoneAt(zones: readonly { from: number; to: number }[], x: number): number {
  const found = zones.findIndex((zone) => x < zone.to - 1e-6);
  return found < 0 ? zones.length - 1 : found;
}

/** The combination that asks most of the interface at x: that of the nearest station, of two the hungrier. */
export function governingAt(
  result: CalculationResult,
  outcome: InterfaceResult,
  x: number,
): { id: string; name: string } | null {
  const { x: stations } = result.envelope;
  let best = -1;
  let distance = Infinity;
  stations.forEach((station, index) => {
    const away = Math.abs(station - x);
    const nearer = away < distance - 1e-6;
    const hungrier =
      Math.abs(away - distance) <= 1e-6 && (outcome.needed[index] ?? 0) > (outcome.needed[best] ?? 0);
    if (nearer || hungrier) {
      best = index;
      distance = away;
    }
  });
  return result.combinations[outcome.governing[best] ?? -1] ?? null;
}
