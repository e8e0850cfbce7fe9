import type { Beam } from '../beam/combinations';
import { given, sumOf, type LineBook, type Term } from './book';
import { stateValue, type FrozenLoad, type State } from './state';

const equilibrium = 'Equilibrium of the part to the left';
const support = 'Beam on its supports: three-moment equations; the last two reactions by equilibrium';

/** Reactions of a state as lines already written, for the shear and moment lines that follow. */
export interface StateTerms {
  state: State;
  name: string;
  reactions: { x: number; term: Term }[];
  moments: { x: number; term: Term }[];
}

/** How many terms a formula may hold before a part of it gets a line of its own. */
const longest = 12;

interface Part {
  formula: string;
  inputs: Term[];
  value: number;
}

/** Writes a sum as one line, or as several of bearable length and their sum. */
function writeSum(
  book: LineBook,
  parts: readonly Part[],
  line: { label: string; symbol: string; unit: string; source: string },
): Term {
  if (parts.length <= longest) {
    return book.write({
      ...line,
      formula: parts.length > 0 ? sumOf(parts.map((p) => p.formula)) : `0 * ${line.symbol}_0`,
      inputs: parts.length > 0 ? parts.flatMap((p) => p.inputs) : [given(`${line.symbol}_0`, 0, line.unit)],
      value: parts.reduce((sum, p) => sum + p.value, 0),
    });
  }
  const chunks: Term[] = [];
  for (let i = 0; i < parts.length; i += longest) {
    const some = parts.slice(i, i + longest);
    chunks.push(
      book.write({
        ...line,
        label: `${line.label}, part ${chunks.length + 1}`,
        symbol: `${line.symbol}_p${chunks.length + 1}`,
        formula: sumOf(some.map((p) => p.formula)),
        inputs: some.flatMap((p) => p.inputs),
        value: some.reduce((sum, p) => sum + p.value, 0),
      }),
    );
  }
  return writeSum(
    book,
    chunks.map((t) => ({ formula: t.symbol, inputs: [t], value: t.value })),
    line,
  );
}

/** Loads left of x, each cut off there; `atX` and `axleAtX` count what stands exactly at x. */
function leftOf(loads: readonly FrozenLoad[], x: number, atX: boolean, axleAtX = atX): FrozenLoad[] {
  return loads.flatMap((load): FrozenLoad[] => {
    if (load.kind !== 'spread') {
      const counts = load.kind === 'point' && load.axle ? axleAtX : atX;
      return load.x < x - 1e-6 || (counts && load.x <= x + 1e-6) ? [load] : [];
    }
    if (load.from >= x) return [];
    if (load.to <= x) return [load];
    const end = load.start + ((load.end - load.start) * (x - load.from)) / (load.to - load.from);
    return [{ ...load, to: x, end }];
  });
}

/** The load's size as a part of a sum, N. */
function force(load: FrozenLoad, k: number): Part | null {
  if (load.kind === 'couple') return null;
  const gamma = given(`gamma_${k}`, load.factor, '');
  if (load.kind === 'point') {
    return {
      formula: `gamma_${k} * P_${k}`,
      inputs: [gamma, given(`P_${k}`, load.value, 'N')],
      value: load.factor * load.value,
    };
  }
  return {
    formula: `gamma_${k} * (q_${k} + r_${k}) / 2 * (b_${k} - a_${k})`,
    inputs: [gamma, ...ends(load, k)],
    value: ((load.factor * (load.start + load.end)) / 2) * (load.to - load.from),
  };
}

function ends(load: Extract<FrozenLoad, { kind: 'spread' }>, k: number): Term[] {
  return [
    given(`q_${k}`, load.start, 'N/mm'),
    given(`r_${k}`, load.end, 'N/mm'),
    given(`a_${k}`, load.from, 'mm'),
    given(`b_${k}`, load.to, 'mm'),
  ];
}

/** The load's moment about x, positive where it hogs a part that ends at x (what M loses by it), N·mm. */
function momentAbout(load: FrozenLoad, k: number, x: Term): Part {
  const gamma = given(`gamma_${k}`, load.factor, '');
  if (load.kind === 'couple') {
    return {
      formula: `-gamma_${k} * C_${k}`,
      inputs: [gamma, given(`C_${k}`, load.value, 'N mm')],
      value: -load.factor * load.value,
    };
  }
  if (load.kind === 'point') {
    return {
      formula: `gamma_${k} * P_${k} * (${x.symbol} - x_${k})`,
      inputs: [gamma, given(`P_${k}`, load.value, 'N'), given(`x_${k}`, load.x, 'mm'), x],
      value: load.factor * load.value * (x.value - load.x),
    };
  }
  // A trapezium q, r over a … b about x: (b − a)/6·[3(q + r)(x − b) + (b − a)(2q + r)]
  const w = load.to - load.from;
  return {
    formula: `gamma_${k} * (b_${k} - a_${k}) / 6 * (3 * (q_${k} + r_${k}) * (${x.symbol} - b_${k}) + (b_${k} - a_${k}) * (2 * q_${k} + r_${k}))`,
    inputs: [gamma, ...ends(load, k), x],
    value:
      ((load.factor * w) / 6) *
      (3 * (load.start + load.end) * (x.value - load.to) + w * (2 * load.start + load.end)),
  };
}

