import type { MemberDocument } from '@shared/schemas/member';
import { add, at, invertPositive, zeros } from './linear';

/**
 * The beam as finite elements: two-noded Euler–Bernoulli elements with Hermite's cubics (mechanics of materials; any
 * book on the finite element method). Deflection w is positive downward, rotation θ = w′, M = −EI·w″.
 */

/** Places nearer to each other than this (mm) are one place. */
export const SAME_PLACE = 1e-6;

export interface Element {
  from: number;
  to: number;
  /** freedoms: w and θ at the left end, w and θ at the right end */
  freedoms: readonly [number, number, number, number];
}

export interface BeamSupport {
  id: string;
  x: number;
  w: number;
  rotations: readonly number[];
  /** N/mm of a spring; null where it is rigid */
  stiffness: number | null;
  fixed: boolean;
}

export interface Beam {
  length: number;
  EI: number;
  elements: readonly Element[];
  supports: readonly BeamSupport[];
  /** freedoms in all */
  size: number;
  /** displacement of each freedom by a unit load at each; rows and columns of held freedoms are zero */
  compliance: readonly Float64Array[];
  /** stiffness of the elements alone, without springs and with nothing held */
  stiffness: readonly Float64Array[];
  /** supports, hinges and ends: where influence lines have their breaks */
  breaks: readonly number[];
  determinate: boolean;
}

/** Stiffness of one element of length h: symmetric, [w, θ, w, θ]. */
export function elementStiffness(EI: number, h: number): number[][] {
  const a = (12 * EI) / h ** 3;
  const b = (6 * EI) / h ** 2;
  const c = (4 * EI) / h;
  const d = (2 * EI) / h;
  return [
    [a, b, -a, b],
    [b, c, -b, d],
    [-a, -b, a, -b],
    [b, d, -b, c],
  ];
}

/** Sorted places, those that are one taken once. */
export function distinct(places: readonly number[], tolerance = SAME_PLACE): number[] {
  const kept: number[] = [];
  for (const place of [...places].sort((a, b) => a - b)) {
    const last = kept.at(-1);
    if (last === undefined || place - last > tolerance) kept.push(place);
  }
  return kept;
}

/** Nodes wanted but not needed: where loads begin, end or act, and even steps. */
function wishedNodes(document: MemberDocument): number[] {
  const wished: number[] = [];
  for (const loadCase of document.loadCases) {
    for (const load of loadCase.loads) {
      if (load.kind === 'point' || load.kind === 'couple') wished.push(load.x);
      else if (load.kind !== 'moving') wished.push(load.from, load.to);
    }
  }
  for (let i = 1; i < 8; i += 1) wished.push((document.length * i) / 8);
  return wished;
}

/**
 * Nodes at ends, supports and hinges; at loads and even steps only a few, and none that would make an element short beside the
 * others, for both cost digits. Loads inside an element are taken exactly, so no node is needed at them.
 */
function placeNodes(document: MemberDocument, needed: readonly number[]): number[] {
  const nodes = [...needed];
  const gap = document.length / 20;
  for (const place of wishedNodes(document)) {
    if (nodes.length >= needed.length + 8) break;
    if (nodes.every((node) => Math.abs(node - place) >= gap)) nodes.push(place);
  }
  return nodes.sort((a, b) => a - b);
}

interface Freedoms {
  w: number[];
  left: number[];
  right: number[];
  size: number;
}

function numberFreedoms(nodes: readonly number[], hinges: readonly number[]): Freedoms {
  const numbered: Freedoms = { w: [], left: [], right: [], size: 0 };
  for (const node of nodes) {
    numbered.w.push(numbered.size);
    numbered.left.push(numbered.size + 1);
    const doubled = hinges.some((hinge) => Math.abs(hinge - node) <= SAME_PLACE) ? 1 : 0;
    numbered.right.push(numbered.size + 1 + doubled);
    numbered.size += 2 + doubled;
  }
  return numbered;
}

