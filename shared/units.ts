import { INCH, quantities } from './quantities';
import type { Quantity, UnitSystem } from './quantities';
import { readExpression } from './quantity-expression';
import type { Read } from './quantity-expression';

/**
 * The two edges at which units are converted: what people type, and what they read. Everything between holds the
 * contract's units: N, mm, MPa, N/mm, N·mm, kg/m³.
 */
export type { Quantity, UnitSystem };
export { GRAVITY, POUND } from './quantities';

/** U+202F keeps figures of one number on one line; looks are those of a thin space. */
export const THIN = '\u202f';
export const MINUS = '\u2212';

/** The unit that a bare number of this quantity has for a person of this system; lengths of a beam say ft-in. */
export function unitOf(quantity: Quantity, system: UnitSystem): string {
  return quantities[quantity][system].unit;
}

/**
 * Reads what somebody typed into stored units. A bare number is in the person's own unit (`unitOf`). Where it
 * cannot be read the answer says why and what would do.
 */
export function parseQuantity(text: string, quantity: Quantity, system: UnitSystem): Read {
  const { units, like, [system]: shown } = quantities[quantity];
  const read = readExpression(text, units, shown.factor);
  if (read.ok) return read;
  return { ok: false, message: `${capital(read.message)}: write it like ${like[system]}` };
}

/** Reads a plain number (a factor, a count): sums and fractions are understood, units are not. */
export function parseNumber(text: string): Read {
  const read = readExpression(text, new Map(), 1);
  return read.ok ? read : { ok: false, message: `${capital(read.message)}: write a plain number` };
}

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** Digits in groups of three with thin spaces and a real minus; `decimals` fixed. */
export function formatNumber(value: number, decimals = 0): string {
  const fixed = Math.abs(value).toFixed(decimals);
  const [whole = '0', part] = fixed.split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, THIN);
  const sign = value < 0 && Number(fixed) !== 0 ? MINUS : '';
  return sign + grouped + (part === undefined ? '' : `.${part}`);
}

/** Three figures or so, the way one says a number aloud: 1 174, 48.3, 4.62, 0.038. */
export function formatFigures(value: number): string {
  const size = Math.abs(value);
  if (size === 0 || size < 1e-9) return '0';
  if (size >= 1e6 && size < 1e7) return formatNumber(Math.round(value / 1000) * 1000);
  if (size >= 1e7) {
    const power = Math.floor(Math.log10(size) / 3) * 3;
    return `${formatFigures(value / 10 ** power)} · 10${superscript(power)}`;
  }
  const decimals =
    size >= 99.95
      ? 0
      : size >= 9.995
        ? 1
        : size >= 0.0995
          ? 2
          : Math.min(8, 2 - Math.floor(Math.log10(size)));
  return formatNumber(value, decimals);
}

const superscript = (power: number): string =>
  Array.from(String(power))
    .map((digit) => '⁰¹²³⁴⁵⁶⁷⁸⁹'.charAt(Number(digit)))
    .join('');

/** As many decimals as the number has, up to nine figures, without trailing noughts. */
export function formatExact(value: number): string {
  const rounded = Number(value.toPrecision(9));
  if (rounded !== 0 && (Math.abs(rounded) >= 1e15 || Math.abs(rounded) < 1e-7)) return String(rounded);
  const decimals = /\.(\d+)$/.exec(String(rounded))?.[1]?.length ?? /e-(\d+)$/.exec(String(rounded))?.[1];
  return formatNumber(rounded, Number(decimals ?? 0));
}

const divisor = (a: number, b: number): number => (b === 0 ? a : divisor(b, a % b));

/** Inches as whole and sixteenths: `10 1/2″`, `5/16″`. */
const inchesInSixteenths = (sixteenths: number): string => {
  const whole = Math.floor(sixteenths / 16);
  const over = sixteenths % 16;
  if (over === 0) return `${formatNumber(whole)}″`;
  const common = divisor(over, 16);
  return `${whole === 0 ? '' : `${formatNumber(whole)} `}${over / common}/${16 / common}″`;
};

const formatFeet = (value: number): string => {
  const sixteenths = Math.round((Math.abs(value) / INCH) * 16);
  const feet = Math.floor(sixteenths / 192);
  const rest = sixteenths - feet * 192;
  const sign = value < 0 && sixteenths > 0 ? MINUS : '';
  if (feet === 0) return sign + inchesInSixteenths(rest);
  return `${sign}${formatNumber(feet)}′${rest === 0 ? '' : ` ${inchesInSixteenths(rest)}`}`;
};

/** Inches: a fraction where it is one to within 0.02 mm, else decimals. */
const formatInches = (value: number): string => {
  const inches = Math.abs(value) / INCH;
  const sixteenths = Math.round(inches * 16);
  const sign = value < 0 && inches >= 0.0005 ? MINUS : '';
  if (Math.abs(sixteenths / 16 - inches) * INCH < 0.02) return sign + inchesInSixteenths(sixteenths);
  return `${sign}${formatNumber(inches, inches >= 10 ? 1 : inches >= 1 ? 2 : 3)}″`;
};

const formatMillimetres = (value: number): string => {
  const size = Math.abs(value);
  const decimals = Math.abs(value - Math.round(value)) < 0.05 ? 0 : size < 1 ? 2 : 1;
  return formatNumber(value, decimals);
};

/**
 * A stored value in the person's units, rounded for reading, without its unit; lengths in US units carry their own
 * marks (7′ 10 1/2″).
 */
export function formatQuantity(value: number, quantity: Quantity, system: UnitSystem): string {
  if (quantity === 'length') return system === 'us' ? formatFeet(value) : formatMillimetres(value);
  if (quantity === 'size') return system === 'us' ? formatInches(value) : formatMillimetres(value);
  return formatFigures(value / quantities[quantity][system].factor);
}

/** The same with its unit behind it; a length in feet and inches needs none. */
export function formatWithUnit(value: number, quantity: Quantity, system: UnitSystem): string {
  const text = formatQuantity(value, quantity, system);
  if (system === 'us' && (quantity === 'length' || quantity === 'size')) return text;
  return `${text}\u00a0${unitOf(quantity, system)}`;
}

/** What a field shows of a stored value: nothing rounded away that typing it again would lose, unit not repeated. */
export function formatForField(value: number, quantity: Quantity, system: UnitSystem): string {
  if (system === 'us' && quantity === 'length') {
    const sixteenths = (value / INCH) * 16;
    if (Math.abs(sixteenths - Math.round(sixteenths)) < 1e-6) return formatFeet(value);
  }
  if (system === 'us' && quantity === 'size') {
    const sixteenths = (value / INCH) * 16;
    if (Math.abs(sixteenths - Math.round(sixteenths)) < 1e-6) return formatInches(value).replace('″', '');
  }
  const shown = value / quantities[quantity][system].factor;
  return formatExact(system === 'us' ? Number(shown.toPrecision(6)) : shown);
}
