import { describe, expect, it } from 'vitest';
import {
  formatFigures,
  formatForField,
  formatNumber,
  formatQuantity,
  formatWithUnit,
  parseNumber,
  parseQuantity,
  unitOf,
} from './units';
import type { Quantity, UnitSystem } from './units';

const read = (text: string, quantity: Quantity, system: UnitSystem = 'metric'): number => {
  const answer = parseQuantity(text, quantity, system);
  if (!answer.ok) throw new Error(answer.message);
  return answer.value;
};
const refused = (text: string, quantity: Quantity, system: UnitSystem = 'metric'): string => {
  const answer = parseQuantity(text, quantity, system);
  return answer.ok ? `read as ${answer.value}` : answer.message;
};

describe('lengths as people type them', () => {
  // by definition 1 in = 25.4 mm, 1 ft = 12 in (international yard and pound agreement, 1959)
  it.each([
    ['2400', 2400],
    ['2 400', 2400],
    ['2\u202f400', 2400],
    ['2.4 m', 2400],
    ['2,4 m', 2400],
    ['2.4m', 2400],
    ['240 cm', 2400],
    [`7' 10 1/2"`, 94.5 * 25.4],
    [`7'-10 1/2"`, 94.5 * 25.4],
    [`7’ 10½”`, 94.5 * 25.4],
    ['7′ 10 1/2″', 94.5 * 25.4],
    [`7'10-1/2"`, 94.5 * 25.4],
    ['7 ft 10.5 in', 94.5 * 25.4],
    ['94.5 in', 94.5 * 25.4],
    ['94 1/2 in', 94.5 * 25.4],
    ['1/2"', 12.7],
    ['.5 in', 12.7],
    [`6'`, 6 * 304.8],
    ['2x38+12', 88],
    ['2 × 38 + 12', 88],
    ['2x1.5in+12', 2 * 38.1 + 12],
    ['3*(45+3)', 144],
    ['2.4 m - 100', 2300],
    ['3600/2', 1800],
    ['38-19/2', 28.5],
    ['−40', -40],
    ['-40', -40],
    ['1e3', 1000],
  ])('%s', (text, millimetres) => {
    expect(read(text, 'length')).toBeCloseTo(millimetres, 9);
  });

  it('takes a bare number as inches from somebody who works in feet and inches', () => {
    expect(read('94.5', 'length', 'us')).toBeCloseTo(2400.3, 9);
    expect(read('2x1 1/2', 'size', 'us')).toBeCloseTo(76.2, 9);
    expect(read('2400 mm', 'length', 'us')).toBe(2400);
  });

  it('says what is not understood, and what would do', () => {
    expect(refused('twelve', 'length')).toContain('“twelve” is not understood');
    expect(refused('twelve', 'length')).toContain('2400');
    expect(refused('2,400', 'length')).toContain('2.400 or 2400');
    expect(refused('', 'length')).toMatch(/nothing is there/i);
    expect(refused('3 m x 2 m', 'length')).toMatch(/only a plain number/i);
    expect(refused('(3 + 2', 'length')).toMatch(/bracket/i);
    expect(refused('12 +', 'length')).toMatch(/ends too soon/i);
    expect(refused('1/0', 'length')).toMatch(/divides by nothing/i);
    expect(refused(`7' 10`, 'length')).toMatch(/no unit/i);
    expect(refused('5 kN', 'length')).toContain('kN');
    expect(refused('NaN', 'length')).toContain('not understood');
    expect(refused('Infinity', 'length')).toContain('not understood');
  });
});

