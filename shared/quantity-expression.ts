/**
 * Reads a length, force or other magnitude as people type it: `2.4 m`, `7' 10 1/2"`, `2x38+12`, `1 1/2 in`.
 *
 * A number, or a product or sum of numbers, some of which carry a unit. A number without one stands for the
 * default unit once the whole (or the term of a sum) is known to have none. Two magnitudes that follow each
 * other, as feet and inches do, are added.
 */

/** What each unit is worth in the unit that the caller stores, by the spelling in lower case. */
export type UnitTable = ReadonlyMap<string, number>;

export type Read = { ok: true; value: number } | { ok: false; message: string };

interface Term {
  value: number;
  /** whether a unit was given, so that `value` is in stored units */
  united: boolean;
}

type Token =
  | { kind: 'number'; value: number }
  | { kind: 'unit'; factor: number; text: string }
  | { kind: 'operator'; text: '+' | '-' | '*' | '/' | '(' | ')' };

class Unreadable extends Error {}

const MIXED = /^(\d+)(?:\s+|-)(\d+)\/(\d+)(?![\d.,])/;
const FRACTION = /^(\d+)\/(\d+)(?![\d.,])/;
const GROUPED = /^\d{1,3}(?:[ \u2009\u202f\u00a0]\d{3})+(?:[.,]\d+)?(?![\d.,/])/;
const PLAIN = /^\d*[.,]?\d+(?:e[+-]?\d+)?/i;

const plainNumber = (text: string): number => {
  const grouped = text.replace(/[ \u2009\u202f\u00a0]/g, '');
  if (/^\d{1,3},\d{3}$/.test(grouped))
    throw new Unreadable(
      `“${text}” can be read two ways: write ${grouped.replace(',', '.')} or ${grouped.replace(',', '')}`,
    );
  return Number(grouped.replace(',', '.'));
};

/** The number that `rest` begins with, and how long it is. */
const numberAt = (rest: string): { value: number; length: number } | undefined => {
  const mixed = MIXED.exec(rest);
  if (mixed) {
    const [text, whole, over, under] = mixed;
    // 38-19/2 takes away; 10-1/2 is ten and a half
    if (Number(over) < Number(under))
      return { value: Number(whole) + Number(over) / Number(under), length: text.length };
  }
  const fraction = FRACTION.exec(rest);
  if (fraction) return { value: Number(fraction[1]) / Number(fraction[2]), length: fraction[0].length };
  const text = (GROUPED.exec(rest) ?? PLAIN.exec(rest))?.[0];
  return text === undefined ? undefined : { value: plainNumber(text), length: text.length };
};

