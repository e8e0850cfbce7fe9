import { at, dot } from './linear';
import { elementAt, elementStiffness, SAME_PLACE, shapes, shapeSlopes, type Beam } from './beam';

/**
 * Loads at rest on the finite elements: consistent nodal loads, and inside each element exact V, M and w from its end
 * forces and the loads on it.
 */

export interface StillLoads {
  /** N downward */
  points: { x: number; value: number }[];
  /** N·mm, adding to M on the right */
  couples: { x: number; value: number }[];
  /** N/mm downward, linear from `start` to `end` */
  spread: { from: number; to: number; start: number; end: number }[];
}

export interface State {
  shear: number;
  moment: number;
  deflection: number;
}

export interface StillResponse {
  /** V, M and w at x; at a jump the value is that of one side, so stand beside it */
  at: (x: number) => State;
  /** upward force and moment (adding to M on the right) of each support */
  reactions: { force: number; moment: number }[];
}

interface ElementLoads {
  points: { s: number; value: number }[];
  couples: { s: number; value: number }[];
  spread: { from: number; to: number; start: number; slope: number }[];
  /** consistent loads of the four freedoms */
  nodal: [number, number, number, number];
}

/** Gauss–Legendre, three points on [−1, 1]: exact to degree 5. */
export const GAUSS: readonly { place: number; weight: number }[] = [
  { place: -Math.sqrt(0.6), weight: 5 / 9 },
  { place: 0, weight: 8 / 9 },
  { place: Math.sqrt(0.6), weight: 5 / 9 },
];

const addScaled = (nodal: number[], by: readonly number[], factor: number): void =>
  by.forEach((value, k) => {
    nodal[k] = at(nodal, k) + factor * value;
  });

function shareOut(beam: Beam, loads: StillLoads): { own: ElementLoads[]; direct: Float64Array } {
  const own = beam.elements.map((): ElementLoads => ({
    points: [],
    couples: [],
    spread: [],
    nodal: [0, 0, 0, 0],
  }));
  const direct = new Float64Array(beam.size);
  const last = at(beam.elements, beam.elements.length - 1);
  /** A load at a node goes to its freedom; a couple at a hinge to the rotation on its left. */
  const atNode = (x: number, isCouple: boolean): number | null => {
    if (Math.abs(x) <= SAME_PLACE) return at(at(beam.elements, 0).freedoms, isCouple ? 1 : 0);
    const element = beam.elements.find(({ to }) => Math.abs(to - x) <= SAME_PLACE);
    return element === undefined ? null : at(element.freedoms, isCouple ? 3 : 2);
  };
  const inElement = (x: number, put: (loads: ElementLoads, s: number, h: number) => void): void => {
    const e = elementAt(beam, Math.min(x, last.to));
    const element = at(beam.elements, e);
    put(at(own, e), x - element.from, element.to - element.from);
  };
  for (const { x, value } of loads.points) {
    const freedom = atNode(x, false);
    if (freedom !== null) direct[freedom] = at(direct, freedom) + value;
    else
      inElement(x, (mine, s, h) => {
        mine.points.push({ s, value });
        addScaled(mine.nodal, shapes(s, h), value);
      });
  }
  for (const { x, value } of loads.couples) {
    const freedom = atNode(x, true);
    if (freedom !== null) direct[freedom] = at(direct, freedom) + value;
    else
      inElement(x, (mine, s, h) => {
        mine.couples.push({ s, value });
        addScaled(mine.nodal, shapeSlopes(s, h), value);
      });
  }
  for (const load of loads.spread) spreadOver(beam, own, load);
  return { own, direct };
}

