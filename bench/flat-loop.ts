import type { Load, MemberDocument, MovingLoad } from '@shared/schemas/member';
import { influenceLines, type Station } from './influence';

/**
 * The yardstick for the heavy member: a flat loop over Float64Arrays that only evaluates V and M at given stations
 * for every combination, and for a moving one at 400 positions of its train. Everything it reads is prepared
 * before; the loop itself is plain and in no way slowed down. It needs a member on unyielding supports without
 * hinges, with at most one train in a combination.
 */

/** Positions of a train in its combination. */
export const POSITIONS = 400;
const GRAVITY = 9.80665;

interface Train {
  axles: number;
  positions: number;
  /** place within its span, 0 to 1: `[position][axle]` */
  place: Float64Array;
  x: Float64Array;
  /** offset of its span's cubics: `[position][axle]` */
  span: Int32Array;
  weights: Float64Array;
}

export interface Prepared {
  stationX: Float64Array;
  cases: number;
  /** V and M of each case at rest: `[case][station]` */
  shear: Float64Array;
  moment: Float64Array;
  /** `[combination][case]` */
  factors: Float64Array;
  /** for each combination the train that moves in it and the factor on it */
  trains: ({ train: Train; factor: number } | null)[];
  influence: { shear: Float64Array; moment: Float64Array; perStation: number };
}

export interface FlatEnvelope {
  shearMax: Float64Array;
  shearMin: Float64Array;
  momentMax: Float64Array;
  momentMin: Float64Array;
}

/** Spans between supports, from a document whose beam starts and ends on one. */
export function spansOf(document: MemberDocument): number[] {
  const xs = document.supports.map((support) => support.x).sort((a, b) => a - b);
  return xs.slice(1).map((x, i) => x - (xs[i] ?? 0));
}

/** Names the span of each station; of two at one x the first is read on the left. */
export function stationsAt(x: readonly number[], spans: readonly number[]): Station[] {
  const starts = spans.reduce<number[]>((list, length) => [...list, (list.at(-1) ?? 0) + length], [0]);
  return x.map((value, i) => {
    const left = x[i + 1] === value;
    const after = starts.findIndex((start) => (left ? start >= value : start > value));
    const span = after === -1 ? spans.length - 1 : Math.max(0, after - 1);
    return { x: value, span, left };
  });
}

type Influence = ReturnType<typeof influenceLines>;

/** Value of a station's influence line under a unit load; a load at the station itself counts as `right`. */
function ordinate(
  lines: Float64Array,
  influence: Influence,
  station: number,
  span: number,
  x: number,
  right: boolean,
) {
  const start = influence.starts[span] ?? 0;
  const t = (x - start) / ((influence.starts[span + 1] ?? 0) - start);
  const at = station * influence.perStation + span * 8 + (right ? 4 : 0);
  const [c0 = 0, c1 = 0, c2 = 0, c3 = 0] = lines.subarray(at, at + 4);
  return ((c3 * t + c2) * t + c1) * t + c0;
}

/** Three-point Gauss rule on −1 … 1, exact to degree five: a cubic times a straight load needs four. */
const GAUSS = [
  [-Math.sqrt(0.6), 5 / 9],
  [0, 8 / 9],
  [Math.sqrt(0.6), 5 / 9],
] as const;

/** Effect at one station of a load at rest. */
function effect(
  load: Load,
  lines: Float64Array,
  influence: Influence,
  station: Station,
  index: number,
): number {
  if (load.kind === 'moving') return 0;
  if (load.kind === 'couple') throw new Error('the yardstick takes no couples');
  const { starts } = influence;
  if (load.kind === 'point') {
    const span = Math.max(
      0,
      starts.findLastIndex((start) => start < load.x),
    );
    const right = load.x > station.x || (load.x === station.x && station.left);
    return load.value * ordinate(lines, influence, index, span, load.x, right);
  }
  const [start, end] = load.kind === 'uniform' ? [load.value, load.value] : [load.start, load.end];
  const breaks = [load.from, load.to, station.x, ...starts]
    .filter((x) => x >= load.from && x <= load.to)
    .sort((a, b) => a - b);
  let sum = 0;
  breaks.slice(1).forEach((to, i) => {
    const from = breaks[i] ?? to;
    const half = (to - from) / 2;
    const span = Math.max(
      0,
      starts.findLastIndex((x) => x <= from + half),
    );
    for (const [place, weight] of GAUSS) {
      const x = from + half * (1 + place);
      const value = start + ((end - start) * (x - load.from)) / (load.to - load.from);
      sum += half * weight * value * ordinate(lines, influence, index, span, x, x > station.x);
    }
  });
  return sum;
}

function trainOf(load: MovingLoad, starts: readonly number[], positions: number): Train {
  const axles = load.axles.length;
  const train: Train = {
    axles,
    positions,
    place: new Float64Array(positions * axles),
    x: new Float64Array(positions * axles),
    span: new Int32Array(positions * axles),
    weights: Float64Array.from(load.axles, (axle) => axle.value),
  };
  const spans = starts.length - 1;
  for (let position = 0; position < positions; position += 1) {
    const head = load.from + ((load.to - load.from) * position) / (positions - 1);
    load.axles.forEach((axle, i) => {
      const at = position * axles + i;
      const x = head + axle.offset;
      const span = starts.findLastIndex((start) => start <= x);
      const on = span >= 0 && span < spans;
      train.x[at] = x;
      train.span[at] = (on ? span : spans) * 8;
      train.place[at] = on ? (x - (starts[span] ?? 0)) / ((starts[span + 1] ?? 0) - (starts[span] ?? 0)) : 0;
    });
  }
  return train;
}

