import type { MemberDocument, Support } from '@shared/schemas/member';
import { BandedSystem } from '../numeric/banded';
import { refuse } from '../refused';

/** A place that cuts the beam into spans: its ends, every support, every hinge. */
export interface Node {
  x: number;
  support: Support | null;
  hinge: boolean;
}

/** What a span's own loads do to it when it is simply supported on its two nodes. */
export interface SpanLoads {
  /** shear at the span's two ends, N */
  shear: [number, number];
  /** EI times the slope at the two ends, N·mm² */
  slope: [number, number];
}

/** What acts at a node: a point load (down) and a couple (adding to M on its right). */
export interface NodeLoads {
  force: number;
  couple: number;
}

/** The solution at the nodes. `deflection` is EI·w; the moments stand left and right of each node. */
export interface NodeState {
  deflection: Float64Array;
  momentLeft: Float64Array;
  momentRight: Float64Array;
}

/**
 * The beam as a chain of simply supported spans joined at their nodes: a mixed form of the three-moment
 * equations (Clapeyron) in which each node keeps its moment left and right and its deflection, so that
 * overhangs, hinges, clamps and springs need no special case. One banded factorisation serves all loads.
 *
 * θ at a span's ends: EI·θ_a = (EIw_b − EIw_a)/ℓ + EIθ_ss,a + ℓ(2M_a + M_b)/6,
 *                     EI·θ_b = (EIw_b − EIw_a)/ℓ + EIθ_ss,b − ℓ(M_a + 2M_b)/6   (EI w″ = −M).
 */
export class BeamSystem {
  readonly nodes: Node[];
  readonly spans: number;
  private readonly system: BandedSystem;
  /** unknowns are divided by this length once or twice, so that all have the size of a moment */
  private readonly unit: number;

  constructor(
    document: MemberDocument,
    readonly EI: number,
  ) {
    this.nodes = findNodes(document);
    this.spans = this.nodes.length - 1;
    this.unit = document.length / this.spans;
    this.system = new BandedSystem(3 * this.nodes.length, 5, 5);
    this.assemble();
    if (!this.system.factorise()) {
      refuse('unstable-beam', 'supports', 'The beam is not held: its supports leave it free to move.');
    }
  }

  /** Length of span e, mm. */
  spanLength(e: number): number {
    return (this.nodes[e + 1]?.x ?? 0) - (this.nodes[e]?.x ?? 0);
  }

