import type { LoadCase, MemberDocument } from '@shared/schemas/member';
import { placeIndex } from './events';
import type { BeamSystem, NodeLoads, SpanLoads } from './system';

export const gravity = 9.80665;

/** Loads of one case on the segments and events of the beam. */
export interface SegmentLoads {
  /** load at the segment's start and its change over the segment, N/mm down */
  start: Float64Array;
  change: Float64Array;
  /** point loads (N down) and couples (N·mm, adding to M on the right) at the events */
  force: Float64Array;
  couple: Float64Array;
  /** places at which each of these is not nothing */
  used: {
    start: readonly number[];
    change: readonly number[];
    force: readonly number[];
    couple: readonly number[];
  };
}

/**
 * V, M and EI·w of one load case or combination: on segment i the polynomials have the coefficients
 * shear[3i…], moment[4i…], bend[6i…] in the local u = (x − x_i)/h_i.
 */
export interface Fields {
  shear: Float64Array;
  moment: Float64Array;
  bend: Float64Array;
  /** at each node of the beam system */
  reaction: Float64Array;
  supportMoment: Float64Array;
}

/** Spreads the loads that do not move over the segments between `events`. */
export function segmentLoads(
  loadCase: LoadCase,
  events: readonly number[],
  selfWeight: number,
  accepts: (on: string | undefined) => boolean,
): SegmentLoads {
  const segments = events.length - 1;
  const loads: SegmentLoads = {
    start: new Float64Array(segments),
    change: new Float64Array(segments),
    force: new Float64Array(events.length),
    couple: new Float64Array(events.length),
    used: emptyUse,
  };
  if (loadCase.selfWeight && accepts(undefined)) loads.start.fill(selfWeight);
  for (const load of loadCase.loads) {
    if (!accepts(load.on)) continue;
    if (load.kind === 'point' || load.kind === 'couple') {
      const target = load.kind === 'point' ? loads.force : loads.couple;
      const i = placeIndex(events, load.x);
      target[i] = (target[i] ?? 0) + load.value;
    } else if (load.kind === 'uniform' || load.kind === 'varying') {
      const first = placeIndex(events, load.from);
      const last = placeIndex(events, load.to);
      const begin = load.kind === 'uniform' ? load.value : load.start;
      const rise = load.kind === 'uniform' ? 0 : (load.end - load.start) / (load.to - load.from);
      for (let i = first; i < last; i++) {
        const x = events[i] ?? 0;
        loads.start[i] = (loads.start[i] ?? 0) + begin + rise * (x - load.from);
        loads.change[i] = (loads.change[i] ?? 0) + rise * ((events[i + 1] ?? 0) - x);
      }
    }
  }
  loads.used = {
    start: filled(loads.start),
    change: filled(loads.change),
    force: filled(loads.force),
    couple: filled(loads.couple),
  };
  return loads;
}

/** The state at the left end of a segment: V, M, EI·θ, EI·w. */
type Start = [shear: number, moment: number, slope: number, bend: number];

/**
 * Carries the state over one segment of length h under q(u) = q0 + q1·u:
 * V′ = −q, M′ = V, (EIθ)′ = −M, (EIw)′ = EIθ, each with respect to x.
 */
function carry(s: Start, h: number, q0: number, q1: number): Start {
  const [v, m, t, w] = s;
  return [
    v - h * (q0 + q1 / 2),
    m + h * v - h * h * (q0 / 2 + q1 / 6),
    t - h * (m + (h * v) / 2 - h * h * (q0 / 6 + q1 / 24)),
    w + h * t - h * h * (m / 2 + (h * v) / 6 - h * h * (q0 / 24 + q1 / 120)),
  ];
}

