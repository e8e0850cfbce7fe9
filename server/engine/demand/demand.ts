import type { Beam, CombinedLoads } from '../beam/combinations';
import { placeIndex, touching } from '../beam/events';
import type { Position } from '../beam/extremes';
import { valueAt, weightedSum, type Piecewise } from '../numeric/piecewise';
import type { SharedDemand } from './shared';
import { addReach, farthest, type Reach } from './reach';
import { peakOfResultant, raiseResultantCells } from './still-resultant';

/** The flow an interface has to carry at its worst place under one combination. */
export interface FlowPeak {
  /** resultant flow, N/mm */
  value: number;
  x: number;
  /** shear there, N, signed; its flow along the beam and the flow passed sideways, N/mm */
  shear: number;
  along: number;
  across: number;
  positions: Position[];
}

/** How many places of a long train are looked at one by one; missing one by a step costs less than 2e-5. */
const mostPlaces = 1500;

/** What one interface has to carry, combination by combination. */
export class InterfaceDemand {
  /** load passed sideways that stands still, N/mm, for each combination; null where there is none */
  private readonly still: (Piecewise | null)[];

  /**
   * @param flowPerShear |q/V|, 1/mm
   * @param stillAcross for each load case the flow it passes sideways here, or null
   * @param trainAcross for each train the part of its load that crosses here, signed
   */
  constructor(
    readonly shared: SharedDemand,
    readonly flowPerShear: number,
    stillAcross: readonly (Piecewise | null)[],
    readonly trainAcross: readonly number[],
  ) {
    this.still = shared.beam.combinations.map(({ factors }) => {
      const parts = stillAcross.flatMap((f, c) => {
        const weight = factors[c] ?? 0;
        return f && weight !== 0 ? [{ f, weight }] : [];
      });
      return parts.length > 0 ? weightedSum(parts) : null;
    });
  }

  private movesSideways(loads: CombinedLoads): boolean {
    return loads.trains.some(({ train }) => (this.trainAcross[train] ?? 0) !== 0);
  }

  /** True where some load is passed sideways through this interface. */
  get isCrossed(): boolean {
    return this.shared.beam.combinations.some(
      (loads, c) => this.still[c] !== null || this.movesSideways(loads),
    );
  }

  /** The worst place under each combination; where the shear alone tells the positions they are left out. */
  peaks(): FlowPeak[] {
    const { beam } = this.shared;
    return beam.combinations.map((loads, c): FlowPeak => {
      const still = this.still[c] ?? null;
      if (this.movesSideways(loads)) return this.movingPeak(loads, c);
      if (still) {
        return { ...peakOfResultant(loads, still, this.flowPerShear), positions: [] };
      }
      const { value, x } = loads.shearPeak;
      const along = Math.abs(value) * this.flowPerShear;
      return { value: along, x, shear: value, along, across: 0, positions: [] };
    });
  }

  /** The largest flow of all combinations within each cell of a grid, N/mm. */
  cells(grid: readonly number[]): Float64Array {
    const largest = this.shared.cellShear(grid).map((v) => v * this.flowPerShear);
    this.shared.beam.combinations.forEach((loads, c) => {
      const still = this.still[c] ?? null;
      const own = this.movesSideways(loads)
        ? this.movingCells(loads, c, grid)
        : still
          ? raiseResultantCells(loads, still, this.flowPerShear, grid)
          : null;
      own?.forEach((q, i) => {
        if (q > (largest[i] ?? 0)) largest[i] = q;
      });
    });
    return largest;
  }