function spreadOver(beam: Beam, own: readonly ElementLoads[], load: StillLoads['spread'][number]): void {
  const slope = (load.end - load.start) / (load.to - load.from);
  beam.elements.forEach((element, e) => {
    const from = Math.max(load.from, element.from);
    const to = Math.min(load.to, element.to);
    if (to <= from) return;
    const mine = at(own, e);
    const h = element.to - element.from;
    const value = (x: number): number => load.start + slope * (x - load.from);
    mine.spread.push({
      from: from - element.from,
      to: to - element.from,
      start: value(from),
      slope,
    });
    for (const { place, weight } of GAUSS) {
      const x = (from + to) / 2 + (place * (to - from)) / 2;
      addScaled(mine.nodal, shapes(x - element.from, h), (value(x) * weight * (to - from)) / 2);
    }
  });
}

/** What the loads left of s inside an element take from V, M and EI·w. */
function insideElement(loads: ElementLoads, s: number): State {
  let shear = 0;
  let moment = 0;
  let deflection = 0;
  for (const { s: a, value } of loads.points) {
    if (s <= a) continue;
    shear -= value;
    moment -= value * (s - a);
    deflection += (value * (s - a) ** 3) / 6;
  }
  for (const { s: a, value } of loads.couples) {
    if (s <= a) continue;
    moment += value;
    deflection -= (value * (s - a) ** 2) / 2;
  }
  for (const { from, to, start, slope } of loads.spread) {
    if (s <= from) continue;
    // a load that stops at `to` is one that goes on, less what lies beyond
    const parts =
      s <= to
        ? [{ a: from, value: start, slope }]
        : [
            { a: from, value: start, slope },
            { a: to, value: -(start + slope * (to - from)), slope: -slope },
          ];
    for (const part of parts) {
      const d = s - part.a;
      shear -= part.value * d + (part.slope * d ** 2) / 2;
      moment -= (part.value * d ** 2) / 2 + (part.slope * d ** 3) / 6;
      deflection += (part.value * d ** 4) / 24 + (part.slope * d ** 5) / 120;
    }
  }
  return { shear, moment, deflection };
}

/**
 * Solves the beam for loads at rest.
 *
 * End forces of an element are k·u − f; at its left end V = −(k·u − f)₁ and M = (k·u − f)₂; from there equilibrium
 * gives V and M, and two integrations w.
 */
export function solveStill(beam: Beam, loads: StillLoads): StillResponse {
  const { own, direct } = shareOut(beam, loads);
  const force = Float64Array.from(direct);
  beam.elements.forEach((element, e) =>
    element.freedoms.forEach((freedom, k) => {
      force[freedom] = at(force, freedom) + at(at(own, e).nodal, k);
    }),
  );
  const moved = Float64Array.from(beam.compliance, (row) => dot(row, force));
  const starts = beam.elements.map((element, e) => {
    const stiffness = elementStiffness(beam.EI, element.to - element.from);
    const u = element.freedoms.map((freedom) => at(moved, freedom));
    const nodal = at(own, e).nodal;
    return {
      shear: -(dot(at(stiffness, 0), u) - nodal[0]),
      moment: dot(at(stiffness, 1), u) - nodal[1],
      deflection: at(u, 0),
      rotation: at(u, 1),
    };
  });
  const reactions = beam.supports.map((support) => {
    const held = at(beam.stiffness, support.w);
    return {
      force:
        support.stiffness === null
          ? at(force, support.w) - dot(held, moved)
          : support.stiffness * at(moved, support.w),
      moment: support.fixed
        ? support.rotations.reduce((sum, r) => sum + dot(at(beam.stiffness, r), moved) - at(force, r), 0)
        : 0,
    };
  });
  return {
    reactions,
    at: (x) => {
      const e = elementAt(beam, x);
      const start = at(starts, e);
      const s = x - at(beam.elements, e).from;
      const local = insideElement(at(own, e), s);
      return {
        shear: start.shear + local.shear,
        moment: start.moment + start.shear * s + local.moment,
        deflection:
          start.deflection +
          start.rotation * s +
          (local.deflection - (start.moment * s * s) / 2 - (start.shear * s ** 3) / 6) / beam.EI,
      };
    },
  };
}
