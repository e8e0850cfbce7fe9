import { describe, expect, it } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import { fewest, gridBorders, type Zone, type ZoneRules } from '../../server/engine/second-method/schedule';
import { randomFrom } from '../support/random';
import { beamOf, reactionOf, second } from './documents';
import { expectNear } from './support';

/** What the contract settles beyond textbooks: each point by itself, with figures by hand. */

type Loads = NonNullable<MemberInput['loadCases'][number]['loads']>;

const simple = (length: number): MemberInput['supports'] => [
  { id: 'A', x: 0, kind: 'pin' },
  { id: 'B', x: length, kind: 'roller' },
];

describe('Load cases and combinations', () => {
  it('self-weight is ΣAρg over the whole beam', () => {
    const document = beamOf(3000, simple(3000), []);
    const result = second({ ...document, loadCases: [{ id: 'G', action: 'permanent', selfWeight: true }] });
    // 120 × 80 mm of 430 kg/m³
    expectNear(reactionOf(result, 'A').max, (120 * 80 * 430 * 9.80665e-9 * 3000) / 2);
    expectNear(result.section.massPerLength, 120 * 80 * 430e-6);
  });

  it('factors that a combination does not name are nothing; where there is none, all cases count once', () => {
    const loadCases: MemberInput['loadCases'] = [
      { id: 'G', action: 'permanent', loads: [{ kind: 'point', x: 500, value: 800 }] },
      { id: 'Q', action: 'imposed', loads: [{ kind: 'point', x: 1500, value: 300 }] },
    ];
    const document = { ...beamOf(2000, simple(2000), []), loadCases };
    const all = second(document);
    expect(all.reactions.map(({ combination }) => combination)).toEqual(['all', 'all']);
    expectNear(reactionOf(all, 'A').max, 600 + 75);
    const some = second({ ...document, combinations: [{ id: 'K', factors: { Q: -1.5 } }] });
    expectNear(reactionOf(some, 'A').max, -1.5 * 75);
  });

  it('trains of one combination move independently of each other', () => {
    const [P, Q, L] = [900, 1600, 4000];
    const loads = [P, Q].map((value) => ({
      kind: 'moving' as const,
      from: 0,
      to: L,
      axles: [{ offset: 0, value }],
    }));
    const result = second(beamOf(L, simple(L), loads));
    expectNear(reactionOf(result, 'A').max, P + Q);
    expectNear(result.extremes.moment.value, ((P + Q) * L) / 4);
  });
});

describe('Load passed sideways', () => {
  /** 45 and 90 × 220 side by side: two thirds of what is put on the thin one cross. */
  const plies = (loads: Loads) => {
    const [only] = second({
      ...beamOf(3000, simple(3000), loads),
      pieces: [
        { id: 'thin', material: 'w', y: 0, z: 0, width: 45, depth: 220 },
        { id: 'thick', material: 'w', y: 45, z: 0, width: 90, depth: 220 },
      ],
      connections: [
        { pieces: ['thick', 'thin'], kind: 'fasteners', capacity: { basis: 'allowable', value: 900 } },
      ],
    }).interfaces;
    const total = only?.fasteners?.forces.reduce((sum, force) => sum + force, 0);
    return { peak: only?.peakFlow.value, total };
  };

  it('a point load crosses over the depth each side: P·⅔/2H (closed form)', () => {
    const { peak, total } = plies([{ kind: 'point', x: 1300, value: 5000, on: 'thin' }]);
    expectNear(peak, 7.5757575758);
    expectNear(total, (5000 * 2) / 3);
  });

  it('near an end over what is left of that, and no force is lost (closed form)', () => {
    const { peak, total } = plies([{ kind: 'point', x: 50, value: 5000, on: 'thin' }]);
    expectNear(peak, (5000 * 2) / 3 / 270);
    expectNear(total, (5000 * 2) / 3);
  });

  it('an axle like a point load wherever it stands: at the very end over H alone (closed form)', () => {
    const axles = [{ offset: 0, value: 5000 }];
    const { peak } = plies([{ kind: 'moving', from: 0, to: 3000, axles, on: 'thin' }]);
    expectNear(peak, (5000 * 2) / 3 / 220, 1e-6);
  });

  it('crosses from a low ply to two boards while q does: √(q² + t²) (closed form)', () => {
    const result = second({
      ...beamOf(3000, simple(3000), [{ kind: 'uniform', from: 0, to: 3000, value: 4, on: 'c' }]),
      pieces: [
        { id: 'a', material: 'w', y: 0, z: 0, width: 60, depth: 100 },
        { id: 'b', material: 'w', y: 0, z: 100, width: 60, depth: 100 },
        { id: 'c', material: 'w', y: 60, z: 0, width: 60, depth: 50 },
      ],
      connections: [
        { pieces: ['a', 'b'], kind: 'fasteners', capacity: { basis: 'allowable', value: 900 } },
        { pieces: ['a', 'c'], kind: 'fasteners', capacity: { basis: 'allowable', value: 900 } },
      ],
    });
    // z̄ = (200·100 + 50·25)/250 = 85; I/60 = 200³/12 + 200·15² + 50³/12 + 50·60²
    const perWidth = 200 ** 3 / 12 + 200 * 15 ** 2 + 50 ** 3 / 12 + 50 * 60 ** 2;
    const q = (6000 * 50 * 60) / perWidth;
    const kept = 50 ** 3 / (50 ** 3 + 200 ** 3);
    expectNear(result.interfaces[1]?.peakFlow.value, Math.hypot(q, 4 * (1 - kept)), 1e-8);
  });
});