const tidy = (text: string): string =>
  text
    .trim()
    .replace(/[−–]/g, '-')
    .replace(/[′’‘´`]/g, "'")
    .replace(/″|“|”|''/g, '"')
    .replace(/[×·∙]/g, '*')
    .replace(/²/g, '2')
    .replace(/³/g, '3')
    .replace(/½/g, ' 1/2')
    .replace(/¼/g, ' 1/4')
    .replace(/¾/g, ' 3/4')
    .replace(/⅛/g, ' 1/8')
    .replace(/⅜/g, ' 3/8')
    .replace(/⅝/g, ' 5/8')
    .replace(/⅞/g, ' 7/8')
    .trim();

const OPERATORS = new Set(['+', '-', '*', '/', '(', ')']);
const isOperator = (text: string): text is '+' | '-' | '*' | '/' | '(' | ')' => OPERATORS.has(text);

/** The longest unit that `rest` begins with, not running on into further letters. */
const unitAt = (rest: string, spellings: readonly string[]): string | undefined =>
  spellings.find((unit) => {
    if (!rest.toLowerCase().startsWith(unit)) return false;
    const next = rest.charAt(unit.length);
    return !/[a-z]$/i.test(unit) || !/[a-z]/i.test(next) || /^x[\s\d(]/i.test(rest.slice(unit.length));
  });

const tokens = (text: string, units: UnitTable): Token[] => {
  const spellings = [...units.keys()].sort((a, b) => b.length - a.length);
  const out: Token[] = [];
  let rest = tidy(text);
  while (rest !== '') {
    const number = numberAt(rest);
    const after = out.at(-1)?.kind;
    if (number) {
      out.push({ kind: 'number', value: number.value });
      rest = rest.slice(number.length).trimStart();
      continue;
    }
    const unit = after === 'number' ? unitAt(rest, spellings) : undefined;
    if (unit !== undefined) {
      out.push({ kind: 'unit', factor: units.get(unit) ?? 1, text: unit });
      rest = rest.slice(unit.length).trimStart();
      // 7'-10 1/2": the dash joins feet and inches
      if ((unit === "'" || unit === 'ft') && /^-\s*[\d.]+[\d\s/]*("|in)/.test(rest))
        rest = rest.slice(1).trimStart();
      continue;
    }
    const first = rest.charAt(0);
    const operator = /^x(?=[\s\d(.])/i.test(rest) ? '*' : first;
    if (!isOperator(operator)) throw new Unreadable(`“${rest.slice(0, 24)}” is not understood`);
    out.push({ kind: 'operator', text: operator });
    rest = rest.slice(1).trimStart();
  }
  return out;
};

/** Recursive descent over the tokens; `standard` is what the default unit is worth. */
class Reader {
  private at = 0;

  constructor(
    private readonly list: Token[],
    private readonly standard: number,
  ) {}

  all(): Term {
    const term = this.sum();
    if (this.at < this.list.length) throw new Unreadable('the end is not understood');
    return term;
  }

  private operator(...wanted: string[]): string | undefined {
    const token = this.list[this.at];
    if (token?.kind !== 'operator' || !wanted.includes(token.text)) return undefined;
    this.at += 1;
    return token.text;
  }

  private stored(term: Term): number {
    return term.united ? term.value : term.value * this.standard;
  }

  private add(a: Term, b: Term, sign: 1 | -1): Term {
    if (!a.united && !b.united) return { value: a.value + sign * b.value, united: false };
    return { value: this.stored(a) + sign * this.stored(b), united: true };
  }

  private sum(): Term {
    let term = this.product();
    for (;;) {
      const sign = this.operator('+', '-');
      if (sign === undefined) return term;
      term = this.add(term, this.product(), sign === '+' ? 1 : -1);
    }
  }

  private product(): Term {
    let term = this.factor();
    for (;;) {
      const operator = this.operator('*', '/');
      if (operator === undefined) return term;
      const other = this.factor();
      if (other.united && (operator === '/' || term.united))
        throw new Unreadable('only a plain number may multiply or divide');
      term = {
        value: operator === '*' ? term.value * other.value : term.value / other.value,
        united: term.united || other.united,
      };
    }
  }

  private factor(): Term {
    if (this.operator('-') !== undefined) {
      const term = this.factor();
      return { value: -term.value, united: term.united };
    }
    if (this.operator('+') !== undefined) return this.factor();
    if (this.operator('(') !== undefined) {
      const inside = this.sum();
      if (this.operator(')') === undefined) throw new Unreadable('a bracket is not closed');
      return inside;
    }
    let term = this.magnitude();
    // feet and inches, one after the other
    while (term.united && this.list[this.at]?.kind === 'number') {
      const next = this.magnitude();
      if (!next.united) throw new Unreadable('the last number has no unit');
      term = this.add(term, next, 1);
    }
    return term;
  }

  private magnitude(): Term {
    const token = this.list[this.at];
    if (token?.kind !== 'number')
      throw new Unreadable(this.at < this.list.length ? 'a number is missing' : 'it ends too soon');
    this.at += 1;
    const unit = this.list[this.at];
    if (unit?.kind !== 'unit') return { value: token.value, united: false };
    this.at += 1;
    return { value: token.value * unit.factor, united: true };
  }
}

/**
 * Reads `text` as a magnitude in stored units. `standard` is the stored worth of the unit that a bare number
 * has. Answers a sentence fragment that says what was not understood instead of throwing.
 */
export function readExpression(text: string, units: UnitTable, standard: number): Read {
  try {
    const list = tokens(text, units);
    if (list.length === 0) return { ok: false, message: 'nothing is there' };
    const term = new Reader(list, standard).all();
    const value = term.united ? term.value : term.value * standard;
    return Number.isFinite(value) ? { ok: true, value } : { ok: false, message: 'it divides by nothing' };
  } catch (error) {
    if (error instanceof Unreadable) return { ok: false, message: error.message };
    throw error;
  }
}