describe('other quantities', () => {
  // 1 lb = 0.45359237 kg by definition, standard gravity 9.80665 m/s² by definition
  const pound = 0.45359237 * 9.80665;
  it.each<[string, Quantity, number]>([
    ['900', 'force', 900],
    ['12 kN', 'force', 12_000],
    ['100 kg', 'force', 980.665],
    ['250 lb', 'force', 250 * pound],
    ['1.2 kip', 'force', 1200 * pound],
    ['50 plf', 'lineLoad', (50 * pound) / 304.8],
    ['0.9 kN/m', 'lineLoad', 0.9],
    ['900 N/m', 'lineLoad', 0.9],
    ['70 lb/in', 'flow', (70 * pound) / 25.4],
    ['11 GPa', 'stress', 11_000],
    ['0.8 N/mm²', 'stress', 0.8],
    ['1.6e6 psi', 'stress', (1.6e6 * pound) / 25.4 ** 2],
    ['200', 'moment', 200_000],
    ['0.2 kNm', 'moment', 200_000],
    ['0.2 kN·m', 'moment', 200_000],
    ['150 lb-ft', 'moment', 150 * pound * 304.8],
    ['0.8 kN/mm', 'stiffness', 800],
    ['420', 'density', 420],
    ['26 pcf', 'density', (26 * 0.45359237) / 0.3048 ** 3],
  ])('%s of %s', (text, quantity, stored) => {
    expect(read(text, quantity) / stored).toBeCloseTo(1, 12);
  });

  it('reads plain numbers, and refuses units there', () => {
    expect(parseNumber('2.5')).toEqual({ ok: true, value: 2.5 });
    expect(parseNumber('2,5')).toEqual({ ok: true, value: 2.5 });
    expect(parseNumber('2 mm')).toMatchObject({ ok: false });
  });
});

describe('formatting', () => {
  it('groups by thin spaces, with a real minus', () => {
    expect(formatNumber(1174)).toBe('1\u202f174');
    expect(formatNumber(-1461)).toBe('\u22121\u202f461');
    expect(formatNumber(1234567.891, 2)).toBe('1\u202f234\u202f567.89');
    expect(formatNumber(-0.2)).toBe('0');
  });

  it('keeps three figures or so', () => {
    expect(formatFigures(4.617)).toBe('4.62');
    expect(formatFigures(48.31)).toBe('48.3');
    expect(formatFigures(99.97)).toBe('100');
    expect(formatFigures(0.038251)).toBe('0.0383');
    expect(formatFigures(0)).toBe('0');
    expect(formatFigures(152_100_000)).toBe('152 · 10⁶');
  });

  it('writes feet, inches and sixteenths', () => {
    expect(formatQuantity(2400.3, 'length', 'us')).toBe('7′ 10 1/2″');
    expect(formatQuantity(1219.2, 'length', 'us')).toBe('4′');
    expect(formatQuantity(-25.4, 'length', 'us')).toBe('\u22121″');
    expect(formatQuantity(38.1, 'size', 'us')).toBe('1 1/2″');
    expect(formatQuantity(3.1, 'size', 'us')).toBe('0.122″');
    expect(formatQuantity(-0.001, 'size', 'us')).toBe('0″');
    expect(formatQuantity(-3.1, 'size', 'us')).toBe('\u22120.122″');
    expect(formatQuantity(304.79, 'length', 'us')).toBe('1′');
    expect(formatWithUnit(2400, 'length', 'metric')).toBe('2\u202f400\u00a0mm');
    expect(formatWithUnit(62.5, 'size', 'metric')).toBe('62.5\u00a0mm');
    expect(unitOf('lineLoad', 'us')).toBe('lb/ft');
  });

  it('shows in a field nothing that reading it again would change by more than a hair', () => {
    const cases: [number, Quantity][] = [
      [2400, 'length'],
      [2400.3, 'length'],
      [38, 'size'],
      [38.1, 'size'],
      [3.1, 'size'],
      [900, 'force'],
      [0.9, 'lineLoad'],
      [11_000, 'stress'],
      [1, 'stiffness'],
      [0.000123, 'flow'],
    ];
    for (const system of ['metric', 'us'] as const)
      for (const [value, quantity] of cases) {
        const shown = formatForField(value, quantity, system);
        expect(read(shown, quantity, system) / value, `${shown} ${quantity} ${system}`).toBeCloseTo(1, 5);
      }
  });
});
