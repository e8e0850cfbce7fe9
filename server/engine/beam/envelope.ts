import type { CalculationResult } from '@shared/schemas/result';
import type { Beam } from './combinations';
import { largestDeflection, largestMoment, largestShear, type Extreme } from './extremes';
import { stationsOf, stationValues, trainTables, type Station, type StationValues } from './stations';

/** The envelope over all combinations, and what later steps need of its making. */
export interface Envelope {
  stations: Station[];
  values: StationValues[];
  told: CalculationResult['envelope'];
  extremes: { shear: Extreme; moment: Extreme; deflection: Extreme };
}

export function envelopeOf(beam: Beam, zoneGrid: number): Envelope {
  const stations = stationsOf(beam, zoneGrid);
  const tables = trainTables(beam, stations);
  const values = beam.combinations.map((loads) => stationValues(beam, stations, tables, loads));
  const n = stations.length;
  const outer = (of: (v: StationValues) => Float64Array, sign: 1 | -1, scale = 1): number[] =>
    Array.from({ length: n }, (_, i) => {
      let most = -Infinity;
      for (const v of values) most = Math.max(most, sign * (of(v)[i] ?? 0));
      return tidy(sign * most * scale);
    });
  const governing = (
    max: (v: StationValues) => Float64Array,
    min: (v: StationValues) => Float64Array,
  ): number[] =>
    Array.from({ length: n }, (_, i) => {
      let best = -1;
      let most = 0;
      values.forEach((v, c) => {
        const size = Math.max(Math.abs(max(v)[i] ?? 0), Math.abs(min(v)[i] ?? 0));
        if (size > most * (1 + 1e-9)) {
          most = size;
          best = c;
        }
      });
      return best;
    });
  return {
    stations,
    values,
    told: {
      x: stations.map((s) => s.x),
      shearMax: outer((v) => v.shearMax, 1),
      shearMin: outer((v) => v.shearMin, -1),
      momentMax: outer((v) => v.momentMax, 1),
      momentMin: outer((v) => v.momentMin, -1),
      deflectionMax: outer((v) => v.bendMax, 1, 1 / beam.EI),
      deflectionMin: outer((v) => v.bendMin, -1, 1 / beam.EI),
      governing: {
        shear: governing(
          (v) => v.shearMax,
          (v) => v.shearMin,
        ),
        moment: governing(
          (v) => v.momentMax,
          (v) => v.momentMin,
        ),
        deflection: governing(
          (v) => v.bendMax,
          (v) => v.bendMin,
        ),
      },
    },
    extremes: {
      shear: largestShear(beam),
      moment: largestMoment(beam, stations, values),
      deflection: largestDeflection(beam, stations, values),
    },
  };
}

/** A zero without a sign: the sign of −0 would show in the stored result. */
function tidy(value: number): number {
  return value === 0 ? 0 : value;
}
