import type { MemberDocument } from '@shared/schemas/member';
import { add, at, solve, zeros } from './linear';
import { axisOf, groups, integrate, type Axis, type Interface, type PieceShape } from './section';

/**
 * Flows between the pieces, and between the stacks of plies, as a quadratic programme: least Σ q²/2k under balance of every
 * node, solved with Lagrange's multipliers (Karush, Kuhn and Tucker's conditions of an equality-constrained minimum).
 */

export interface Edge {
  a: number;
  b: number;
  k: number;
}

/**
 * Flow of each edge, positive from a to b, when node i has `supply[i]` to give away (their sum is nothing).
 *
 * @param n nodes, all held together by the edges
 */
export function leastEnergyFlows(n: number, edges: readonly Edge[], supply: readonly number[]): number[] {
  const m = edges.length;
  if (m === 0) return [];
  const mean = edges.reduce((sum, edge) => sum + edge.k, 0) / m;
  // the balance of the last node follows from that of the others
  const size = m + n - 1;
  const matrix = zeros(size, size);
  const right = zeros(size, 1);
  edges.forEach((edge, e) => {
    add(matrix, e, e, mean / edge.k);
    for (const [node, sign] of [
      [edge.a, 1],
      [edge.b, -1],
    ] as const) {
      if (node === n - 1) continue;
      add(matrix, e, m + node, sign);
      add(matrix, m + node, e, sign);
    }
  });
  for (let node = 0; node < n - 1; node += 1) add(right, m + node, 0, at(supply, node));
  return solve(matrix, right)
    .slice(0, m)
    .map((row) => at(row, 0));
}

/** k of each connected interface: rows × slip modulus where every connection has one, else all alike. */
function stiffnesses(document: MemberDocument, connected: readonly Interface[]): number[] {
  const connections = connected.map((each) => at(document.connections, each.connection ?? -1));
  if (connections.some(({ slipModulus }) => slipModulus === undefined)) return connections.map(() => 1);
  return connections.map(
    ({ kind, rows, slipModulus }) => (slipModulus ?? 1) * (kind === 'fasteners' ? (rows ?? 1) : 1),
  );
}

/** q for V = 1 at every interface, in the order of the interfaces, signed from the earlier piece to the later; 1/mm. */
export function flowsPerShear(
  document: MemberDocument,
  pieces: readonly PieceShape[],
  interfaces: readonly Interface[],
  axis: Axis,
): number[] {
  const connected = interfaces.filter((each) => each.connection !== null);
  const k = stiffnesses(document, connected);
  const supply = pieces.map((piece) => integrate([piece], (z) => z - axis.centroid) / axis.EI);
  const flows = leastEnergyFlows(
    pieces.length,
    connected.map((each, e) => ({ a: each.a, b: each.b, k: at(k, e) })),
    supply,
  );
  return interfaces.map((each) => {
    const place = connected.indexOf(each);
    return place < 0 ? 0 : at(flows, place);
  });
}

export interface Sideways {
  /** the stack of each piece */
  stackOf: readonly number[];
  stacks: number;
  /** across[stack][interface]: force that crosses for each N put on that stack, signed from the earlier piece on */
  across: readonly number[][];
}

/**
 * How load put on one stack crosses to the others. Pieces that rest on each other are one stack; each keeps the share of its
 * bending stiffness; all vertical connections are taken alike.
 */
export function sideways(pieces: readonly PieceShape[], interfaces: readonly Interface[]): Sideways {
  const resting = interfaces.filter((each) => each.orientation === 'horizontal');
  const group = groups(pieces.length, resting);
  const names = [...new Set(group)];
  const stackOf = group.map((name) => names.indexOf(name));
  const EI = names.map((name) => axisOf(pieces.filter((_, i) => at(group, i) === name)).EI);
  const whole = EI.reduce((sum, value) => sum + value, 0);
  const crossing = interfaces.filter(
    (each) =>
      each.connection !== null &&
      each.orientation === 'vertical' &&
      at(stackOf, each.a) !== at(stackOf, each.b),
  );
  const edges = crossing.map((each) => ({ a: at(stackOf, each.a), b: at(stackOf, each.b), k: 1 }));
  const across = names.map((_, loaded) => {
    const supply = EI.map((value, i) => (i === loaded ? 1 : 0) - value / whole);
    const flows = names.length > 1 ? leastEnergyFlows(names.length, edges, supply) : [];
    return interfaces.map((each) => {
      const place = crossing.indexOf(each);
      return place < 0 ? 0 : (flows[place] ?? 0);
    });
  });
  return { stackOf, stacks: names.length, across };
}