/** Everything that the loop reads, laid out flat. Not part of what is timed. */
export function prepare(
  document: MemberDocument,
  stationX: readonly number[],
  positions = POSITIONS,
): Prepared {
  const spans = spansOf(document);
  const stations = stationsAt(stationX, spans);
  const influence = influenceLines(spans, stations);
  const size = stations.length;
  const shear = new Float64Array(document.loadCases.length * size);
  const moment = new Float64Array(document.loadCases.length * size);
  const massPerLength = document.pieces.reduce((sum, piece) => {
    const density = document.materials.find((material) => material.id === piece.material)?.density ?? 0;
    return sum + density * piece.width * piece.depth * 1e-9; // kg/mm
  }, 0);
  document.loadCases.forEach((loadCase, c) => {
    const loads: Load[] = [...loadCase.loads];
    if (loadCase.selfWeight) {
      loads.push({ kind: 'uniform', from: 0, to: document.length, value: massPerLength * GRAVITY });
    }
    stations.forEach((station, s) => {
      for (const load of loads) {
        shear[c * size + s] =
          (shear[c * size + s] ?? 0) + effect(load, influence.shear, influence, station, s);
        moment[c * size + s] =
          (moment[c * size + s] ?? 0) + effect(load, influence.moment, influence, station, s);
      }
    });
  });
  const trains = document.loadCases.map((loadCase) => {
    const moving = loadCase.loads.filter((load) => load.kind === 'moving');
    if (moving.length > 1) throw new Error('the yardstick takes one train in a case');
    return moving[0] === undefined ? null : trainOf(moving[0], influence.starts, positions);
  });
  return {
    stationX: Float64Array.from(stationX),
    cases: document.loadCases.length,
    shear,
    moment,
    factors: Float64Array.from(
      document.combinations.flatMap((combination) =>
        document.loadCases.map((loadCase) => combination.factors[loadCase.id] ?? 0),
      ),
    ),
    trains: document.combinations.map((combination) => {
      const moving = document.loadCases.flatMap((loadCase, c) => {
        const train = trains[c];
        const factor = combination.factors[loadCase.id] ?? 0;
        return train && factor !== 0 ? [{ train, factor }] : [];
      });
      if (moving.length > 1) throw new Error('the yardstick takes one train in a combination');
      return moving[0] ?? null;
    }),
    influence,
  };
}

/** What is timed: the envelope of V and M over all combinations and positions. */
export function flatLoop(prepared: Prepared): FlatEnvelope {
  const { stationX, cases, shear, moment, factors, trains, influence } = prepared;
  const { shear: shearLine, moment: momentLine, perStation } = influence;
  const stations = stationX.length;
  const envelope: FlatEnvelope = {
    shearMax: new Float64Array(stations).fill(-Infinity),
    shearMin: new Float64Array(stations).fill(Infinity),
    momentMax: new Float64Array(stations).fill(-Infinity),
    momentMin: new Float64Array(stations).fill(Infinity),
  };
  const { shearMax, shearMin, momentMax, momentMin } = envelope;
  for (let combination = 0; combination < trains.length; combination += 1) {
    const moving = trains[combination];
    for (let s = 0; s < stations; s += 1) {
      let v = 0;
      let m = 0;
      for (let c = 0; c < cases; c += 1) {
        const factor = factors[combination * cases + c] ?? 0;
        v += factor * (shear[c * stations + s] ?? 0);
        m += factor * (moment[c * stations + s] ?? 0);
      }
      let vMax = v;
      let vMin = v;
      let mMax = m;
      let mMin = m;
      if (moving) {
        const { axles, positions, place, x, span, weights } = moving.train;
        const station = stationX[s] ?? 0;
        const base = s * perStation;
        for (let position = 0, at = 0; position < positions; position += 1) {
          let trainV = 0;
          let trainM = 0;
          for (let axle = 0; axle < axles; axle += 1, at += 1) {
            const t = place[at] ?? 0;
            const k = base + (span[at] ?? 0) + ((x[at] ?? 0) > station ? 4 : 0);
            const weight = weights[axle] ?? 0;
            trainV +=
              weight *
              ((((shearLine[k + 3] ?? 0) * t + (shearLine[k + 2] ?? 0)) * t + (shearLine[k + 1] ?? 0)) * t +
                (shearLine[k] ?? 0));
            trainM +=
              weight *
              ((((momentLine[k + 3] ?? 0) * t + (momentLine[k + 2] ?? 0)) * t + (momentLine[k + 1] ?? 0)) *
                t +
                (momentLine[k] ?? 0));
          }
          const vHere = v + moving.factor * trainV;
          const mHere = m + moving.factor * trainM;
          if (vHere > vMax) vMax = vHere;
          if (vHere < vMin) vMin = vHere;
          if (mHere > mMax) mMax = mHere;
          if (mHere < mMin) mMin = mHere;
        }
      }
      if (vMax > (shearMax[s] ?? 0)) shearMax[s] = vMax;
      if (vMin < (shearMin[s] ?? 0)) shearMin[s] = vMin;
      if (mMax > (momentMax[s] ?? 0)) momentMax[s] = mMax;
      if (mMin < (momentMin[s] ?? 0)) momentMin[s] = mMin;
    }
  }
  return envelope;
}
