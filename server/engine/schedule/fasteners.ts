import type { Zone } from './zones';

/** Fasteners (or beads) a row in a zone: ⌈length/spacing⌉, with rounding to spare. */
export function perRow(zone: Zone): number {
  return Math.max(1, Math.ceil((zone.to - zone.from) / zone.spacing - 1e-9));
}

/** Where the fasteners of a row stand: evenly divided, half a spacing from each zone's ends. mm, rising. */
export function fastenerPositions(zones: readonly Zone[]): number[] {
  return zones.flatMap((zone) => {
    const n = perRow(zone);
    const length = zone.to - zone.from;
    return Array.from({ length: n }, (_, i) => zone.from + ((i + 0.5) * length) / n);
  });
}

/** The stretch each fastener takes: half-way to its neighbours, and out to the beam's ends. */
export function fastenerStretches(
  positions: readonly number[],
  length: number,
): { from: number; to: number }[] {
  return positions.map((x, i) => {
    const before = positions[i - 1];
    const after = positions[i + 1];
    return {
      from: before === undefined ? 0 : (before + x) / 2,
      to: after === undefined ? length : (x + after) / 2,
    };
  });
}