const parts = (list: readonly (Part | null)[]): Part[] => list.filter((p) => p !== null);

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

/**
 * Deflection at x in a state: from w, θ, M and V at the node left of x and the loads between,
 * EI·w = EI·w0 + EI·θ0·d − M0·d²/2 − V0·d³/6 + Σ loads.
 */
export function deflectionLine(
  book: LineBook,
  beam: Beam,
  terms: StateTerms,
  x: number,
  EI: Term,
  label: string,
): Term {
  const { state } = terms;
  const { nodes } = beam.system;
  let n = 0;
  while (n < nodes.length - 2 && (nodes[n + 1]?.x ?? 0) < x - 1e-6) n++;
  const x0 = nodes[n]?.x ?? 0;
  const d = given('d', x - x0, 'mm');
  const i = state.events.findIndex((e) => Math.abs(e - x0) <= 1e-6);
  const h = (state.events[i + 1] ?? 1) - x0;
  const w0 = given('w_0', (state.fields.bend[6 * i] ?? 0) / beam.EI, 'mm');
  const theta0 = given('theta_0', (state.fields.bend[6 * i + 1] ?? 0) / h / beam.EI, '');
  const M0 = given('M_0', state.fields.moment[4 * i] ?? 0, 'N mm');
  const V0 = given('V_0', state.fields.shear[3 * i] ?? 0, 'N');
  const between = leftOf(state.loads, x, false).flatMap((load): FrozenLoad[] => {
    if (load.kind !== 'spread') return load.x > x0 + 1e-6 ? [load] : [];
    if (load.to <= x0 + 1e-6) return [];
    if (load.from >= x0) return [load];
    const start = load.start + ((load.end - load.start) * (x0 - load.from)) / (load.to - load.from);
    return [{ ...load, from: x0, start }];
  });
  const at = given('x', x, 'mm');
  const own =
    between.length > 0
      ? writeSum(
          book,
          between.map((load, k) => deflectionPart(load, k, at)),
          {
            label: `Loads between x = ${shown(x0)} and ${shown(x)}: their part of EI·w`,
            symbol: 'T',
            unit: 'N mm^3',
            source: 'EI·w″ = −M, integrated twice',
          },
        )
      : null;
  return book.write({
    label,
    symbol: 'w',
    formula: `w_0 + theta_0 * d - (M_0 * d^2 / 2 + V_0 * d^3 / 6${own ? ` - ${own.symbol}` : ''}) / EI`,
    inputs: [w0, theta0, d, M0, V0, EI, ...(own ? [own] : [])],
    value: stateValue(state, 'bend', x, -1) / beam.EI,
    unit: 'mm',
    source: `Euler–Bernoulli beam from x = ${shown(x0)}, where w, slope, M and V come from the beam’s equations`,
  });
}

/** A load's part of EI·w at x: P(x−a)³/6; couples −C(x−a)²/2; a trapezium by its uniform and rising part. */
function deflectionPart(load: FrozenLoad, k: number, x: Term): Part {
  const gamma = given(`gamma_${k}`, load.factor, '');
  if (load.kind === 'point') {
    return {
      formula: `gamma_${k} * P_${k} * (x - x_${k})^3 / 6`,
      inputs: [gamma, given(`P_${k}`, load.value, 'N'), given(`x_${k}`, load.x, 'mm'), x],
      value: (load.factor * load.value * (x.value - load.x) ** 3) / 6,
    };
  }
  if (load.kind === 'couple') {
    return {
      formula: `-gamma_${k} * C_${k} * (x - x_${k})^2 / 2`,
      inputs: [gamma, given(`C_${k}`, load.value, 'N mm'), given(`x_${k}`, load.x, 'mm'), x],
      value: (-load.factor * load.value * (x.value - load.x) ** 2) / 2,
    };
  }
  // ∫ q(s)(x − s)³/6 ds over a … b, with m = r − q: q[A⁴ − B⁴]/24 + m/w·[(A⁵ − B⁵)/120 − w·B⁴/24], A = x − a, B = x − b
  const { start: q, end: r, from: a, to: b, factor } = load;
  const w = b - a;
  const A = x.value - a;
  const B = x.value - b;
  const value =
    factor * ((q * (A ** 4 - B ** 4)) / 24 + ((r - q) / w) * ((A ** 5 - B ** 5) / 120 - (w * B ** 4) / 24));
  const n = (s: string): string => `${s}_${k}`;
  return {
    formula: `${n('gamma')} * (${n('q')} * ((x - ${n('a')})^4 - (x - ${n('b')})^4) / 24 + (${n('r')} - ${n('q')}) / (${n('b')} - ${n('a')}) * (((x - ${n('a')})^5 - (x - ${n('b')})^5) / 120 - (${n('b')} - ${n('a')}) * (x - ${n('b')})^4 / 24))`,
    inputs: [gamma, ...ends(load, k), x],
    value,
  };
}

export function shown(x: number): string {
  return String(Number(x.toFixed(1)));
}
