import { describe, expect, it } from 'vitest';
import {
  capacityOf,
  characteristicOfTests,
  logGamma,
  logIncompleteBeta,
  nonCentralT,
  normal,
  strengthOf,
  toleranceFactor,
} from '../../server/engine/second-method/capacity';
import { connectionSchema } from '@shared/schemas/member';
import { off } from './documents';

describe('tolerance limits by series', () => {
  it.each([
    [5, 2.463],
    [6, 2.336],
    [10, 2.104],
    [15, 1.991],
    [20, 1.932],
    [30, 1.869],
    [50, 1.811],
    [100, 1.758],
  ])('k_s of %i specimens is %f (EN 14358:2016, from memory)', (n, k) => {
    // the printed figures have three decimals, cut or rounded
    expect(Math.abs(toleranceFactor(n) - k)).toBeLessThan(0.0006);
  });

  it('k_s of 6 specimens to ten digits (non-central t quantile, by two integrations)', () => {
    expect(off(toleranceFactor(6), 2.3355914902)).toBeLessThan(1e-9);
  });

  it('lower 5 % values of own tests (EN 14358:2016 3.2, from memory)', () => {
    const tests = [2410, 2655, 2230, 2890, 2540, 2375];
    expect(off(characteristicOfTests(tests), 2025.2658379)).toBeLessThan(1e-8);
    expect(off(characteristicOfTests([1500, 1510, 1495, 1505, 1490, 1500]), 1334.6595948)).toBeLessThan(1e-8);
    const capacity = { basis: 'test' as const, values: tests, factorOfSafety: 2.2 };
    expect(off(capacityOf(capacity), 2025.2658379 / 2.2)).toBeLessThan(1e-8);
  });

  it('its parts: Γ(½) = √π, Γ(7) = 720; I_½(a, a) = ½; I_x(1, b) = 1 − (1 − x)^b; Φ(1.6448536) = 0.95 (closed form)', () => {
    expect(logGamma(0.5)).toBeCloseTo(Math.log(Math.PI) / 2, 13);
    expect(logGamma(7)).toBeCloseTo(Math.log(720), 13);
    expect(Math.exp(logIncompleteBeta(3.7, 3.7, 0.5))).toBeCloseTo(0.5, 13);
    expect(Math.exp(logIncompleteBeta(1, 2.3, 0.31))).toBeCloseTo(1 - 0.69 ** 2.3, 13);
    expect(normal(1.6448536269514722)).toBeCloseTo(0.95, 13);
  });

  it('with one degree of freedom and nearly no shift it is Cauchy’s: ½ + atan(t)/π (closed form)', () => {
    expect(nonCentralT(1.3, 1, 1e-9)).toBeCloseTo(0.5 + Math.atan(1.3) / Math.PI, 8);
  });
});

describe('what a connection may carry', () => {
  const strength = (connection: object, contact = 45) =>
    strengthOf(connectionSchema.parse({ pieces: ['a', 'b'], ...connection }), contact);

  it('rows and factor of safety (contract)', () => {
    const found = strength({
      kind: 'fasteners',
      rows: 3,
      capacity: { basis: 'ultimate', value: 900, factorOfSafety: 2.5 },
    });
    expect(found).toEqual({ R: 360, rows: 3, spaced: true, limit: 1080 });
  });

  it('an adhesive over the contact width, a line by itself, a bead in each pitch (contract)', () => {
    const glue = strength({ kind: 'adhesive', capacity: { basis: 'allowable', value: 0.8 } });
    expect(glue.spaced).toBe(false);
    expect(glue.limit).toBeCloseTo(36, 12);
    const line = strength({ kind: 'continuous', capacity: { basis: 'allowable', value: 70 } });
    expect(line).toMatchObject({ spaced: false, limit: 70 });
    const beads = strength({ kind: 'continuous', bead: 40, capacity: { basis: 'allowable', value: 70 } });
    expect(beads).toMatchObject({ spaced: true, limit: 2800 });
  });
});
