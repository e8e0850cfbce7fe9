/**
 * What a train can bring to a place at once: pairs of shear (or its integral) and load passed sideways, for all
 * its positions. Only the outermost pairs matter, as the resultant of a sum is largest at a corner of it.
 */
export interface Reach {
  along: number;
  across: number;
  /** position of offset 0 of each train that counts, by the beam's numbering */
  positions: { train: number; x: number }[];
}

/** The corners of the convex hull of the pairs (monotone chain; Andrew 1979). */
export function corners(points: readonly Reach[]): Reach[] {
  if (points.length < 3) return [...points];
  const sorted = [...points].sort((p, q) => p.along - q.along || p.across - q.across);
  const turn = (o: Reach, p: Reach, q: Reach): number =>
    (p.along - o.along) * (q.across - o.across) - (p.across - o.across) * (q.along - o.along);
  const chain = (list: readonly Reach[]): Reach[] => {
    const hull: Reach[] = [];
    for (const point of list) {
      for (;;) {
        const last = hull[hull.length - 1];
        const before = hull[hull.length - 2];
        if (!last || !before || turn(before, last, point) > 0) break;
        hull.pop();
      }
      hull.push(point);
    }
    hull.pop();
    return hull;
  };
  const hull = [...chain(sorted), ...chain(sorted.reverse())];
  return hull.length > 0 ? hull : sorted.slice(0, 1);
}

/** All sums of one pair from each of two sets, the second weighted, reduced to the corners. */
export function addReach(a: readonly Reach[], b: readonly Reach[], along: number, across: number): Reach[] {
  const sums: Reach[] = [];
  for (const p of a) {
    for (const q of b) {
      sums.push({
        along: p.along + along * q.along,
        across: p.across + across * q.across,
        positions: [...p.positions, ...q.positions],
      });
    }
  }
  return corners(sums);
}

/** The pair with the largest resultant √((flow·along)² + across²). */
export function farthest(points: readonly Reach[], flow: number): { value: number; at: Reach } {
  let best: { value: number; at: Reach } = { value: -1, at: { along: 0, across: 0, positions: [] } };
  for (const at of points) {
    const value = Math.hypot(flow * at.along, at.across);
    if (value > best.value * (1 + 1e-12)) best = { value, at };
  }
  return best;
}