function assemble(elements: readonly Element[], EI: number, size: number): Float64Array[] {
  const stiffness = zeros(size, size);
  for (const element of elements) {
    const own = elementStiffness(EI, element.to - element.from);
    own.forEach((row, i) =>
      row.forEach((value, j) => add(stiffness, at(element.freedoms, i), at(element.freedoms, j), value)),
    );
  }
  return stiffness;
}

function complianceOf(
  stiffness: readonly Float64Array[],
  supports: readonly BeamSupport[],
  size: number,
): Float64Array[] {
  const held = new Set<number>();
  for (const support of supports) {
    if (support.stiffness === null) held.add(support.w);
    if (support.fixed) for (const rotation of support.rotations) held.add(rotation);
  }
  const free = Array.from({ length: size }, (_, i) => i).filter((i) => !held.has(i));
  const part = free.map((i) => Float64Array.from(free, (j) => at(at(stiffness, i), j)));
  for (const support of supports) {
    if (support.stiffness !== null)
      add(part, free.indexOf(support.w), free.indexOf(support.w), support.stiffness);
  }
  const inverse = invertPositive(part);
  const compliance = zeros(size, size);
  free.forEach((i, a) => free.forEach((j, b) => add(compliance, i, j, at(at(inverse, a), b))));
  return compliance;
}

/**
 * Builds and inverts the beam's stiffness. Hinges inside the beam are doubled rotations; springs stand on the diagonal.
 *
 * @param EI N·mm²
 * @throws RangeError where the beam is a mechanism
 */
export function buildBeam(document: MemberDocument, EI: number): Beam {
  const { length } = document;
  const inside = (x: number): boolean => x > SAME_PLACE && x < length - SAME_PLACE;
  const hinges = distinct(document.hinges.filter(inside));
  const breaks = distinct([0, length, ...document.supports.map((support) => support.x), ...hinges]);
  const nodes = placeNodes(document, breaks);
  const numbered = numberFreedoms(nodes, hinges);
  const elements = nodes.slice(1).map((to, i): Element => ({
    from: at(nodes, i),
    to,
    freedoms: [at(numbered.w, i), at(numbered.right, i), at(numbered.w, i + 1), at(numbered.left, i + 1)],
  }));
  const supports = document.supports.map((support): BeamSupport => {
    const node = nodes.findIndex((x) => Math.abs(x - support.x) <= SAME_PLACE);
    return {
      id: support.id,
      x: support.x,
      w: at(numbered.w, node),
      rotations: [...new Set([at(numbered.left, node), at(numbered.right, node)])],
      stiffness: support.kind === 'spring' ? (support.stiffness ?? 0) : null,
      fixed: support.kind === 'fixed',
    };
  });
  const stiffness = assemble(elements, EI, numbered.size);
  const unknowns = supports.reduce((sum, support) => sum + (support.fixed ? 2 : 1), 0);
  return {
    length,
    EI,
    elements,
    supports,
    size: numbered.size,
    compliance: complianceOf(stiffness, supports, numbered.size),
    stiffness,
    breaks,
    determinate: unknowns === 2 + hinges.length,
  };
}

/** Index of the element that holds x; at a node the one to its right, at the beam's end the last. */
export function elementAt(beam: Beam, x: number): number {
  let low = 0;
  let high = beam.elements.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (at(beam.elements, middle).from <= x) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** Hermite's cubics at s of an element of length h: deflection by unit w, θ at left and right. */
export function shapes(s: number, h: number): [number, number, number, number] {
  const u = s / h;
  const v = 1 - u;
  return [v * v * (1 + 2 * u), s * v * v, u * u * (3 - 2 * u), -s * u * v];
}

/** Slopes of the same cubics: what a unit couple at s does. */
export function shapeSlopes(s: number, h: number): [number, number, number, number] {
  const u = s / h;
  return [(6 * u * (u - 1)) / h, (1 - u) * (1 - 3 * u), (6 * u * (1 - u)) / h, u * (3 * u - 2)];
}
