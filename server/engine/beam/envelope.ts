import type { CalculationResult } from '@shared/schemas/result';
import type { Beam } from './combinations';
import { largestDeflection, largestMoment, largestShear, type Extreme } from './extremes';
import { stationsOf, stationValues, trainTables, type Station, type StationValues } from './stations';

/** The envelope over all combinations, and what later steps need of its making. */
export interface Envelope {
  stations: Station[];
  told: CalculationResult['envelope'];
  extremes: { shear: Extreme; moment: Extreme; deflection: Extreme };
}

export function envelopeOf(beam: Beam, zoneGrid: number): Envelope {
  const stations = stationsOf(beam, zoneGrid);
  const tables = trainTables(beam, stations);
  const outer = new Outer(stations.length);
  // Values station by station are kept only where the search for extremes goes back to them.
  const values = beam.combinations.map((loads, c) => {
    const own = stationValues(beam, stations, tables, loads);
    outer.take(own, c);
    return loads.trains.length > 0 ? own : null;
  });
  return {
    stations,
    told: outer.told(stations, beam.EI),
    extremes: {
      shear: largestShear(beam),
      moment: largestMoment(beam, stations, values, outer.largest(outer.momentMax, outer.momentMin)),
      deflection: largestDeflection(beam, stations, values, outer.largest(outer.bendMax, outer.bendMin)),
    },
  };
}

/** Whichever is farther out, and the combination that governs there, taken in one combination after the other. */
class Outer {
  readonly shearMax: Float64Array;
  readonly shearMin: Float64Array;
  readonly momentMax: Float64Array;
  readonly momentMin: Float64Array;
  readonly bendMax: Float64Array;
  readonly bendMin: Float64Array;
  private readonly shear: Governing;
  private readonly moment: Governing;
  private readonly bend: Governing;

  constructor(size: number) {
    this.shearMax = new Float64Array(size).fill(-Infinity);
    this.shearMin = new Float64Array(size).fill(Infinity);
    this.momentMax = new Float64Array(size).fill(-Infinity);
    this.momentMin = new Float64Array(size).fill(Infinity);
    this.bendMax = new Float64Array(size).fill(-Infinity);
    this.bendMin = new Float64Array(size).fill(Infinity);
    this.shear = newGoverning(size);
    this.moment = newGoverning(size);
    this.bend = newGoverning(size);
  }

  take(v: StationValues, combination: number): void {
    takeOuter(this.shearMax, this.shearMin, this.shear, v.shearMax, v.shearMin, combination);
    takeOuter(this.momentMax, this.momentMin, this.moment, v.momentMax, v.momentMin, combination);
    takeOuter(this.bendMax, this.bendMin, this.bend, v.bendMax, v.bendMin, combination);
  }

  /** The largest magnitude that the stations show. */
  largest(max: Float64Array, min: Float64Array): number {
    let most = 0;
    for (let i = 0; i < max.length; i++) most = Math.max(most, max[i] ?? 0, -(min[i] ?? 0));
    return most;
  }

  told(stations: readonly Station[], EI: number): CalculationResult['envelope'] {
    return {
      x: stations.map((s) => s.x),
      shearMax: Array.from(this.shearMax, tidy),
      shearMin: Array.from(this.shearMin, tidy),
      momentMax: Array.from(this.momentMax, tidy),
      momentMin: Array.from(this.momentMin, tidy),
      deflectionMax: Array.from(this.bendMax, (v) => tidy(v / EI)),
      deflectionMin: Array.from(this.bendMin, (v) => tidy(v / EI)),
      governing: {
        shear: [...this.shear.combination],
        moment: [...this.moment.combination],
        deflection: [...this.bend.combination],
      },
    };
  }
}

interface Governing {
  size: Float64Array;
  combination: Int32Array;
}

function newGoverning(size: number): Governing {
  return { size: new Float64Array(size), combination: new Int32Array(size).fill(-1) };
}

function takeOuter(
  outerMax: Float64Array,
  outerMin: Float64Array,
  governing: Governing,
  max: Float64Array,
  min: Float64Array,
  combination: number,
): void {
  for (let i = 0; i < max.length; i++) {
    const high = max[i] ?? 0;
    const low = min[i] ?? 0;
    if (high > (outerMax[i] ?? 0)) outerMax[i] = high;
    if (low < (outerMin[i] ?? 0)) outerMin[i] = low;
    const size = Math.max(Math.abs(high), Math.abs(low));
    if (size > (governing.size[i] ?? 0) * (1 + 1e-9)) {
      governing.size[i] = size;
      governing.combination[i] = combination;
    }
  }
}

/** A zero without a sign: the sign of −0 would show in the stored result. */
function tidy(value: number): number {
  return value === 0 ? 0 : value;
}
