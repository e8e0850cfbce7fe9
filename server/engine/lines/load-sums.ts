import { given, sumOf, type LineBook, type Term } from './book';
import type { FrozenLoad } from './state';

/** Loads as parts of sums: their size, and their moment about a place. */

/** How many terms a formula may hold before a part of it gets a line of its own. */
const longest = 12;

export interface Part {
  formula: string;
  inputs: Term[];
  value: number;
}

/** Writes a sum as one line, or as several of bearable length and their sum. */
export function writeSum(
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
export function leftOf(loads: readonly FrozenLoad[], x: number, atX: boolean, axleAtX = atX): FrozenLoad[] {
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
export function force(load: FrozenLoad, k: number): Part | null {
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

export function ends(load: Extract<FrozenLoad, { kind: 'spread' }>, k: number): Term[] {
  return [
    given(`q_${k}`, load.start, 'N/mm'),
    given(`r_${k}`, load.end, 'N/mm'),
    given(`a_${k}`, load.from, 'mm'),
    given(`b_${k}`, load.to, 'mm'),
  ];
}

/** The load's moment about x, positive where it hogs a part that ends at x (what M loses by it), N·mm. */
export function momentAbout(load: FrozenLoad, k: number, x: Term): Part {
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

export const parts = (list: readonly (Part | null)[]): Part[] => list.filter((p) => p !== null);

export function shown(x: number): string {
  return String(Number(x.toFixed(1)));
}
