import type { CalculationResult } from '@shared/schemas/result';
import type { Beam } from '../beam/combinations';
import type { Station } from '../beam/stations';
import { trainExtremes } from '../beam/train';
import { raiseCells } from '../numeric/piecewise';
import type { Reach } from './reach';
import { reachAt, reachOver } from './train-reach';

/** What the interfaces of a member share: cells, stretches and trains are looked at once for all of them. */
export class SharedDemand {
  private readonly cellCache = new Map<string, Float64Array>();
  private readonly stretchCache = new Map<string, Float64Array>();
  private readonly reachCache = new Map<string, Reach[]>();
  private readonly cumulated: Float64Array[];

  constructor(
    readonly beam: Beam,
    readonly depth: number,
    readonly stations: readonly Station[],
    readonly envelope: Pick<CalculationResult['envelope'], 'shearMax' | 'shearMin' | 'governing'>,
  ) {
    this.cumulated = beam.combinations.map(({ fields }) => cumulated(beam.events, fields.shear));
  }

  /** The largest |V| of all combinations within each cell of a grid. */
  cellShear(grid: readonly number[]): Float64Array {
    const key = grid.join(' ');
    const known = this.cellCache.get(key);
    if (known) return known;
    const largest = new Float64Array(grid.length - 1);
    for (const { shearMax, shearMin } of this.beam.combinations) {
      raiseCells(shearMax, grid, 1, largest);
      raiseCells(shearMin, grid, -1, largest);
    }
    this.cellCache.set(key, largest);
    return largest;
  }

  /** ∫V dx from a to b of a combination's loads that stand still. */
  stillIntegral(c: number, a: number, b: number): number {
    return this.upTo(c, b) - this.upTo(c, a);
  }

  private upTo(c: number, x: number): number {
    const { events, combinations } = this.beam;
    const sums = this.cumulated[c];
    const shear = combinations[c]?.fields.shear;
    if (!sums || !shear) return 0;
    let low = 0;
    let high = events.length - 2;
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if ((events[middle] ?? 0) <= x) low = middle;
      else high = middle - 1;
    }
    const h = (events[low + 1] ?? 0) - (events[low] ?? 0);
    const u = (x - (events[low] ?? 0)) / h;
    const k = 3 * low;
    return (
      (sums[low] ?? 0) +
      h * u * ((shear[k] ?? 0) + u * ((shear[k + 1] ?? 0) / 2 + (u * (shear[k + 2] ?? 0)) / 3))
    );
  }

  /** ∫V dx over a stretch under each combination, the largest in size over the positions of what moves. */
  integrals(a: number, b: number): Float64Array {
    const key = `${a} ${b}`;
    const known = this.stretchCache.get(key);
    if (known) return known;
    const { influence, trains, combinations } = this.beam;
    const line = influence?.shearIntegral(a, b);
    const moving = influence && line ? trains.map((t) => trainExtremes(t, line, influence)) : [];
    const found = new Float64Array(combinations.length);
    for (let c = 0; c < combinations.length; c++) {
      let max = this.stillIntegral(c, a, b);
      let min = max;
      for (const { train, factor } of combinations[c]?.trains ?? []) {
        const e = moving[train];
        if (!e) continue;
        max += factor * (factor > 0 ? e.max : e.min);
        min += factor * (factor > 0 ? e.min : e.max);
      }
      found[c] = max >= -min ? max : min;
    }
    this.stretchCache.set(key, found);
    return found;
  }

  /**
   * Pairs of shear and load per length that a train can bring just left or right of x. A hair beside it, as x may
   * be a sum that misses by rounding the place where an axle leaves the beam or passes another's reach.
   */
  reach(train: number, x: number, side: -1 | 1): Reach[] {
    const { influence, system, length } = this.beam;
    if (!influence) return [];
    return this.cachedReach(`${train} ${x} ${side}`, () => {
      const beside = Math.min(Math.max(x + side * 1e-11 * length, 0), length);
      return reachAt(this.beam, train, beside, influence.shear(beside, system.spanAt(beside)), this.depth);
    });
  }

  /** The same for a stretch. */
  stretchReach(train: number, a: number, b: number): Reach[] {
    const { influence } = this.beam;
    if (!influence) return [];
    return this.cachedReach(`${train} ${a} ${b} stretch`, () =>
      reachOver(this.beam, train, a, b, influence.shearIntegral(a, b), this.depth),
    );
  }

  private cachedReach(key: string, make: () => Reach[]): Reach[] {
    const known = this.reachCache.get(key);
    if (known) return known;
    const made = make();
    this.reachCache.set(key, made);
    return made;
  }
}

function cumulated(events: readonly number[], shear: Float64Array): Float64Array {
  const sums = new Float64Array(events.length);
  for (let i = 0; i + 1 < events.length; i++) {
    const h = (events[i + 1] ?? 0) - (events[i] ?? 0);
    const k = 3 * i;
    sums[i + 1] = (sums[i] ?? 0) + h * ((shear[k] ?? 0) + (shear[k + 1] ?? 0) / 2 + (shear[k + 2] ?? 0) / 3);
  }
  return sums;
}
