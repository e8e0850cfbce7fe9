import type { Beam } from '../beam/combinations';
import { given, sumOf, type LineBook, type Term } from './book';
import { force, leftOf, momentAbout, parts, shown, writeSum } from './load-sums';
import { stateValue, type State } from './state';

const equilibrium = 'Equilibrium of the part to the left';
const support = 'Beam on its supports: three-moment equations; the last two reactions by equilibrium';

/** Reactions of a state as lines already written, for the shear and moment lines that follow. */
export interface StateTerms {
  state: State;
  name: string;
  reactions: { x: number; term: Term }[];
  moments: { x: number; term: Term }[];
}

/**
 * Total load and reactions of a state. All reactions but two come from the beam's equations; the last two are
 * worked out here from Σ V = 0 and Σ M = 0, so that the checker sees them balance.
 */
export function reactionLines(
  book: LineBook,
  beam: Beam,
  state: State,
  name: string,
  length: number,
): StateTerms {
  const end = given('L', length, 'mm');
  const whole = `the whole beam in ${name}`;
  const W = writeSum(book, parts(state.loads.map(force)), {
    label: `Load on ${whole}`,
    symbol: 'W',
    unit: 'N',
    source: 'Loads as entered, with the combination’s factors',
  });
  const S = writeSum(
    book,
    state.loads.map((load, i) => momentAbout(load, i, end)),
    {
      label: `Its moment about the right end, in ${name}`,
      symbol: 'S',
      unit: 'N mm',
      source: 'Loads as entered, with the combination’s factors',
    },
  );
  const terms: StateTerms = { state, name, reactions: [], moments: [] };
  const held = beam.system.nodes.flatMap((node, n) =>
    node.support ? [{ node, n, id: node.support.id }] : [],
  );
  const moments = held.filter(({ node }) => node.support?.kind === 'fixed');
  const forceOf = (n: number): number => state.fields.reaction[n] ?? 0;
  const first = held[0];
  const last = held[held.length - 1];
  if (!first || !last) return terms;
  const symbolOf = (n: number): string => `R_${held.findIndex((h) => h.n === n) + 1}`;

  if (held.length === 1) {
    const R = book.write({
      label: `Reaction at ${first.id}`,
      symbol: symbolOf(first.n),
      formula: 'W',
      inputs: [W],
      value: forceOf(first.n),
      unit: 'N',
      source: 'Σ V = 0',
    });
    const x = given('x_R', first.node.x, 'mm');
    const M = book.write({
      label: `Moment at the fixed support ${first.id}`,
      symbol: 'M_1',
      formula: `S - ${R.symbol} * (L - x_R)`,
      inputs: [S, R, end, x],
      value: state.fields.supportMoment[first.n] ?? 0,
      unit: 'N mm',
      source: 'Σ M = 0 about the right end',
    });
    terms.reactions.push({ x: first.node.x, term: R });
    terms.moments.push({ x: first.node.x, term: M });
    return terms;
  }

  const solved = held
    .slice(1, -1)
    .map(({ node, n }) => ({ x: node.x, term: given(symbolOf(n), forceOf(n), 'N') }));
  const clamps = moments.map(({ node, n }, i) => ({
    x: node.x,
    term: given(`M_${i + 1}`, state.fields.supportMoment[n] ?? 0, 'N mm'),
  }));
  const arms = held.map(({ node, n }) => given(`x_${symbolOf(n)}`, node.x, 'mm'));
  const inner = solved.map(({ term }) => `${term.symbol} * (x_${symbolOf(last.n)} - x_${term.symbol})`);
  const clampSum = clamps.map(({ term }) => term.symbol);
  // ΣM about the right end is 0: Σ R (L − x) + Σ M = S; with R_last from Σ V.
  const known = [...inner, ...clampSum];
  const R1 = book.write({
    label: `Reaction at ${first.id}`,
    symbol: symbolOf(first.n),
    formula: `(S - W * (L - x_${symbolOf(last.n)})${known.map((k) => ` - ${k}`).join('')}) / (x_${symbolOf(last.n)} - x_${symbolOf(first.n)})`,
    inputs: [S, W, end, ...arms, ...solved.map((s) => s.term), ...clamps.map((c) => c.term)],
    value: forceOf(first.n),
    unit: 'N',
    source: solved.length + clamps.length > 0 ? support : 'Σ M = 0 about the other support',
  });
  const Rn = book.write({
    label: `Reaction at ${last.id}`,
    symbol: symbolOf(last.n),
    formula: `W - ${R1.symbol}${solved.map((s) => ` - ${s.term.symbol}`).join('')}`,
    inputs: [W, R1, ...solved.map((s) => s.term)],
    value: forceOf(last.n),
    unit: 'N',
    source: 'Σ V = 0',
  });
  terms.reactions.push({ x: first.node.x, term: R1 }, ...solved, { x: last.node.x, term: Rn });
  terms.moments.push(...clamps);
  return terms;
}

