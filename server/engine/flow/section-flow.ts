import type { Interface } from '../section/interfaces';
import { stiffnessMoment, type Section } from '../section/section';
import { bridgeSides, leastEnergyFlows, type Edge } from './network';

/** The flow at one interface for one newton of shear. */
export interface InterfaceFlow {
  item: Interface;
  /** q/V, 1/mm, positive from the earlier piece to the later */
  flowPerShear: number;
  /** mm³, |Q| of what the interface alone cuts off over E_ref; null inside a loop and where unconnected */
  firstMoment: number | null;
  /** pieces on the earlier piece's side where the interface alone cuts them off */
  side: boolean[] | null;
  /** slip stiffness used for the split, N/mm a fastener × rows, or 1 */
  k: number;
}

/** Where in a loop a potential comes from, for the calculation's lines: φ of each piece for V/EI = 1. */
export interface SectionFlow {
  interfaces: InterfaceFlow[];
  /** EA(z − z̄) of each piece, N·mm */
  sources: number[];
  potentials: number[];
  /** true where the split used the connections' own slip moduli */
  ownModuli: boolean;
  /** the largest of the k, by which they were divided for the potentials */
  largestK: number;
}

/**
 * Shear flow at every connected interface for V = 1: sᵢ = EᵢAᵢ(zᵢ − z̄)/EI leaves piece i and must balance
 * through the interfaces (mechanics of materials, VQ/I), loops by least slip energy with
 * k = rows·slipModulus, all equal unless every connection has a modulus.
 */
export function sectionFlow(section: Section, interfaces: readonly Interface[]): SectionFlow {
  const joined = interfaces.filter((i) => i.connection);
  const ownModuli = joined.length > 0 && joined.every((i) => i.connection?.slipModulus !== undefined);
  const edges: Edge[] = joined.map(({ a, b, connection }) => ({
    a,
    b,
    k: ownModuli ? rowsOf(connection) * (connection?.slipModulus ?? 1) : 1,
  }));
  const sources = section.pieces.map((p) => stiffnessMoment(section, p));
  const { flows, potentials } = leastEnergyFlows(section.pieces.length, edges, sources);
  const sides = bridgeSides(section.pieces.length, edges);
  let index = -1;
  return {
    sources,
    potentials,
    ownModuli,
    largestK: edges.reduce((most, e) => Math.max(most, e.k), 0),
    interfaces: interfaces.map((item): InterfaceFlow => {
      if (!item.connection) return { item, flowPerShear: 0, firstMoment: null, side: null, k: 0 };
      index++;
      const side = sides[index] ?? null;
      let cut: number | null = null;
      if (side) {
        // Sum the smaller side: less to add, and the sides differ only in sign.
        let sum = 0;
        const inside = side.filter(Boolean).length * 2 <= side.length;
        side.forEach((reached, i) => {
          if (reached === inside) sum += sources[i] ?? 0;
        });
        cut = inside ? sum : -sum;
      }
      const flow = (cut ?? flows[index] ?? 0) / section.EI;
      // Rounding leaves a trace of flow where there is none, as between plies of one height.
      const nothing = Math.abs(flow) < 1e-9 / section.depth;
      return {
        item,
        flowPerShear: nothing ? 0 : flow,
        firstMoment: cut === null ? null : nothing ? 0 : Math.abs(cut) / section.referenceModulus,
        side,
        k: edges[index]?.k ?? 1,
      };
    }),
  };
}

/** Rows of fasteners of a connection; lines of glue or beads count once. */
export function rowsOf(connection: { kind: string; rows?: number | undefined } | null): number {
  return connection?.kind === 'fasteners' ? (connection.rows ?? 1) : 1;
}