  /** The largest flow at each station, N/mm, and the combination that asks for it (−1 where there is none). */
  atStations(nothing: number): { needed: number[]; governing: number[] } {
    const { stations, envelope, beam } = this.shared;
    const needed: number[] = [];
    const governing: number[] = [];
    stations.forEach((_, i) => {
      const v =
        Math.max(Math.abs(envelope.shearMax[i] ?? 0), Math.abs(envelope.shearMin[i] ?? 0)) *
        this.flowPerShear;
      needed.push(v > nothing ? v : 0);
      governing.push(v > nothing ? (envelope.governing.shear[i] ?? -1) : -1);
    });
    beam.combinations.forEach((loads, c) => {
      const still = this.still[c] ?? null;
      const moves = this.movesSideways(loads);
      if (!moves && !still) return;
      stations.forEach(({ x, side }, i) => {
        const q = moves ? this.movingAt(loads, c, x, side).value : this.stillAt(loads, still, x, side);
        if (q > nothing && q > (needed[i] ?? 0) * (1 + 1e-9)) {
          needed[i] = q;
          governing[i] = c;
        }
      });
    });
    return { needed, governing };
  }

  private stillAt(loads: CombinedLoads, still: Piecewise | null, x: number, side: -1 | 1): number {
    const v = Math.max(
      Math.abs(valueAt(loads.shearMax, x, side)),
      Math.abs(valueAt(loads.shearMin, x, side)),
    );
    return Math.hypot(v * this.flowPerShear, still ? valueAt(still, x, side) : 0);
  }

  /**
   * The force that a stretch collects under one combination, N: √((∫q)² + (∫t)²), signed inside, the largest
   * over the positions of what moves.
   */
  stretchForce(c: number, a: number, b: number): number {
    const { along, across } = this.stretchParts(c, a, b);
    const q = this.flowPerShear * Math.abs(along);
    return across === 0 ? q : Math.hypot(q, across);
  }

  /** The same in its two parts: ∫V dx, N·mm, and the load passed sideways over the stretch, N. */
  stretchParts(c: number, a: number, b: number): { along: number; across: number } {
    const { shared } = this;
    const loads = shared.beam.combinations[c];
    if (!loads) return { along: 0, across: 0 };
    const still = this.still[c] ?? null;
    const across = still ? integralOver(still, a, b) : 0;
    if (this.movesSideways(loads)) {
      let points: Reach[] = [{ along: shared.stillIntegral(c, a, b), across, positions: [] }];
      for (const { train, factor } of loads.trains) {
        points = addReach(
          points,
          shared.stretchReach(train, a, b),
          factor,
          factor * (this.trainAcross[train] ?? 0),
        );
      }
      return farthest(points, this.flowPerShear).at;
    }
    return { along: shared.integrals(a, b)[c] ?? 0, across };
  }

  /** A place worked out from sums may miss an event by rounding, and then stand on the wrong side of it. */
  private snapped(x: number): number {
    const { events } = this.shared.beam;
    const event = events[placeIndex(events, x)] ?? x;
    return Math.abs(event - x) <= touching ? event : x;
  }

  private movingAt(
    loads: CombinedLoads,
    c: number,
    place: number,
    side: -1 | 1,
  ): { value: number; at: Reach } {
    const { beam } = this.shared;
    const x = this.snapped(place);
    const still = this.still[c] ?? null;
    const fixed = stillShear(beam, loads, x, side);
    let points: Reach[] = [{ along: fixed, across: still ? valueAt(still, x, side) : 0, positions: [] }];
    for (const { train, factor } of loads.trains) {
      points = addReach(
        points,
        this.shared.reach(train, x, side),
        factor,
        factor * (this.trainAcross[train] ?? 0),
      );
    }
    return farthest(points, this.flowPerShear);
  }

  private movingCells(loads: CombinedLoads, c: number, grid: readonly number[]): Float64Array {
    const cells = new Float64Array(grid.length - 1);
    const places = this.places(loads, c);
    let next = 0;
    for (let k = 0; k + 1 < grid.length; k++) {
      const a = grid[k] ?? 0;
      const b = grid[k + 1] ?? 0;
      let largest = Math.max(this.movingAt(loads, c, a, 1).value, this.movingAt(loads, c, b, -1).value);
      for (let i = 1; i < 4; i++)
        largest = Math.max(largest, this.movingAt(loads, c, a + (i * (b - a)) / 4, 1).value);
      while (next < places.length && (places[next] ?? 0) <= a) next++;
      for (; next < places.length && (places[next] ?? 0) < b; next++) {
        const x = places[next] ?? 0;
        largest = Math.max(
          largest,
          this.movingAt(loads, c, x, -1).value,
          this.movingAt(loads, c, x, 1).value,
        );
      }
      cells[k] = largest;
    }
    return cells;
  }