describe('Schedules', () => {
  const rules: ZoneRules = {
    spacingStep: 5,
    spacingMin: 40,
    spacingMax: 300,
    maxZones: 3,
    zoneGrid: 100,
    minZoneLength: 300,
    mirror: false,
  };
  const boards = (loads: Loads, more: Partial<MemberInput> = {}): MemberInput => ({
    ...beamOf(3600, simple(3600), loads),
    pieces: [
      { id: 'lower', material: 'w', y: 0, z: 0, width: 140, depth: 38 },
      { id: 'upper', material: 'w', y: 0, z: 38, width: 140, depth: 38 },
    ],
    ...more,
  });
  const nails = (rows: number, value: number, zones?: Zone[]): MemberInput['connections'] => [
    {
      pieces: ['lower', 'upper'],
      kind: 'fasteners',
      rows,
      capacity: { basis: 'allowable', value },
      ...(zones === undefined ? {} : { zones }),
    },
  ];

  it('two boards under a uniform load: zones, count, first force (closed form: q = 1.5V/H, V = w(L/2 − x))', () => {
    const loads: Loads = [{ kind: 'uniform', from: 0, to: 3600, value: 3 }];
    const document = boards(loads, { connections: nails(2, 6000), rules: { spacingMin: 20 } });
    const [only] = second(document).interfaces;
    // s(0) = 2·6000/(1.5·5400/76) = 112.59, s(900) = 225.19
    expectNear(only?.requiredSpacing, 12_000 / ((1.5 * 5400) / 76));
    expect(only?.zones.map(({ from, to, spacing }) => [from, to, spacing])).toEqual([
      [0, 900, 110],
      [900, 2700, 225],
      [2700, 3600, 110],
    ]);
    expect(only?.fasteners?.count).toBe(2 * (9 + 8 + 9));
    expectNear(only?.fasteners?.positions[0], 50);
    // the first stands for 0 … 100, by two rows
    expectNear(only?.fasteners?.forces[0], ((1.5 / 76) * (5400 * 100 - (3 * 100 ** 2) / 2)) / 2);
  });

  it('at a jump on a border each zone keeps its own side', () => {
    const zones = [
      { from: 0, to: 1200, spacing: 100 },
      { from: 1200, to: 3600, spacing: 100 },
    ];
    const document = boards([{ kind: 'point', x: 1200, value: 3000 }], {
      connections: nails(1, 6000, zones),
    });
    const [only] = second(document).interfaces;
    expectNear(only?.zones[0]?.utilisation, (100 * 1.5 * 2000) / 76 / 6000);
    expectNear(only?.zones[1]?.utilisation, (100 * 1.5 * 1000) / 76 / 6000);
  });

  it('none possible: the least spacing allowed over the required one, and no fasteners', () => {
    const document = boards([{ kind: 'point', x: 1800, value: 60_000 }], {
      connections: nails(2, 6000),
      rules: { spacingMin: 42 },
    });
    const [only] = second(document).interfaces;
    expect(only).toMatchObject({ zones: [], status: 'over', fasteners: { count: 0 } });
    // 42 is no multiple of 5: the least allowed is 45
    expectNear(only?.utilisation, 45 / (12_000 / ((1.5 * 30_000) / 76)));
  });

  it('nothing to carry: the largest spacing allowed', () => {
    expect(fewest(1000, rules, () => 0)).toEqual([{ from: 0, to: 1000, spacing: 300 }]);
  });

  it('no grading needs less than 2(q/V)M_max/R (closed form: the flange force goes in and out)', () => {
    const pieces: MemberInput['pieces'] = [
      { id: 'f', material: 'w', y: 0, z: 0, width: 95, depth: 45 },
      { id: 'm', material: 'w', y: 25, z: 45, width: 45, depth: 220 },
      { id: 'g', material: 'w', y: 0, z: 265, width: 95, depth: 45 },
    ];
    const connection = {
      kind: 'fasteners' as const,
      rows: 2,
      capacity: { basis: 'allowable' as const, value: 400 },
    };
    const document: MemberInput = {
      ...beamOf(4800, simple(4800), [{ kind: 'uniform', from: 0, to: 4800, value: 3 }]),
      pieces,
      connections: [
        { ...connection, pieces: ['f', 'm'] },
        { ...connection, pieces: ['m', 'g'] },
      ],
      rules: { spacingMin: 1, spacingStep: 0.5, spacingMax: 5000, maxZones: 12, minZoneLength: 0 },
    };
    const bound = 127.79538199;
    for (const { cost } of second(document).interfaces) {
      expect(cost).toBeGreaterThan(bound);
      // twelve zones come near it
      expect(cost).toBeLessThan(1.25 * bound);
    }
  });

  it('under mirror the grid runs from both ends to midspan', () => {
    expect(gridBorders(450, rules)).toEqual([0, 100, 200, 300, 400, 450]);
    expect(gridBorders(450, { ...rules, mirror: true })).toEqual([0, 100, 200, 250, 350, 450]);
  });

  it('under mirror no symmetric division costs less, all tried one by one', () => {
    const random = randomFrom(91);
    let some = 0;
    for (let run = 0; run < 60; run += 1) {
      const cells = Array.from({ length: 13 }, () => 1 / random.between(25, 340));
      const given = {
        ...rules,
        mirror: true,
        maxZones: random.whole(1, 6),
        minZoneLength: random.pick(0, 300),
      };
      const demandIn = (from: number, to: number): number =>
        Math.max(...cells.filter((_, i) => (i + 0.5) * 100 > from && (i + 0.5) * 100 < to));
      const found = fewest(1300, given, demandIn);
      const least = cheapestMirrored(1300, given, demandIn);
      expect(found === null).toBe(least === null);
      if (found === null || least === null) continue;
      some += 1;
      const cost = found.reduce((sum, { from, to, spacing }) => sum + (to - from) / spacing, 0);
      expectNear(cost, least);
      expect(found.length).toBeLessThanOrEqual(given.maxZones);
    }
    expect(some).toBeGreaterThan(15);
  });
});

/** Every choice of borders in the left half and the same from the right; null where none holds. */
function cheapestMirrored(
  length: number,
  rules: ZoneRules,
  demandIn: (from: number, to: number) => number,
): number | null {
  const inner: number[] = [];
  for (let x = rules.zoneGrid; x < length / 2 - 1e-6; x += rules.zoneGrid) inner.push(x);
  let least: number | null = null;
  for (let chosen = 0; chosen < 2 ** inner.length; chosen += 1) {
    const left = [0, ...inner.filter((_, i) => (chosen >> i) % 2 === 1)];
    const places = [...left, ...left.map((x) => length - x).reverse()];
    let cost = 0;
    places.slice(1).forEach((to, i) => {
      const from = places[i] ?? NaN;
      const demand = Math.max(demandIn(from, to), demandIn(length - to, length - from));
      let spacing = rules.spacingMax;
      while (spacing * demand > 1 + 1e-9) spacing -= rules.spacingStep;
      const holds = spacing >= rules.spacingMin && to - from >= rules.minZoneLength;
      cost += holds ? (to - from) / spacing : Infinity;
    });
    if (places.length - 1 <= rules.maxZones && cost < (least ?? Infinity)) least = cost;
  }
  return least;
}
