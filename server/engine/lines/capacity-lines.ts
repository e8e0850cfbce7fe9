import type { Capacity } from '@shared/schemas/member';
import type { WorkedCapacity } from '../capacity/capacity';
import { given, sumOf, type LineBook, type Term } from './book';

const units = { fasteners: 'N', adhesive: 'MPa', continuous: 'N/mm' } as const;
const words = {
  fasteners: 'one fastener',
  adhesive: 'one mm² of adhesive',
  continuous: 'one mm of line',
} as const;

/** R from its basis, line by line. Test values are taken in the unit of R, as pure numbers for the logarithm. */
export function capacityLines(
  book: LineBook,
  id: string,
  kind: keyof typeof units,
  capacity: Capacity,
  worked: WorkedCapacity,
): Term {
  const unit = units[kind];
  const write = (
    label: string,
    symbol: string,
    formula: string,
    inputs: Term[],
    value: number,
    of: string,
    source: string,
  ): Term => book.write({ label, symbol, formula, inputs, value, unit: of, source, interface: id });
  const label = `Capacity of ${words[kind]} at ${id}`;
  if (capacity.basis === 'allowable') {
    return write(
      label,
      'R',
      'F',
      [given('F', capacity.value, unit)],
      worked.value,
      unit,
      'Allowable value as entered',
    );
  }
  if (capacity.basis === 'ultimate') {
    return write(
      label,
      'R',
      'F / FS',
      [given('F', capacity.value, unit), given('FS', capacity.factorOfSafety, '')],
      worked.value,
      unit,
      'Ultimate value over the factor of safety, both as entered',
    );
  }
  const { statistics } = worked;
  if (capacity.basis !== 'test' || !statistics) throw new Error('no lines for this basis');
  const standard = 'EN 14358:2016, 3.2, lognormal (from memory)';
  const x = capacity.values.map((v, i) => given(`x_${i + 1}`, v, ''));
  const y = write(
    `Mean of the logarithms of the ${statistics.n} test values, in ${unit}`,
    'y_mean',
    `(${sumOf(x.map((t) => `log(${t.symbol})`))}) / ${x.length}`,
    x,
    statistics.mean,
    '',
    standard,
  );
  const s = write(
    'Their standard deviation',
    's_y',
    `sqrt((${sumOf(x.map((t) => `(log(${t.symbol}) - y_mean)^2`))}) / ${x.length - 1})`,
    [...x, y],
    statistics.deviation,
    '',
    standard,
  );
  const used = write(
    'The deviation used, at least 0.05',
    's_used',
    'max(s_y, 0.05)',
    [s],
    statistics.used,
    '',
    standard,
  );
  const factor = given('k_s', statistics.ks, '');
  const m = write(
    `Lower 5 % value at 75 % confidence (k_s: non-central t quantile over √n, n = ${statistics.n})`,
    'm_k',
    'exp(y_mean - k_s * s_used) * unit_R',
    [y, factor, used, given('unit_R', 1, unit)],
    statistics.characteristic,
    unit,
    standard,
  );
  return write(
    label,
    'R',
    'm_k / FS',
    [m, given('FS', capacity.factorOfSafety, '')],
    worked.value,
    unit,
    'Factor of safety as entered',
  );
}
