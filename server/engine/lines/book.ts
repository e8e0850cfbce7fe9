import type { CalculationLine } from '@shared/schemas/result';

/** A quantity that a formula may use: a figure of the document, or what an earlier line found. */
export interface Term {
  symbol: string;
  value: number;
  /** mathjs units; '' for a pure number */
  unit: string;
  from: string | null;
}

export interface NewLine {
  label: string;
  symbol: string;
  /** a mathjs expression over the inputs */
  formula: string;
  inputs: readonly Term[];
  value: number;
  unit: string;
  source: string;
  interface?: string;
}

/** A figure of the document, or of a step that a line does not spell out. */
export function given(symbol: string, value: number, unit: string): Term {
  return { symbol, value: value === 0 ? 0 : value, unit, from: null };
}

/** The calculation as it is written down: groups with numbered lines. */
export class LineBook {
  readonly lines: CalculationLine[] = [];
  private groupNumber = 0;
  private lineNumber = 0;
  private group = '';

  open(group: string): void {
    this.group = group;
    this.groupNumber++;
    this.lineNumber = 0;
  }

  /** Writes a line and returns its result, for later lines to use under its symbol. */
  write(line: NewLine): Term {
    this.lineNumber++;
    const id = `${this.groupNumber}.${this.lineNumber}`;
    const used = new Map<string, Term>();
    for (const term of line.inputs) used.set(term.symbol, term);
    const value = line.value === 0 ? 0 : line.value;
    this.lines.push({
      id,
      group: this.group,
      label: line.label,
      symbol: line.symbol,
      formula: line.formula,
      substituted: substitute(line.formula, used),
      inputs: [...used.values()],
      value,
      unit: line.unit,
      source: line.source,
      interface: line.interface ?? null,
    });
    return { symbol: line.symbol, value, unit: line.unit, from: id };
  }
}

/** The formula with its numbers, to six figures for reading. */
function substitute(formula: string, terms: ReadonlyMap<string, Term>): string {
  return formula.replace(/[A-Za-z_][A-Za-z0-9_]*/g, (name) => {
    const term = terms.get(name);
    if (!term) return name;
    const shown = figure(term.value);
    return term.value < 0 ? `(${shown})` : shown;
  });
}

function figure(value: number): string {
  if (value === 0) return '0';
  const size = Math.abs(value);
  if (size >= 1e9 || size < 1e-4) {
    const [digits = '', power = ''] = value.toExponential(5).split('e');
    return `${Number(digits)}·10^${Number(power)}`;
  }
  return String(Number(value.toPrecision(6)));
}

/** A sum of products as a formula: each part an expression, those with a minus put so. */
export function sumOf(parts: readonly string[]): string {
  return parts.length === 0 ? '0' : parts.join(' + ').replaceAll('+ -', '- ');
}