  /** Index of the span that holds x; at a node the span right of it (left of it at the beam's right end). */
  spanAt(x: number): number {
    let low = 0;
    let high = this.spans - 1;
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if ((this.nodes[middle]?.x ?? 0) <= x) low = middle;
      else high = middle - 1;
    }
    return low;
  }

  private stiffness(node: Node): number {
    return node.support?.kind === 'spring' ? (node.support.stiffness ?? 0) : 0;
  }

  private isRigid(node: Node): boolean {
    return node.support !== null && node.support.kind !== 'spring';
  }

  private assemble(): void {
    const { nodes, spans, unit, system } = this;
    // Unknowns of node n: 3n EIw/unit², 3n+1 M left, 3n+2 M right.
    nodes.forEach((node, n) => {
      const left = n > 0 ? this.spanLength(n - 1) : 0;
      const right = n < spans ? this.spanLength(n) : 0;
      const w = 3 * n;
      const vertical = 3 * n;
      const rowA = 3 * n + 1;
      const rowB = 3 * n + 2;
      // Vertical equilibrium V_right − V_left − R = −P, times unit; or w = 0.
      if (this.isRigid(node)) {
        system.add(vertical, w, 1);
      } else {
        if (right > 0) {
          system.add(vertical, w + 4, unit / right);
          system.add(vertical, w + 2, -unit / right);
        }
        if (left > 0) {
          system.add(vertical, w + 1, -unit / left);
          system.add(vertical, w - 1, unit / left);
        }
        // R = k·w = k·unit²/EI · unknown
        system.add(vertical, w, (-this.stiffness(node) * unit ** 3) / this.EI);
      }
      const slopeRight = (row: number, sign: number): void => {
        system.add(row, w + 3, (sign * unit) / right);
        system.add(row, w, (-sign * unit) / right);
        system.add(row, w + 2, (sign * right) / (3 * unit));
        system.add(row, w + 4, (sign * right) / (6 * unit));
      };
      const slopeLeft = (row: number, sign: number): void => {
        system.add(row, w, (sign * unit) / left);
        system.add(row, w - 3, (-sign * unit) / left);
        system.add(row, w - 1, (-sign * left) / (6 * unit));
        system.add(row, w + 1, (-sign * left) / (3 * unit));
      };
      const clamped = node.support?.kind === 'fixed';
      if (n === 0) {
        system.add(rowA, w + 1, 1);
        if (clamped) slopeRight(rowB, 1);
        else system.add(rowB, w + 2, 1);
      } else if (n === spans) {
        if (clamped) slopeLeft(rowA, 1);
        else system.add(rowA, w + 1, 1);
        system.add(rowB, w + 2, 1);
      } else if (clamped) {
        slopeLeft(rowA, 1);
        slopeRight(rowB, 1);
      } else if (node.hinge) {
        system.add(rowA, w + 1, 1);
        system.add(rowB, w + 2, 1);
      } else {
        system.add(rowA, w + 2, 1);
        system.add(rowA, w + 1, -1);
        slopeLeft(rowB, 1);
        slopeRight(rowB, -1);
      }
    });
  }

  /**
   * Solves for the state at the nodes under the given span and node loads.
   * Both lists have one entry a span and a node.
   */
  solve(spanLoads: readonly SpanLoads[], nodeLoads: readonly NodeLoads[]): NodeState {
    const { nodes, spans, unit } = this;
    const rhs = new Float64Array(3 * nodes.length);
    nodes.forEach((node, n) => {
      const left = n > 0 ? spanLoads[n - 1] : undefined;
      const right = n < spans ? spanLoads[n] : undefined;
      const { force, couple } = nodeLoads[n] ?? { force: 0, couple: 0 };
      if (!this.isRigid(node)) {
        rhs[3 * n] = unit * (-force - (right?.shear[0] ?? 0) + (left?.shear[1] ?? 0));
      }
      const rowA = 3 * n + 1;
      const rowB = 3 * n + 2;
      const slopeRight = -(right?.slope[0] ?? 0) / unit;
      const slopeLeft = -(left?.slope[1] ?? 0) / unit;
      const clamped = node.support?.kind === 'fixed';
      if (n === 0) {
        rhs[rowB] = clamped ? slopeRight : couple;
      } else if (n === spans) {
        rhs[rowA] = clamped ? slopeLeft : -couple;
      } else if (clamped) {
        rhs[rowA] = slopeLeft;
        rhs[rowB] = slopeRight;
      } else if (node.hinge) {
        rhs[rowA] = -couple; // a couple at a hinge acts on its left
      } else {
        rhs[rowA] = couple;
        rhs[rowB] = slopeLeft - slopeRight;
      }
    });
    const x = this.system.solve(rhs);
    const count = nodes.length;
    const state: NodeState = {
      deflection: new Float64Array(count),
      momentLeft: new Float64Array(count),
      momentRight: new Float64Array(count),
    };
    for (let n = 0; n < count; n++) {
      state.deflection[n] = this.isRigid(nodes[n] ?? { x: 0, support: null, hinge: false })
        ? 0
        : (x[3 * n] ?? 0) * unit * unit;
      state.momentLeft[n] = n === 0 ? 0 : (x[3 * n + 1] ?? 0);
      state.momentRight[n] = n === spans ? 0 : (x[3 * n + 2] ?? 0);
    }
    return state;
  }

  /** Upward force of the support at node n, from the state and the shear beside it. */
  reaction(n: number, state: NodeState, shearLeft: number, shearRight: number, force: number): number {
    const node = this.nodes[n];
    if (!node?.support) return 0;
    if (node.support.kind === 'spring') return (this.stiffness(node) * (state.deflection[n] ?? 0)) / this.EI;
    return shearRight - shearLeft + force;
  }

  /** Moment of the support at node n, positive where it adds to M on its right; 0 where it holds none. */
  supportMoment(n: number, state: NodeState, couple: number): number {
    if (this.nodes[n]?.support?.kind !== 'fixed') return 0;
    return (state.momentRight[n] ?? 0) - (state.momentLeft[n] ?? 0) - couple;
  }
}

function findNodes(document: MemberDocument): Node[] {
  const nodes: Node[] = [];
  const at = (x: number): Node => {
    let node = nodes.find((n) => n.x === x);
    if (!node) {
      node = { x, support: null, hinge: false };
      nodes.push(node);
    }
    return node;
  };
  at(0);
  at(document.length);
  for (const support of document.supports) at(support.x).support = support;
  for (const x of document.hinges) at(x).hinge = true;
  return nodes.sort((a, b) => a.x - b.x);
}
