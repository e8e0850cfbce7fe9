import type { CombinedLoads, Beam } from './combinations';
import { evaluate } from '../numeric/polynomial';
import { valueAt } from '../numeric/piecewise';
import { trainExtremes, type TrainExtremes } from './train';

/** A place at which the envelope is told; at a jump there are two, one for each side. */
export interface Station {
  x: number;
  side: -1 | 1;
  /** segment between events, and span between nodes, on that side */
  segment: number;
  span: number;
}

/** A zone grid that cuts the beam into more cells than this is not told cell by cell. */
const mostGridStations = 300;

/** Every event (twice where V or M may jump), a hundred even steps, and the places where a zone may end. */
export function stationsOf(beam: Beam, zoneGrid: number): Station[] {
  const { events, length, system } = beam;
  const places: { x: number; event: number }[] = events.map((x, event) => ({ x, event }));
  const even = Array.from({ length: 99 }, (_, i) => ((i + 1) * length) / 100);
  if (length / zoneGrid <= mostGridStations) {
    for (let i = 1; i * zoneGrid < length; i++) even.push(i * zoneGrid);
    even.sort((a, b) => a - b);
  }
  let next = 0;
  let last = 0;
  for (const x of even) {
    if (x - last <= 1e-9 * length) continue;
    last = x;
    while (next < events.length && (events[next] ?? 0) < x - 1e-9 * length) next++;
    if (Math.abs((events[next] ?? 0) - x) > 1e-9 * length) places.push({ x, event: -1 });
  }
  // The envelope of V may jump where an axle's travel ends, and where one axle stands while another goes off the end.
  const reaches = beam.trains.flatMap((t) =>
    [...t.offsets].flatMap((o) => [
      t.from + o,
      t.to + o,
      ...[...t.offsets].flatMap((other) => [o - other, length + o - other]),
    ]),
  );
  const jumpsAt = new Set<number>();
  for (const x of [...new Set(reaches)].sort((a, b) => a - b)) {
    if (x <= 0 || x >= length) continue;
    const near = places.find((p) => Math.abs(p.x - x) <= 1e-9 * length);
    if (near && near.event < 0) near.x = x;
    if (!near) places.push({ x, event: -1 });
    jumpsAt.add(near && near.event >= 0 ? near.x : x);
  }
  places.sort((a, b) => a.x - b.x);
  const supports = new Set(system.nodes.flatMap((n, i) => (n.support ? [beam.nodeEvent[i] ?? -1] : [])));
  const jumps = (event: number): boolean =>
    supports.has(event) ||
    beam.segmentLoads.some((l) => (l.force[event] ?? 0) !== 0 || (l.couple[event] ?? 0) !== 0);
  const stations: Station[] = [];
  let segment = 0;
  let span = 0;
  const end = events.length - 1;
  for (const { x, event } of places) {
    while (segment < end - 1 && (events[segment + 1] ?? 0) <= x) segment++;
    while (span < system.spans - 1 && (system.nodes[span + 1]?.x ?? 0) <= x) span++;
    if (x > 0 && x < length && (jumpsAt.has(x) || (event >= 0 && jumps(event)))) {
      const leftSpan = system.nodes[span]?.x === x && span > 0 ? span - 1 : span;
      stations.push({ x, side: -1, segment: event >= 0 ? event - 1 : segment, span: leftSpan });
    }
    stations.push({ x, side: x >= length ? -1 : 1, segment, span });
  }
  return stations;
}

/** Effects of every train at every station. */
export interface TrainTable {
  shearMax: Float64Array;
  shearMin: Float64Array;
  moment: TrainExtremes[];
  bend: TrainExtremes[];
}

export function trainTables(beam: Beam, stations: readonly Station[]): TrainTable[] {
  const { influence, trains } = beam;
  if (!influence) return [];
  const tables = trains.map((_, t): TrainTable => {
    const shear = beam.trainShear[t];
    return {
      shearMax: Float64Array.from(stations, (s) => (shear ? valueAt(shear.max, s.x, s.side) : 0)),
      shearMin: Float64Array.from(stations, (s) => (shear ? valueAt(shear.min, s.x, s.side) : 0)),
      moment: [],
      bend: [],
    };
  });
  for (const { x, span } of stations) {
    const moment = influence.moment(x, span);
    const bend = influence.bend(x, span);
    trains.forEach((train, t) => {
      tables[t]?.moment.push(trainExtremes(train, moment, influence));
      tables[t]?.bend.push(trainExtremes(train, bend, influence));
    });
  }
  return tables;
}

/** Largest and smallest V, M and EI·w of one combination at each station. */
export interface StationValues {
  shearMax: Float64Array;
  shearMin: Float64Array;
  momentMax: Float64Array;
  momentMin: Float64Array;
  bendMax: Float64Array;
  bendMin: Float64Array;
}

export function stationValues(
  beam: Beam,
  stations: readonly Station[],
  tables: readonly TrainTable[],
  loads: CombinedLoads,
): StationValues {
  const n = stations.length;
  const values: StationValues = {
    shearMax: new Float64Array(n),
    shearMin: new Float64Array(n),
    momentMax: new Float64Array(n),
    momentMin: new Float64Array(n),
    bendMax: new Float64Array(n),
    bendMin: new Float64Array(n),
  };
  const { events } = beam;
  const { fields } = loads;
  for (let i = 0; i < n; i++) {
    const station = stations[i];
    if (!station) continue;
    const k = station.segment;
    const a = events[k] ?? 0;
    const u = Math.min(1, (station.x - a) / ((events[k + 1] ?? 0) - a));
    const shear = evaluate(fields.shear, u, 3 * k, 3);
    const moment = evaluate(fields.moment, u, 4 * k, 4);
    const bend = evaluate(fields.bend, u, 6 * k, 6);
    values.shearMax[i] = shear;
    values.shearMin[i] = shear;
    values.momentMax[i] = moment;
    values.momentMin[i] = moment;
    values.bendMax[i] = bend;
    values.bendMin[i] = bend;
  }
  for (const { train, factor } of loads.trains) {
    const table = tables[train];
    if (!table) continue;
    const up = factor > 0;
    for (let i = 0; i < n; i++) {
      add(values.shearMax, i, factor * ((up ? table.shearMax : table.shearMin)[i] ?? 0));
      add(values.shearMin, i, factor * ((up ? table.shearMin : table.shearMax)[i] ?? 0));
      const m = table.moment[i];
      const w = table.bend[i];
      if (!m || !w) continue;
      add(values.momentMax, i, factor * (up ? m.max : m.min));
      add(values.momentMin, i, factor * (up ? m.min : m.max));
      add(values.bendMax, i, factor * (up ? w.max : w.min));
      add(values.bendMin, i, factor * (up ? w.min : w.max));
    }
  }
  return values;
}

function add(target: Float64Array, i: number, value: number): void {
  target[i] = (target[i] ?? 0) + value;
}
