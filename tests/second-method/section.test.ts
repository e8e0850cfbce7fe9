import { describe, expect, it } from 'vitest';
import { memberDocumentSchema, type MemberInput } from '@shared/schemas/member';
import { leastEnergyFlows } from '../../server/engine/second-method/flows';
import { recalculate } from '../../server/engine/second-method/recalculate';
import { expectNear } from './support';

type PieceInput = MemberInput['pieces'][number];
type ConnectionInput = NonNullable<MemberInput['connections']>[number];

const piece = (
  id: string,
  y: number,
  z: number,
  width: number,
  depth: number,
  material = 'w',
): PieceInput => ({
  id,
  material,
  y,
  z,
  width,
  depth,
});

const nails = (a: string, b: string, slipModulus?: number): ConnectionInput => ({
  pieces: [a, b],
  kind: 'fasteners',
  rows: 1,
  capacity: { basis: 'allowable', value: 1000 },
  ...(slipModulus === undefined ? {} : { slipModulus }),
});

function sectionOf(pieces: PieceInput[], connections: ConnectionInput[], on?: string) {
  const document = memberDocumentSchema.parse({
    schema: 1,
    length: 3000,
    supports: [
      { id: 'A', x: 0, kind: 'pin' },
      { id: 'B', x: 3000, kind: 'roller' },
    ],
    materials: [
      { id: 'w', E: 10_000, density: 400 },
      { id: 'soft', E: 5000, density: 600 },
    ],
    pieces,
    connections,
    loadCases: [
      {
        id: 'Q',
        action: 'imposed',
        loads: [{ kind: 'uniform', from: 0, to: 3000, value: 3, ...(on === undefined ? {} : { on }) }],
      },
    ],
  } satisfies MemberInput);
  return recalculate(document);
}

describe('Sections by strips, against closed forms', () => {
  it('n equal boards of depth H: q/V = 6/H·(j/n)(1 − j/n) at joint j, I = bH³/12 (closed form)', () => {
    const boards = [0, 1, 2, 3].map((i) => piece(`P${i}`, 0, 30 * i, 150, 30));
    const { section } = sectionOf(boards, [nails('P0', 'P1'), nails('P1', 'P2'), nails('P2', 'P3')]);
    expectNear(section.I, (150 * 120 ** 3) / 12);
    expectNear(section.EA, 10_000 * 150 * 120);
    expectNear(section.centroid, 60);
    expectNear(section.massPerLength, 400 * 0.15 * 0.12);
    [1, 2, 3].forEach((j, i) => {
      expectNear(section.interfaces[i]?.flowPerShear, (6 / 120) * (j / 4) * (1 - j / 4));
      // Q = b·(jh)·(H − jh)/2
      expectNear(section.interfaces[i]?.firstMoment, (150 * 30 * j * (120 - 30 * j)) / 2);
    });
  });

  it('a T of two woods: EI₁ + EI₂ + (EA)*a², q/V = (EA)*a/EI (closed form)', () => {
    const { section } = sectionOf(
      [piece('web', -20, 0, 40, 200), piece('flange', -75, 200, 150, 30, 'soft')],
      [nails('web', 'flange')],
    );
    const [EA1, EA2] = [10_000 * 40 * 200, 5000 * 150 * 30];
    const a = 115;
    const both = (EA1 * EA2) / (EA1 + EA2);
    const EI = (10_000 * 40 * 200 ** 3) / 12 + (5000 * 150 * 30 ** 3) / 12 + both * a ** 2;
    expectNear(section.EI, EI);
    expectNear(section.centroid, (EA1 * 100 + EA2 * 215) / (EA1 + EA2));
    expectNear(section.interfaces[0]?.flowPerShear, (both * a) / EI);
  });

  /** Flanges 100 × 40 between webs 15 × 300. */
  const boxPieces = [
    piece('bottom', 15, 0, 100, 40),
    piece('top', 15, 260, 100, 40),
    piece('left', 0, 0, 15, 300),
    piece('right', 115, 0, 15, 300),
  ];
  const boxI = (2 * 15 * 300 ** 3) / 12 + 2 * ((100 * 40 ** 3) / 12 + 4000 * 130 ** 2);

  it('a symmetric box of equal stiffness: each joint takes half a flange’s flow (closed form)', () => {
    const { section } = sectionOf(boxPieces, [
      nails('top', 'left'),
      nails('top', 'right'),
      nails('bottom', 'left'),
      nails('bottom', 'right'),
    ]);
    expect(section.interfaces.map(({ id, orientation }) => [id, orientation])).toEqual(
      ['J1', 'J2', 'J3', 'J4'].map((id) => [id, 'vertical']),
    );
    for (const { flowPerShear, firstMoment } of section.interfaces) {
      expectNear(flowPerShear, (4000 * 130) / boxI / 2);
      expect(firstMoment).toBeNull();
    }
  });

  it('a box of unlike stiffness: left web takes (1/k_TR + 1/k_BR)/Σ(1/k) of each flange (force method)', () => {
    const [kTL, kTR, kBL, kBR] = [1000, 600, 2500, 400];
    const { section } = sectionOf(boxPieces, [
      nails('top', 'left', kTL),
      nails('top', 'right', kTR),
      nails('bottom', 'left', kBL),
      nails('bottom', 'right', kBR),
    ]);
    const part = (1 / kTR + 1 / kBR) / (1 / kTL + 1 / kTR + 1 / kBL + 1 / kBR);
    const flange = (4000 * 130) / boxI;
    // numbered by the earlier piece, then the later: bottom-left, bottom-right, top-left, top-right
    const flows = section.interfaces.map(({ flowPerShear }) => flowPerShear);
    expectNear(flows[0], flange * part);
    expectNear(flows[1], flange * (1 - part));
    expectNear(flows[2], flange * part);
    expectNear(flows[3], flange * (1 - part));
  });

  it('three equal plies, load on an outer one: 2p/3 and p/3 cross, nothing along (closed form)', () => {
    const plies = [0, 1, 2].map((i) => piece(`P${i}`, 45 * i, 0, 45, 200));
    const result = sectionOf(plies, [nails('P0', 'P1'), nails('P1', 'P2')], 'P0');
    expect(result.section.interfaces.map(({ flowPerShear }) => Math.abs(flowPerShear) < 1e-18)).toEqual([
      true,
      true,
    ]);
    expectNear(result.interfaces[0]?.peakFlow.value, 2);
    expectNear(result.interfaces[1]?.peakFlow.value, 1);
  });

  it('a ring of resistors: currents as 1 : 2 where one way is twice as long (Kirchhoff)', () => {
    const edges = [
      { a: 0, b: 1, k: 3 },
      { a: 1, b: 2, k: 3 },
      { a: 0, b: 2, k: 3 },
    ];
    const flows = leastEnergyFlows(3, edges, [6, 0, -6]);
    expectNear(flows[0], 2);
    expectNear(flows[1], 2);
    expectNear(flows[2], 4);
  });
});
