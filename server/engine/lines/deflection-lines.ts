import type { Beam } from '../beam/combinations';
import type { StateTerms } from './beam-lines';
import { given, type LineBook, type Term } from './book';
import { ends, leftOf, shown, writeSum, type Part } from './load-sums';
import { stateValue, type FrozenLoad } from './state';

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
  // A load a hair left of x adds nothing but the rounding of its place.
  const between = leftOf(state.loads, x, false).flatMap((load): FrozenLoad[] => {
    if (load.kind !== 'spread') return load.x > x0 + 1e-6 && load.x < x - 1e-3 ? [load] : [];
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