  private movingPeak(loads: CombinedLoads, c: number): FlowPeak {
    const { length } = this.shared.beam;
    let best: { value: number; at: Reach; x: number } | null = null;
    const even = Array.from({ length: 201 }, (_, i) => (i * length) / 200);
    for (const x of [...even, ...this.places(loads, c)].sort((p, q) => p - q)) {
      for (const side of [-1, 1] as const) {
        if ((side === -1 && x <= 0) || (side === 1 && x >= length)) continue;
        const found = this.movingAt(loads, c, x, side);
        if (best === null || found.value > best.value * (1 + 1e-9)) best = { ...found, x };
      }
    }
    const { value, at, x } = best ?? { value: 0, at: { along: 0, across: 0, positions: [] }, x: 0 };
    return {
      value,
      x,
      shear: at.along,
      along: Math.abs(at.along) * this.flowPerShear,
      across: Math.abs(at.across),
      positions: at.positions,
    };
  }

  /**
   * Places at which the worst position changes its kind: where one axle stands at x while another stands at a
   * node, at an end of the travel, or just comes within the spread of x; and events of what stands still.
   */
  private places(loads: CombinedLoads, c: number): number[] {
    const { beam, depth } = this.shared;
    const { length, events, system } = beam;
    const found = new Set<number>(events);
    const still = this.still[c];
    if (still) for (let i = 0; i < still.breaks.length; i++) found.add(still.breaks[i] ?? 0);
    for (const { train } of loads.trains) {
      const t = beam.trains[train];
      if (!t) continue;
      const anchors = [...system.nodes.map((n) => n.x), depth, length - depth];
      for (const o of t.offsets) {
        for (const p of [t.from + o, t.to + o]) for (const d of [0, depth, -depth]) found.add(p + d);
        for (const other of t.offsets) {
          for (const x of anchors) for (const d of [0, depth, -depth]) found.add(x + o - other + d);
        }
      }
    }
    const sorted = [...found]
      .filter((x) => x >= 0 && x <= length)
      .map((x) => this.snapped(x))
      .sort((a, b) => a - b);
    const apart = sorted.filter((x, i) => i === 0 || x - (sorted[i - 1] ?? 0) > 1e-9 * length);
    if (apart.length <= mostPlaces) return apart;
    // A long train has so many such places that they lie closer than any of them matters.
    const kept: number[] = [];
    for (const x of apart) if (x - (kept[kept.length - 1] ?? -Infinity) >= length / mostPlaces) kept.push(x);
    return kept;
  }
}

function stillShear(beam: Beam, loads: CombinedLoads, x: number, side: -1 | 1): number {
  const { events } = beam;
  let low = 0;
  let high = events.length - 2;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    const at = events[middle] ?? 0;
    if (side === 1 ? at <= x : at < x) low = middle;
    else high = middle - 1;
  }
  const a = events[low] ?? 0;
  const u = (x - a) / ((events[low + 1] ?? 0) - a);
  const { shear } = loads.fields;
  return (shear[3 * low] ?? 0) + u * ((shear[3 * low + 1] ?? 0) + u * (shear[3 * low + 2] ?? 0));
}

/** ∫f dx from a to b. */
function integralOver(f: Piecewise, a: number, b: number): number {
  let sum = 0;
  for (let i = 0; i + 1 < f.breaks.length; i++) {
    const from = f.breaks[i] ?? 0;
    const h = (f.breaks[i + 1] ?? 0) - from;
    const u0 = Math.max(0, (a - from) / h);
    const u1 = Math.min(1, (b - from) / h);
    if (u1 <= u0) continue;
    for (let d = 0; d < 4; d++)
      sum += (h * (f.cubic[4 * i + d] ?? 0) * (u1 ** (d + 1) - u0 ** (d + 1))) / (d + 1);
  }
  return sum;
}
