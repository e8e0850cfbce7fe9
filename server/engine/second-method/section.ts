import type { MemberDocument, Piece } from '@shared/schemas/member';
import { at } from './linear';
import { GAUSS } from './still';

/**
 * The section by strips: cut at the edges of all pieces and integrated numerically over each strip, Gauss's three points
 * high, so that E dA, E z dA and E z² dA come without any formula for a rectangle.
 */

export interface PieceShape {
  id: string;
  E: number;
  y: number;
  z: number;
  width: number;
  depth: number;
  /** kg/m³; null where the material names none */
  density: number | null;
}

export interface Interface {
  id: string;
  /** indices of the pieces, the earlier first */
  a: number;
  b: number;
  orientation: 'horizontal' | 'vertical';
  contact: number;
  /** index of its connection in the document; null where nothing connects */
  connection: number | null;
}

const TOUCHING = 1e-6;

/** The pieces with what their materials say. Throws RangeError where a material is missing. */
export function shapesOf(document: MemberDocument): PieceShape[] {
  return document.pieces.map((piece: Piece) => {
    const material = document.materials.find(({ id }) => id === piece.material);
    if (material === undefined) throw new RangeError(`no material ${piece.material}`);
    return {
      id: piece.id,
      E: material.E,
      y: piece.y,
      z: piece.z,
      width: piece.width,
      depth: piece.depth,
      density: material.density ?? null,
    };
  });
}

/** ∫ E f(z) dA over the pieces given, strip by strip; f of degree 5 at most. */
export function integrate(pieces: readonly PieceShape[], f: (z: number) => number): number {
  const edges = [...new Set(pieces.flatMap((piece) => [piece.z, piece.z + piece.depth]))].sort(
    (a, b) => a - b,
  );
  let sum = 0;
  for (let i = 1; i < edges.length; i += 1) {
    const from = at(edges, i - 1);
    const to = at(edges, i);
    const middle = (from + to) / 2;
    const half = (to - from) / 2;
    let stiffness = 0;
    for (const piece of pieces) {
      if (piece.z <= from && piece.z + piece.depth >= to) stiffness += piece.E * piece.width;
    }
    for (const { place, weight } of GAUSS) sum += stiffness * weight * half * f(middle + place * half);
  }
  return sum;
}

export interface Axis {
  EA: number;
  EI: number;
  centroid: number;
}

/** EA, centroid and EI of some pieces about their own common axis. */
export function axisOf(pieces: readonly PieceShape[]): Axis {
  const lowest = Math.min(...pieces.map((piece) => piece.z));
  const EA = integrate(pieces, () => 1);
  const centroid = lowest + integrate(pieces, (z) => z - lowest) / EA;
  return { EA, centroid, EI: integrate(pieces, (z) => (z - centroid) ** 2) };
}

/** Height of the section, from its lowest to its highest edge. */
export function depthOf(pieces: readonly PieceShape[]): number {
  return (
    Math.max(...pieces.map((piece) => piece.z + piece.depth)) - Math.min(...pieces.map((piece) => piece.z))
  );
}

const overlap = (from: number, size: number, other: number, otherSize: number): number =>
  Math.min(from + size, other + otherSize) - Math.max(from, other);

const meet = (from: number, size: number, other: number, otherSize: number): boolean =>
  Math.abs(from + size - other) <= TOUCHING || Math.abs(other + otherSize - from) <= TOUCHING;

/** Every contact between two pieces, numbered J1, J2 … by the earlier piece, then the later. */
export function findInterfaces(document: MemberDocument, pieces: readonly PieceShape[]): Interface[] {
  const found: Interface[] = [];
  pieces.forEach((p, a) => {
    pieces.forEach((q, b) => {
      if (b <= a) return;
      const across = overlap(p.y, p.width, q.y, q.width);
      const up = overlap(p.z, p.depth, q.z, q.depth);
      const horizontal = across > TOUCHING && meet(p.z, p.depth, q.z, q.depth);
      const vertical = up > TOUCHING && meet(p.y, p.width, q.y, q.width);
      if (!horizontal && !vertical) return;
      const connection = document.connections.findIndex(
        ({ pieces: [one, two] }) => (one === p.id && two === q.id) || (one === q.id && two === p.id),
      );
      found.push({
        id: `J${found.length + 1}`,
        a,
        b,
        orientation: horizontal ? 'horizontal' : 'vertical',
        contact: horizontal ? across : up,
        connection: connection < 0 ? null : connection,
      });
    });
  });
  return found;
}

/** For each of n nodes the number of the group it belongs to, groups being held together by the edges. */
export function groups(n: number, edges: readonly { a: number; b: number }[]): number[] {
  const group = Array.from({ length: n }, (_, i) => i);
  for (let changed = true; changed;) {
    changed = false;
    for (const { a, b } of edges) {
      const least = Math.min(at(group, a), at(group, b));
      if (at(group, a) === least && at(group, b) === least) continue;
      group[a] = least;
      group[b] = least;
      changed = true;
    }
  }
  return group;
}

/**
 * |Q| of the part that an interface cuts off, transformed to the reference modulus, by integrating over that part; null
 * where cutting it cuts nothing off.
 */
export function firstMoment(
  pieces: readonly PieceShape[],
  interfaces: readonly Interface[],
  cut: Interface,
  centroid: number,
): number | null {
  if (cut.connection === null) return null;
  const others = interfaces.filter((each) => each !== cut && each.connection !== null);
  const group = groups(pieces.length, others);
  const side = at(group, cut.a);
  if (side === at(group, cut.b)) return null;
  const part = pieces.filter((_, i) => at(group, i) === side);
  return Math.abs(integrate(part, (z) => z - centroid)) / at(pieces, 0).E;
}
