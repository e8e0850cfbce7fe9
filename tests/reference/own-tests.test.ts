import { describe, expect, it } from 'vitest';
import { calculateMember } from '../../server/engine/calculate-member';
import { readToleranceFactors } from './reference-data';

/** Capacity (N) that a two-board member gets from tests of its own. */
function capacityFrom(values: number[], factorOfSafety: number): number {
  const outcome = calculateMember({
    schema: 1,
    length: 3000,
    supports: [
      { id: 'A', x: 0, kind: 'pin' },
      { id: 'B', x: 3000, kind: 'roller' },
    ],
    materials: [{ id: 'w', E: 10500 }],
    pieces: [
      { id: 'P1', material: 'w', y: 0, z: 0, width: 140, depth: 38 },
      { id: 'P2', material: 'w', y: 0, z: 38, width: 140, depth: 38 },
    ],
    connections: [
      { pieces: ['P1', 'P2'], kind: 'fasteners', capacity: { basis: 'test', values, factorOfSafety } },
    ],
    loadCases: [{ id: 'Q', action: 'imposed', loads: [{ kind: 'point', x: 1300, value: 900 }] }],
  });
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.refusal));
  return outcome.result.interfaces[0]?.capacity ?? NaN;
}

describe('k_s of EN 14358, read back from a capacity', () => {
  it.each(readToleranceFactors())('n = $n: $is ($source)', ({ n, is, rel }) => {
    // m_k = exp(ȳ − k_s·s_y) with ȳ, s_y of values spread widely enough that s_y is not held at 0.05
    const logs = Array.from(
      { length: n },
      (_, i) => Math.log(2600) + 0.11 * Math.sin(3.7 * i) + 0.09 * (i % 3),
    );
    const mean = logs.reduce((sum, y) => sum + y, 0) / n;
    const scatter = Math.sqrt(logs.reduce((sum, y) => sum + (y - mean) ** 2, 0) / (n - 1));
    expect(scatter).toBeGreaterThan(0.05);
    const factor = (mean - Math.log(capacityFrom(logs.map(Math.exp), 2.3) * 2.3)) / scatter;
    expect(Math.abs(factor - is)).toBeLessThanOrEqual(rel * is);
  });
});