/** Solves the beam under loads that stand still. `nodeEvent[n]` is the event index of node n. */
export function solveCase(
  system: BeamSystem,
  events: readonly number[],
  nodeEvent: readonly number[],
  loads: SegmentLoads,
): Fields {
  const spanLoads: SpanLoads[] = [];
  const starts: { shear: number; slope: number }[] = [];
  for (let e = 0; e < system.spans; e++) {
    const first = nodeEvent[e] ?? 0;
    const last = nodeEvent[e + 1] ?? 0;
    const length = system.spanLength(e);
    let s: Start = [0, 0, 0, 0];
    for (let i = first; i < last; i++) {
      if (i > first) s = [s[0] - (loads.force[i] ?? 0), s[1] + (loads.couple[i] ?? 0), s[2], s[3]];
      s = carry(s, (events[i + 1] ?? 0) - (events[i] ?? 0), loads.start[i] ?? 0, loads.change[i] ?? 0);
    }
    // Simply supported: M and w vanish at the far end too.
    const shear = -s[1] / length;
    const slope = -(s[3] - (shear * length ** 3) / 6) / length;
    starts.push({ shear, slope });
    spanLoads.push({
      shear: [shear, s[0] + shear],
      slope: [slope, s[2] - (shear * length ** 2) / 2 + slope],
    });
  }
  const nodeLoads: NodeLoads[] = nodeEvent.map((i) => ({
    force: loads.force[i] ?? 0,
    couple: loads.couple[i] ?? 0,
  }));
  const state = system.solve(spanLoads, nodeLoads);

  const segments = events.length - 1;
  const fields: Fields = {
    shear: new Float64Array(3 * segments),
    moment: new Float64Array(4 * segments),
    bend: new Float64Array(6 * segments),
    reaction: new Float64Array(system.nodes.length),
    supportMoment: new Float64Array(system.nodes.length),
  };
  let shearLeft = 0;
  for (let e = 0; e < system.spans; e++) {
    const length = system.spanLength(e);
    const ma = state.momentRight[e] ?? 0;
    const mb = state.momentLeft[e + 1] ?? 0;
    const wa = state.deflection[e] ?? 0;
    const wb = state.deflection[e + 1] ?? 0;
    const begin = starts[e] ?? { shear: 0, slope: 0 };
    let s: Start = [
      begin.shear + (mb - ma) / length,
      ma,
      (wb - wa) / length + begin.slope + (length * (2 * ma + mb)) / 6,
      wa,
    ];
    const node = nodeLoads[e] ?? { force: 0, couple: 0 };
    fields.reaction[e] = system.reaction(e, state, shearLeft, s[0], node.force);
    fields.supportMoment[e] = system.supportMoment(e, state, node.couple);
    const first = nodeEvent[e] ?? 0;
    const last = nodeEvent[e + 1] ?? 0;
    for (let i = first; i < last; i++) {
      if (i > first) s = [s[0] - (loads.force[i] ?? 0), s[1] + (loads.couple[i] ?? 0), s[2], s[3]];
      writeSegment(
        fields,
        i,
        s,
        (events[i + 1] ?? 0) - (events[i] ?? 0),
        loads.start[i] ?? 0,
        loads.change[i] ?? 0,
      );
      s = carry(s, (events[i + 1] ?? 0) - (events[i] ?? 0), loads.start[i] ?? 0, loads.change[i] ?? 0);
    }
    shearLeft = s[0];
  }
  const end = system.spans;
  const node = nodeLoads[end] ?? { force: 0, couple: 0 };
  fields.reaction[end] = system.reaction(end, state, shearLeft, 0, node.force);
  fields.supportMoment[end] = system.supportMoment(end, state, node.couple);
  return fields;
}

function writeSegment(fields: Fields, i: number, s: Start, h: number, q0: number, q1: number): void {
  const [v, m, t, w] = s;
  const { shear, moment, bend } = fields;
  shear[3 * i] = v;
  shear[3 * i + 1] = -h * q0;
  shear[3 * i + 2] = (-h * q1) / 2;
  moment[4 * i] = m;
  moment[4 * i + 1] = h * v;
  moment[4 * i + 2] = (-h * h * q0) / 2;
  moment[4 * i + 3] = (-h * h * q1) / 6;
  bend[6 * i] = w;
  bend[6 * i + 1] = h * t;
  bend[6 * i + 2] = (-h * h * m) / 2;
  bend[6 * i + 3] = (-(h ** 3) * v) / 6;
  bend[6 * i + 4] = (h ** 4 * q0) / 24;
  bend[6 * i + 5] = (h ** 4 * q1) / 120;
}

/** A weighted sum of load cases. Only what is there is added: most cases touch few places. */
export function combineLoads(
  cases: readonly SegmentLoads[],
  factors: readonly number[],
  segments: number,
): SegmentLoads {
  const sum: SegmentLoads = {
    start: new Float64Array(segments),
    change: new Float64Array(segments),
    force: new Float64Array(segments + 1),
    couple: new Float64Array(segments + 1),
    used: emptyUse,
  };
  cases.forEach((loads, c) => {
    const factor = factors[c] ?? 0;
    if (factor === 0) return;
    addScaled(sum.start, loads.start, loads.used.start, factor);
    addScaled(sum.change, loads.change, loads.used.change, factor);
    addScaled(sum.force, loads.force, loads.used.force, factor);
    addScaled(sum.couple, loads.couple, loads.used.couple, factor);
  });
  return sum;
}

const emptyUse: SegmentLoads['used'] = { start: [], change: [], force: [], couple: [] };

/** Where a list is not nothing. */
function filled(list: Float64Array): number[] {
  const places: number[] = [];
  for (let i = 0; i < list.length; i++) if (list[i] !== 0) places.push(i);
  return places;
}

function addScaled(
  target: Float64Array,
  source: Float64Array,
  places: readonly number[],
  factor: number,
): void {
  for (const i of places) target[i] = (target[i] ?? 0) + factor * (source[i] ?? 0);
}

/** Self-weight of the whole section per length, N/mm; null where a density is missing. */
export function massPerLength(document: MemberDocument): number | null {
  let sum = 0;
  for (const piece of document.pieces) {
    const density = document.materials.find((m) => m.id === piece.material)?.density;
    if (density === undefined) return null;
    sum += piece.width * piece.depth * density * 1e-6;
  }
  return sum;
}
