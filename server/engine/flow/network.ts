import { refuse } from '../refused';

export interface Edge {
  a: number;
  b: number;
  /** conductance: rows × slip modulus, or 1 */
  k: number;
}

export interface Network {
  /** flow along each edge from a to b */
  flows: number[];
  potentials: number[];
}

/**
 * Flows q that balance the given sources at every node (Σ = 0) with the least Σq²/2k. That is a resistor
 * network: L·φ = s with L = Σk(e_a − e_b)(e_a − e_b)ᵀ, one node grounded, q = k(φ_a − φ_b). On a tree the
 * balance alone fixes the flows; in loops the energy does (Kirchhoff 1847; Castigliano).
 *
 * @param sources what each node must give away
 */
export function leastEnergyFlows(nodes: number, edges: readonly Edge[], sources: readonly number[]): Network {
  const largest = edges.reduce((most, e) => Math.max(most, e.k), 0);
  const size = nodes - 1; // node 0 is grounded
  const matrix = Array.from({ length: size }, () => new Float64Array(size + 1));
  const add = (i: number, j: number, value: number): void => {
    const line = matrix[i - 1];
    if (i > 0 && j > 0 && line) line[j - 1] = (line[j - 1] ?? 0) + value;
  };
  for (const { a, b, k } of edges) {
    const c = k / largest;
    add(a, a, c);
    add(b, b, c);
    add(a, b, -c);
    add(b, a, -c);
  }
  for (let i = 1; i < nodes; i++) {
    const line = matrix[i - 1];
    if (line) line[size] = sources[i] ?? 0;
  }
  // Cholesky would do; elimination without exchanges is as safe on a positive definite matrix and keeps the zeros.
  for (let i = 0; i < size; i++) {
    const pivot = matrix[i];
    const d = pivot?.[i] ?? 0;
    if (!pivot || !(d > 0)) return refuse('loose-piece', 'pieces', 'The pieces are not all connected.');
    for (let r = i + 1; r < size; r++) {
      const line = matrix[r];
      const factor = (line?.[i] ?? 0) / d;
      if (!line || factor === 0) continue;
      for (let c = i; c <= size; c++) line[c] = (line[c] ?? 0) - factor * (pivot[c] ?? 0);
    }
  }
  const potentials = new Array<number>(nodes).fill(0);
  for (let i = size - 1; i >= 0; i--) {
    const line = matrix[i];
    let value = line?.[size] ?? 0;
    for (let c = i + 1; c < size; c++) value -= (line?.[c] ?? 0) * (potentials[c + 1] ?? 0);
    potentials[i + 1] = value / (line?.[i] ?? 1);
  }
  const flows = edges.map(({ a, b, k }) => (k / largest) * ((potentials[a] ?? 0) - (potentials[b] ?? 0)));
  return { flows, potentials };
}

/**
 * Which edges are bridges, and for those the nodes on the side of `a` (an edge of a loop is none: null).
 * Cut each edge in turn and see what can still be reached.
 */
export function bridgeSides(nodes: number, edges: readonly Edge[]): (boolean[] | null)[] {
  const neighbours: { to: number; edge: number }[][] = Array.from({ length: nodes }, () => []);
  edges.forEach(({ a, b }, i) => {
    neighbours[a]?.push({ to: b, edge: i });
    neighbours[b]?.push({ to: a, edge: i });
  });
  return edges.map(({ a, b }, cut) => {
    const reached = new Array<boolean>(nodes).fill(false);
    const open = [a];
    reached[a] = true;
    for (let node = open.pop(); node !== undefined; node = open.pop()) {
      for (const { to, edge } of neighbours[node] ?? []) {
        if (edge === cut || reached[to]) continue;
        reached[to] = true;
        open.push(to);
      }
    }
    return reached[b] ? null : reached;
  });
}
