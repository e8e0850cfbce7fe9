import { describe, expect, it } from 'vitest';
import { memberDocumentSchema, type MemberInput } from '@shared/schemas/member';
import { placesOf } from '../../server/engine/second-method/fasteners';
import { recalculate } from '../../server/engine/second-method/recalculate';
import { expectNear } from './support';

/** Two boards 235 × 38 laid flat, 100 kg at midspan. */
const twoBoards = (connection: Partial<NonNullable<MemberInput['connections']>[number]> = {}) =>
  memberDocumentSchema.parse({
    schema: 1,
    length: 3600,
    supports: [
      { id: 'A', x: 0, kind: 'pin' },
      { id: 'B', x: 3600, kind: 'roller' },
    ],
    materials: [{ id: 'w', E: 11_000 }],
    pieces: [
      { id: 'P1', material: 'w', y: 0, z: 0, width: 235, depth: 38 },
      { id: 'P2', material: 'w', y: 0, z: 38, width: 235, depth: 38 },
    ],
    connections: [
      {
        pieces: ['P1', 'P2'],
        kind: 'fasteners',
        rows: 2,
        capacity: { basis: 'ultimate', value: 900, factorOfSafety: 2.5 },
        ...connection,
      },
    ],
    loadCases: [{ id: 'Q', action: 'imposed', loads: [{ kind: 'point', x: 1800, value: 100 * 9.80665 }] }],
  } satisfies MemberInput);

describe('Fasteners one by one', () => {
  it('divides a zone evenly, half a real spacing from its ends (contract of the document)', () => {
    expect(placesOf([{ from: 100, to: 700, spacing: 200 }])).toEqual([200, 400, 600]);
  });

  it('two flat boards, 100 kg at midspan: V 490.3 N, q = 1.5V/H = 9.68 N/mm, s = 2·360/q = 74.4 mm (closed form)', () => {
    const one = recalculate(twoBoards()).interfaces[0];
    const q = (1.5 * 490.3325) / 76;
    expectNear(one?.peakFlow.value, q);
    expectNear(one?.requiredSpacing, 720 / q);
    expect(one?.zones.map(({ from, to, spacing }) => [from, to, spacing])).toEqual([[0, 3600, 70]]);
    expectNear(one?.utilisation, (70 * q) / 720);
    expect(one?.fasteners?.count).toBe(104);
    // the middle two share the change of sign; all others take a whole stretch of q
    expectNear(one?.fasteners?.forces[5], (q * (3600 / 52)) / 2);
  });

  it('forces add up to the flange force that goes in and out: (q/V)·2M_max (closed form)', () => {
    const one = recalculate(
      twoBoards({
        zones: [
          { from: 0, to: 1800, spacing: 90 },
          { from: 1800, to: 3600, spacing: 120 },
        ],
      }),
    ).interfaces[0];
    const sum = (one?.fasteners?.forces ?? []).reduce((total, force) => total + 2 * force, 0);
    // one fastener's stretch may pass midspan, where the flow turns about and cancels: (105 − 90)/2 of it each side, twice
    const q = (1.5 * 490.3325) / 76;
    const passing = (60 - 45) / 2;
    expectNear(sum, q * (3600 - 2 * passing));
  });

  it('pinned zones over the demand are over, not refused; their utilisation is spacing over required', () => {
    const one = recalculate(twoBoards({ zones: [{ from: 0, to: 3600, spacing: 120 }] })).interfaces[0];
    expect(one?.status).toBe('over');
    expectNear(one?.utilisation, (120 * (1.5 * 490.3325)) / 76 / 720);
  });
});
