import type { Model } from './model';
import { demandOn, read, stretchProbe, type Felt, type Reading } from './probe';

/** Where every fastener stands and what it carries. */

/** Fasteners of a row in a zone: length over spacing, rounded up with 1e-9 to spare. */
export function perRow(zone: { from: number; to: number; spacing: number }): number {
  return Math.max(1, Math.ceil((zone.to - zone.from) / zone.spacing - 1e-9));
}

/** Places of a row's fasteners: evenly divided, half a real spacing from each zone's ends. */
export function placesOf(zones: readonly { from: number; to: number; spacing: number }[]): number[] {
  return zones.flatMap((zone) => {
    const count = perRow(zone);
    const real = (zone.to - zone.from) / count;
    return Array.from({ length: count }, (_, i) => zone.from + (i + 0.5) * real);
  });
}

/** Readings of stretches, each taken once for all interfaces. */
export function stretchReader(
  model: Model,
  events: readonly number[],
): (from: number, to: number) => Reading {
  const known = new Map<string, Reading>();
  return (from, to) => {
    const key = `${from} ${to}`;
    const before = known.get(key);
    if (before !== undefined) return before;
    const reading = read(model, stretchProbe(model, events, from, to));
    known.set(key, reading);
    return reading;
  };
}

/** Force on one fastener at each place: the flow over its stretch, half-way to its neighbours, by rows. */
export function forcesOf(
  model: Model,
  reader: (from: number, to: number) => Reading,
  places: readonly number[],
  felt: Felt,
  rows: number,
): number[] {
  return places.map((place, i) => {
    const before = places[i - 1];
    const after = places[i + 1];
    const from = before === undefined ? 0 : (before + place) / 2;
    const to = after === undefined ? model.length : (place + after) / 2;
    return demandOn(model, reader(from, to), felt).value / rows;
  });
}
