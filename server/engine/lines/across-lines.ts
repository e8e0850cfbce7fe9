import { spread } from '../demand/sideways-load';
import type { Sideways } from '../flow/sideways';
import { given, sumOf, type LineBook, type Term } from './book';
import { shown } from './load-sums';
import type { State } from './state';

/**
 * The flow passed sideways at an interface at x in a state: each load put on a piece, as an intensity at x,
 * times the part of it that crosses there (c: what enters on one side less what that side keeps).
 */
export function acrossLine(
  book: LineBook,
  interfaceId: string,
  state: State,
  sideways: Sideways,
  across: readonly number[],
  stackOf: (on: string | undefined) => number | null,
  at: { x: number; side: -1 | 1; depth: number; length: number },
  value: number,
): Term {
  const inputs: Term[] = [];
  const formulas: string[] = [];
  const { x, side, depth, length } = at;
  const within = (from: number, to: number): boolean =>
    side === 1 ? x >= from - 1e-9 && x < to - 1e-9 : x > from + 1e-9 && x <= to + 1e-9;
  state.loads.forEach((load, i) => {
    if (load.kind === 'couple') return;
    const stack = stackOf(load.on);
    const c = stack === null ? 0 : (across[stack] ?? 0);
    if (c === 0) return;
    const k = i + 1;
    if (load.kind === 'spread') {
      if (!within(load.from, load.to)) return;
      formulas.push(`c_${k} * gamma_${k} * (q_${k} + (r_${k} - q_${k}) * (x - a_${k}) / (b_${k} - a_${k}))`);
      inputs.push(
        given(`c_${k}`, c, ''),
        given(`gamma_${k}`, load.factor, ''),
        given(`q_${k}`, load.start, 'N/mm'),
        given(`r_${k}`, load.end, 'N/mm'),
        given(`a_${k}`, load.from, 'mm'),
        given(`b_${k}`, load.to, 'mm'),
        given('x', x, 'mm'),
      );
      return;
    }
    const over = spread(load.x, depth, length);
    // An axle just coming within reach counts at the very edge of its spread.
    if (!within(over.from, over.to) && !(load.axle && x >= over.from - 1e-6 && x <= over.to + 1e-6)) return;
    formulas.push(`c_${k} * gamma_${k} * P_${k} / l_${k}`);
    inputs.push(
      given(`c_${k}`, c, ''),
      given(`gamma_${k}`, load.factor, ''),
      given(`P_${k}`, load.value, 'N'),
      given(`l_${k}`, over.to - over.from, 'mm'),
    );
  });
  return book.write({
    label: `Flow passed sideways at ${interfaceId}, x = ${shown(x)} (c: what enters on one side less the share that side keeps)`,
    symbol: 't',
    formula: formulas.length > 0 ? `abs(${sumOf(formulas)})` : '0 * t_0',
    inputs: formulas.length > 0 ? inputs : [given('t_0', 1, 'N/mm')],
    value,
    unit: 'N/mm',
    source: `Side-loaded plies (statics): ${sideways.stacks} stacks; a point load spreads over the depth each side`,
    interface: interfaceId,
  });
}