/**
 * Which of the values at x is meant: an axle that stands exactly at x may be a hair left or right of it, and a
 * support or load there as well.
 */
function sidesAt(
  state: State,
  x: number,
  side: -1 | 1,
  target: number,
): { side: -1 | 1; axleLeft: boolean; value: number } {
  let axles = 0;
  for (const load of state.loads) {
    if (load.kind === 'point' && load.axle && Math.abs(load.x - x) <= 1e-6) axles += load.factor * load.value;
  }
  const end = state.events[state.events.length - 1] ?? 0;
  let best = { side, axleLeft: side === 1, value: stateValue(state, 'shear', x, side) };
  for (const own of [side, side === 1 ? -1 : 1] as const) {
    if ((own === 1 && x >= end - 1e-6) || (own === -1 && x <= 1e-6)) continue;
    const value = stateValue(state, 'shear', x, own);
    for (const axleLeft of [own === 1, own !== 1]) {
      const shifted = axleLeft === (own === 1) ? value : value + (axleLeft ? -axles : axles);
      if (Math.abs(shifted - target) < Math.abs(best.value - target) - 1e-9 * Math.abs(target)) {
        best = { side: own, axleLeft, value: shifted };
      }
    }
  }
  return best;
}

/** V at x in a state, from the reactions and loads to its left; `target` is the value that was found to govern. */
export function shearLine(
  book: LineBook,
  terms: StateTerms,
  x: number,
  near: -1 | 1,
  target: number,
  label: string,
): Term {
  const { state, reactions } = terms;
  const { side, axleLeft, value } = sidesAt(state, x, near, target);
  const left = reactions.filter((r) => r.x < x - 1e-6 || (side === 1 && r.x <= x + 1e-6));
  const loads = parts(leftOf(state.loads, x, side === 1, axleLeft).map(force));
  const loadLeft =
    loads.length > 0
      ? writeSum(book, loads, {
          label: `Load left of x = ${shown(x)}, in ${terms.name}`,
          symbol: 'W_x',
          unit: 'N',
          source: 'Loads as entered, cut off at x',
        })
      : null;
  const plus = left.map((r) => r.term.symbol);
  return book.write({
    label,
    symbol: 'V',
    formula: `${plus.length > 0 ? sumOf(plus) : '0 * N_0'}${loadLeft ? ` - ${loadLeft.symbol}` : ''}`,
    inputs: [
      ...(plus.length > 0 ? left.map((r) => r.term) : [given('N_0', 1, 'N')]),
      ...(loadLeft ? [loadLeft] : []),
    ],
    value,
    unit: 'N',
    source: equilibrium,
  });
}

/** M at x in a state. */
export function momentLine(book: LineBook, terms: StateTerms, x: number, side: -1 | 1, label: string): Term {
  const { state, reactions, moments } = terms;
  const at = given('x', x, 'mm');
  const left = reactions.filter((r) => r.x < x - 1e-6);
  const clamps = moments.filter((m) => m.x < x - 1e-6 || (side === 1 && m.x <= x + 1e-6));
  const loads = leftOf(state.loads, x, side === 1).map((load, i) => momentAbout(load, i, at));
  const loadMoment =
    loads.length > 0
      ? writeSum(book, loads, {
          label: `Moment of the load left of x = ${shown(x)}, in ${terms.name}`,
          symbol: 'S_x',
          unit: 'N mm',
          source: 'Loads as entered, cut off at x',
        })
      : null;
  const plus = [
    ...left.map((r) => `${r.term.symbol} * (x - x_${r.term.symbol})`),
    ...clamps.map((m) => m.term.symbol),
  ];
  return book.write({
    label,
    symbol: 'M',
    formula: `${plus.length > 0 ? sumOf(plus) : '0 * C_0'}${loadMoment ? ` - ${loadMoment.symbol}` : ''}`,
    inputs: [
      ...(plus.length > 0 ? [at] : [given('C_0', 1, 'N mm')]),
      ...left.flatMap((r) => [r.term, given(`x_${r.term.symbol}`, r.x, 'mm')]),
      ...clamps.map((m) => m.term),
      ...(loadMoment ? [loadMoment] : []),
    ],
    value: stateValue(state, 'moment', x, side),
    unit: 'N mm',
    source: equilibrium,
  });
}
