import type { MemberInput } from '@shared/schemas/member';

/** What is doubled, one at a time, to see how the cost grows. */
export interface Size {
  spans: number;
  cases: number;
  combinations: number;
  pieces: number;
}

/** About the heavy member's size, so that what is doubled is a good part of the whole. */
export const baseSize: Size = { spans: 6, cases: 8, combinations: 24, pieces: 7 };

const SPAN = 3600;

/**
 * A stack of boards over equal spans. The first case is dead load, the last one a train of three axles, the
 * others imposed loads, each on its own stretch and with a point load of its own. Every combination takes all
 * cases at rest, with factors of its own; every third one adds the train.
 */
export function generateMember(size: Size): MemberInput {
  const length = size.spans * SPAN;
  const imposed = size.cases - 2;
  const pieces = Array.from({ length: size.pieces }, (_, i) => ({
    id: `P${i + 1}`,
    material: 'plank',
    y: 0,
    z: i * 40,
    width: 240,
    depth: 40,
  }));
  return {
    schema: 1,
    title: `${size.spans} spans, ${size.cases} cases, ${size.combinations} combinations, ${size.pieces} pieces`,
    length,
    supports: Array.from({ length: size.spans + 1 }, (_, i) => ({
      id: `S${i}`,
      x: i * SPAN,
      kind: i === 0 ? 'pin' : 'roller',
    })),
    materials: [{ id: 'plank', name: 'Spruce plank', E: 11000, density: 420 }],
    pieces,
    connections: pieces.slice(1).map((piece, i) => ({
      pieces: [`P${i + 1}`, piece.id],
      kind: 'fasteners',
      rows: 3,
      capacity: { basis: 'allowable', value: 1150 },
    })),
    loadCases: [
      {
        id: 'G',
        action: 'permanent',
        selfWeight: true,
        loads: [{ kind: 'uniform', from: 0, to: length, value: 0.9 }],
      },
      ...Array.from({ length: imposed }, (_, i) => {
        const from = (length * i) / imposed;
        const to = (length * (i + 1)) / imposed;
        return {
          id: `Q${i + 1}`,
          action: 'imposed' as const,
          loads: [
            { kind: 'uniform' as const, from, to, value: 1.7 },
            { kind: 'point' as const, x: (from + to) / 2, value: 1450 },
          ],
        };
      }),
      {
        id: 'T',
        action: 'imposed',
        loads: [
          {
            kind: 'moving',
            from: -2600,
            to: length,
            axles: [
              { offset: 0, value: 2100 },
              { offset: 1150, value: 2700 },
              { offset: 2600, value: 1900 },
            ],
          },
        ],
      },
    ],
    combinations: Array.from({ length: size.combinations }, (_, c) => ({
      id: `C${c + 1}`,
      factors: Object.fromEntries([
        ['G', 1],
        ...Array.from({ length: imposed }, (_, i) => [`Q${i + 1}`, ((c + i) % 4) / 3] as const),
        ...(c % 3 === 2 ? [['T', 1] as const] : []),
      ]),
      duration: 'short-term',
    })),
    rules: { spacingMin: 30, maxZones: 6, minZoneLength: 400 },
  };
}

/** Two boards laid flat under a worker: the smallest member that anybody draws up. */
export const twoBoards: MemberInput = {
  schema: 1,
  title: 'Two boards under a worker',
  length: 3600,
  supports: [
    { id: 'A', x: 0, kind: 'pin' },
    { id: 'B', x: 3600, kind: 'roller' },
  ],
  materials: [{ id: 'board', name: 'Spruce board', E: 11000, density: 420 }],
  pieces: [
    { id: 'P1', material: 'board', y: 0, z: 0, width: 235, depth: 38 },
    { id: 'P2', material: 'board', y: 0, z: 38, width: 235, depth: 38 },
  ],
  connections: [
    {
      pieces: ['P1', 'P2'],
      kind: 'fasteners',
      rows: 2,
      capacity: { basis: 'ultimate', value: 900, factorOfSafety: 2.5 },
    },
  ],
  loadCases: [
    {
      id: 'G',
      action: 'permanent',
      selfWeight: true,
      loads: [{ kind: 'uniform', from: 0, to: 3600, value: 0.4 }],
    },
    {
      id: 'W',
      action: 'construction',
      loads: [{ kind: 'moving', from: 0, to: 3600, axles: [{ offset: 0, value: 981 }] }],
    },
  ],
};
