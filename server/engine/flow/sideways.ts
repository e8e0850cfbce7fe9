import type { MemberDocument } from '@shared/schemas/member';
import type { Interface } from '../section/interfaces';
import type { Section } from '../section/section';
import { leastEnergyFlows } from './network';

/** How a load put on one piece crosses the vertical interfaces to the others. */
export interface Sideways {
  /** stack of each piece: pieces that rest on each other are one */
  stackOf: number[];
  stacks: number;
  /** share of the load that each stack keeps, by its bending stiffness */
  shares: number[];
  /** own bending stiffness of each stack, N·mm² */
  stiffness: number[];
  /** across[j][s]: what crosses interface j (by its place in the list) for a load of one on stack s, signed */
  across: number[][];
}

/**
 * Stacks, their shares (composite, about their own centroids) and the network that carries the differences:
 * vertical connected interfaces, all alike. t = what enters on one side − what that side keeps (statics).
 */
export function sidewaysTransfer(section: Section, interfaces: readonly Interface[]): Sideways {
  const n = section.pieces.length;
  const group = Array.from({ length: n }, (_, i) => i);
  const root = (i: number): number => {
    let r = i;
    while ((group[r] ?? r) !== r) r = group[r] ?? r;
    return r;
  };
  for (const { a, b, orientation } of interfaces) if (orientation === 'horizontal') group[root(b)] = root(a);
  const numbers = new Map<number, number>();
  const stackOf = group.map((_, i) => {
    const r = root(i);
    const known = numbers.get(r);
    if (known !== undefined) return known;
    numbers.set(r, numbers.size);
    return numbers.size - 1;
  });
  const stacks = numbers.size;
  const stiffness = Array.from({ length: stacks }, (_, s) => {
    const members = section.pieces.filter((_piece, i) => stackOf[i] === s);
    let EA = 0;
    let moment = 0;
    for (const p of members) {
      EA += p.EA;
      moment += p.EA * (p.z - section.bottom);
    }
    let EI = 0;
    for (const p of members) EI += p.material.E * p.ownI + p.EA * (p.z - section.bottom - moment / EA) ** 2;
    return EI;
  });
  const total = stiffness.reduce((sum, x) => sum + x, 0);
  const shares = stiffness.map((x) => x / total);
  const crossing = interfaces.map(
    ({ a, b, connection, orientation }) =>
      connection !== null && orientation === 'vertical' && stackOf[a] !== stackOf[b],
  );
  const edges = interfaces
    .filter((_, j) => crossing[j])
    .map(({ a, b }) => ({ a: stackOf[a] ?? 0, b: stackOf[b] ?? 0, k: 1 }));
  const across = interfaces.map(() => new Array<number>(stacks).fill(0));
  if (stacks > 1) {
    for (let s = 0; s < stacks; s++) {
      const sources = shares.map((share, j) => (j === s ? 1 : 0) - share);
      const { flows } = leastEnergyFlows(stacks, edges, sources);
      let edge = 0;
      crossing.forEach((crosses, j) => {
        if (!crosses) return;
        const line = across[j];
        const value = flows[edge++] ?? 0;
        if (line) line[s] = Math.abs(value) < 1e-12 ? 0 : value;
      });
    }
  }
  return { stackOf, stacks, shares, stiffness, across };
}

/** Which stack a load is put on; null where the document does not say. */
export function stackOfLoad(
  document: MemberDocument,
  sideways: Sideways,
  on: string | undefined,
): number | null {
  if (on === undefined) return null;
  const index = document.pieces.findIndex((p) => p.id === on);
  return sideways.stackOf[index] ?? null;
}
