import type { SectionFlow } from '../flow/section-flow';
import type { Sideways } from '../flow/sideways';
import type { Section } from '../section/section';
import { given, sumOf, type LineBook, type Term } from './book';
import type { SectionTerms } from './section-lines';

const shearFlow = 'Shear flow VQ/I (mechanics of materials)';
const network = 'Least slip energy Σq²/2k over the loop (Castigliano); φ from the balance of every piece';

/** |q/V| of each joined interface, by the interface's id. */
export type FlowTerms = Map<string, Term>;

/** First moments and flows for one newton of shear; in loops with the balance of every piece as a check. */
export function flowLines(book: LineBook, section: Section, flow: SectionFlow, s: SectionTerms): FlowTerms {
  const terms: FlowTerms = new Map();
  const joined = flow.interfaces.filter((i) => i.item.connection);
  if (joined.length === 0) return terms;
  book.open('Shear flow');
  const signed = new Map<string, Term>();
  for (const { item, flowPerShear, firstMoment, side, k } of joined) {
    const names = item.pieces.join(' and ');
    if (side && firstMoment !== null) {
      const cut = cutPieces(side);
      const symbolQ = `Q_${item.id}`;
      if (flowPerShear === 0) {
        // What is left of the sum is rounding: the part cut off has its middle on the neutral axis.
        terms.set(item.id, zeroFlow(book, item.id, names));
        continue;
      }
      const Q = book.write({
        label: `First moment of what ${item.id} cuts off (${cut.map((i) => section.pieces[i]?.piece.id ?? '').join(', ')})`,
        symbol: symbolQ,
        formula: `abs(${sumOf(cut.map((i) => `EA_${i + 1} * (z_${i + 1} - zbar)`))}) / E_ref`,
        inputs: [...cut.flatMap((i) => pick(s, i)), s.zbar, s.Eref],
        value: firstMoment,
        unit: 'mm^3',
        source: shearFlow,
        interface: item.id,
      });
      terms.set(
        item.id,
        book.write({
          label: `Flow at ${item.id} (${names}) for one newton of shear`,
          symbol: `phi_${item.id}`,
          formula: `${symbolQ} / I`,
          inputs: [Q, s.I],
          value: Math.abs(flowPerShear),
          unit: 'mm^-1',
          source: shearFlow,
          interface: item.id,
        }),
      );
      continue;
    }
    if (flowPerShear === 0) {
      terms.set(item.id, zeroFlow(book, item.id, names));
      continue;
    }
    const a = item.a + 1;
    const b = item.b + 1;
    const f = book.write({
      label: `Flow from ${section.pieces[item.a]?.piece.id ?? ''} to ${section.pieces[item.b]?.piece.id ?? ''} at ${item.id}, for one newton of shear`,
      symbol: `f_${item.id}`,
      formula: `k_${item.id} / k_max * (u_${a} - u_${b}) / EI`,
      inputs: [
        given(`k_${item.id}`, k, flow.ownModuli ? 'N/mm' : ''),
        given('k_max', flow.largestK, flow.ownModuli ? 'N/mm' : ''),
        given(`u_${a}`, flow.potentials[item.a] ?? 0, 'N mm'),
        given(`u_${b}`, flow.potentials[item.b] ?? 0, 'N mm'),
        s.EI,
      ],
      value: flowPerShear,
      unit: 'mm^-1',
      source: network,
      interface: item.id,
    });
    signed.set(item.id, f);
    terms.set(
      item.id,
      book.write({
        label: `Flow at ${item.id} (${names}) for one newton of shear`,
        symbol: `phi_${item.id}`,
        formula: `abs(${f.symbol})`,
        inputs: [f],
        value: Math.abs(flowPerShear),
        unit: 'mm^-1',
        source: network,
        interface: item.id,
      }),
    );
  }
  balanceLines(book, section, flow, s, signed);
  return terms;
}

function zeroFlow(book: LineBook, id: string, names: string): Term {
  return book.write({
    label: `Flow at ${id} (${names}) for one newton of shear: none, what it cuts off lies level with the rest`,
    symbol: `phi_${id}`,
    formula: `0 * n_${id}`,
    inputs: [given(`n_${id}`, 1, 'mm^-1')],
    value: 0,
    unit: 'mm^-1',
    source: shearFlow,
    interface: id,
  });
}

/** The smaller side, as the engine sums it. */
function cutPieces(side: readonly boolean[]): number[] {
  const inside = side.filter(Boolean).length * 2 <= side.length;
  return side.flatMap((reached, i) => (reached === inside ? [i] : []));
}

function pick(s: SectionTerms, i: number): Term[] {
  const EA = s.EA[i];
  const z = s.z[i];
  return EA && z ? [EA, z] : [];
}

/** In a loop: what leaves a piece through its interfaces is what the piece has to give away. */
function balanceLines(
  book: LineBook,
  section: Section,
  flow: SectionFlow,
  s: SectionTerms,
  signed: ReadonlyMap<string, Term>,
): void {
  const most = flow.sources.reduce((size, x) => Math.max(size, Math.abs(x)), 0);
  section.pieces.forEach(({ piece }, i) => {
    const touching = flow.interfaces.filter(({ item }) => item.connection && (item.a === i || item.b === i));
    const own = touching.map(({ item }) => signed.get(item.id));
    const source = flow.sources[i] ?? 0;
    if (own.some((t) => t === undefined) || own.length === 0 || Math.abs(source) < 1e-9 * most) return;
    const terms = own.filter((t) => t !== undefined);
    const leaves = touching.map(({ item }, j) => `${item.a === i ? '' : '-'}${terms[j]?.symbol ?? ''}`);
    book.write({
      label: `Balance of ${piece.id}: what leaves it through its interfaces`,
      symbol: `s_${i + 1}`,
      formula: sumOf(leaves),
      inputs: terms,
      value: source / section.EI,
      unit: 'mm^-1',
      source: 'Must equal the next line',
    });
    book.write({
      label: `Balance of ${piece.id}: what it has to give away, EA(z − z̄)/EI`,
      symbol: `t_${i + 1}`,
      formula: `EA_${i + 1} * (z_${i + 1} - zbar) / EI`,
      inputs: [...pick(s, i), s.zbar, s.EI],
      value: source / section.EI,
      unit: 'mm^-1',
      source: shearFlow,
    });
  });
}

/** Shares of the stacks, where some load is put on one of them. */
export function sidewaysLines(book: LineBook, section: Section, sideways: Sideways): Term[] {
  book.open('Load passed sideways');
  const source = 'Plies share a load by bending stiffness (statics)';
  const stiffness = sideways.stiffness.map((value, stack) => {
    const own = section.pieces.flatMap((p, i) => (sideways.stackOf[i] === stack ? [{ p, k: i + 1 }] : []));
    const names = own.map(({ p }) => p.piece.id).join(', ');
    const inputs = own.flatMap(({ p, k }) => [
      given(`E_${k}`, p.material.E, 'MPa'),
      given(`b_${k}`, p.piece.width, 'mm'),
      given(`h_${k}`, p.piece.depth, 'mm'),
    ]);
    let zs: Term[] = [];
    if (own.length > 1) {
      const EA = own.reduce((sum, { p }) => sum + p.EA, 0);
      const centre = own.reduce((sum, { p }) => sum + p.EA * (p.z - section.bottom), 0) / EA + section.bottom;
      const heights = own.map(({ p, k }) => given(`z_${k}`, p.z, 'mm'));
      zs = [
        ...heights,
        book.write({
          label: `Middle of the stack ${names}`,
          symbol: `zs_${stack + 1}`,
          formula: `(${sumOf(own.map(({ k }) => `E_${k} * b_${k} * h_${k} * z_${k}`))}) / (${sumOf(own.map(({ k }) => `E_${k} * b_${k} * h_${k}`))})`,
          inputs: [...inputs, ...heights],
          value: centre,
          unit: 'mm',
          source,
        }),
      ];
    }
    return book.write({
      label: `Bending stiffness of ${names} alone`,
      symbol: `EIs_${stack + 1}`,
      formula: sumOf(
        own.map(
          ({ k }) =>
            `E_${k} * b_${k} * h_${k}^3 / 12${own.length > 1 ? ` + E_${k} * b_${k} * h_${k} * (z_${k} - zs_${stack + 1})^2` : ''}`,
        ),
      ),
      inputs: [...inputs, ...zs],
      value,
      unit: 'N mm^2',
      source,
    });
  });
  return sideways.shares.map((value, stack) =>
    book.write({
      label: `Share that ${section.pieces.flatMap((p, i) => (sideways.stackOf[i] === stack ? [p.piece.id] : [])).join(', ')} keeps of every load`,
      symbol: `share_${stack + 1}`,
      formula: `EIs_${stack + 1} / (${sumOf(stiffness.map((t) => t.symbol))})`,
      inputs: stiffness,
      value,
      unit: '',
      source,
    }),
  );
}
