import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import { calculated, expectClose } from './calculated';
import { flowPerShear, bodyOf } from './demand';
import { determinateBeam, fixedLoads, memberOf, runs, type LoadInput, type Section } from './members';
import { cut } from './statics';

/** Plies of one depth side by side, each joined to the next. */
const plies: fc.Arbitrary<Section> = fc
  .record({
    widths: fc.array(
      fc.record({ b: fc.integer({ min: 30, max: 95 }), E: fc.integer({ min: 6000, max: 14000 }) }),
      {
        minLength: 2,
        maxLength: 5,
      },
    ),
    depth: fc.integer({ min: 120, max: 300 }),
    R: fc.integer({ min: 200, max: 3000 }),
    rows: fc.integer({ min: 1, max: 3 }),
  })
  .map(({ widths, depth, R, rows }) => ({
    materials: widths.map(({ E }, i) => ({ id: `m${i}`, name: '', E, density: 430 })),
    pieces: widths.map(({ b }, i) => ({
      id: `p${i}`,
      material: `m${i}`,
      y: widths.slice(0, i).reduce((sum, one) => sum + one.b, 0),
      z: 0,
      width: b,
      depth,
    })),
    connections: widths.slice(1).map((_, i) => ({
      pieces: [`p${i}`, `p${i + 1}`],
      kind: 'fasteners',
      rows,
      capacity: { basis: 'allowable', value: R },
    })),
  }));

/** What a load puts on the beam per length at x, spread as the contract says: points over the depth each side. */
function intensity(load: LoadInput, x: number, depth: number, length: number): number {
  switch (load.kind) {
    case 'uniform':
      return x > load.from && x < load.to ? load.value : 0;
    case 'varying':
      return x > load.from && x < load.to
        ? load.start + ((load.end - load.start) * (x - load.from)) / (load.to - load.from)
        : 0;
    case 'point': {
      const from = Math.max(0, load.x - depth);
      const to = Math.min(length, load.x + depth);
      return x > from && x < to ? load.value / (to - from) : 0;
    }
    default:
      return 0;
  }
}

const isPlain = (load: LoadInput): boolean => load.kind !== 'couple' && load.kind !== 'moving';

const sideLoaded = determinateBeam.chain((beam) =>
  plies.chain((section) =>
    fc
      .record({
        loads: fixedLoads(beam, 4).map((list) => list.filter(isPlain)),
        on: fc.array(fc.integer({ min: -1, max: section.pieces.length - 1 }), { minLength: 4, maxLength: 4 }),
      })
      .map(({ loads, on }) =>
        memberOf(
          beam,
          section,
          loads.map((load, i) => {
            const piece = section.pieces[on[i] ?? -1];
            return piece === undefined ? load : { ...load, on: piece.id };
          }),
          { spacingMin: 1, spacingStep: 1, maxZones: 3 },
        ),
      ),
  ),
);

/** Places to look at: evenly through the beam, and just beside every support and every
 * place where a load or its spread begins or ends. */
function places(member: MemberInput): number[] {
  const depth = Math.max(...member.pieces.map((piece) => piece.z + piece.depth));
  const telling = (member.loadCases[0]?.loads ?? []).flatMap((load) => {
    if (load.kind === 'point') return [load.x - depth, load.x, load.x + depth];
    return load.kind === 'uniform' || load.kind === 'varying' ? [load.from, load.to] : [];
  });
  const even = Array.from({ length: 2000 }, (_, s) => (member.length * (s + 0.5)) / 2000);
  const supports = member.supports.map(({ x }) => x);
  return [
    ...even,
    ...[0, member.length, ...supports, ...telling].flatMap((x) => [x - 1e-6, x + 1e-6]),
  ].filter((x) => x > 0 && x < member.length);
}

/** Vertical force per length that crosses from ply i to ply i+1: what enters on the left less what the left keeps. */
function across(member: MemberInput, i: number, x: number): number {
  const stiffness = member.pieces.map(
    ({ material, width }) => width * (member.materials.find(({ id }) => id === material)?.E ?? NaN),
  );
  const whole = stiffness.reduce((sum, one) => sum + one, 0);
  const kept = stiffness.slice(0, i + 1).reduce((sum, one) => sum + one, 0) / whole;
  const left = new Set(member.pieces.slice(0, i + 1).map(({ id }) => id));
  const depth = member.pieces[0]?.depth ?? NaN;
  return (member.loadCases[0]?.loads ?? []).reduce((sum, load) => {
    if (load.on === undefined) return sum;
    const here = intensity(load, x, depth, member.length);
    return sum + (left.has(load.on) ? here : 0) - kept * here;
  }, 0);
}

describe('load put on one of several plies', () => {
  it('crosses each interface as statics asks, and the zones carry it everywhere', () => {
    fc.assert(
      fc.property(sideLoaded, (member) => {
        const result = calculated(member);
        result.interfaces.forEach((one, i) => {
          let most = 0;
          for (const x of places(member)) {
            const t = Math.abs(across(member, i, x));
            most = Math.max(most, t);
            const zone = one.zones.find(({ from, to }) => x > from && x < to);
            if (zone !== undefined) {
              expect(t * zone.spacing).toBeLessThanOrEqual(one.rows * one.capacity * (1 + 1e-8));
            }
          }
          // linear between those places, so the largest is beside one of them
          expectClose(one.peakFlow.value, most, 1e-6, 'peak', 1e-6);
          expectClose(one.peakFlow.along, 0, 1, 'plies of one height have no flow along');
          expectClose(Math.abs(one.peakFlow.across), one.peakFlow.value, 1e-9, 'all of it across');
        });
      }),
      runs(60),
    );
  });

  it('together with flow along the beam: the resultant', () => {
    const joist = determinateBeam.chain((beam) =>
      fc.record({
        beam: fc.constant(beam),
        loads: fixedLoads(beam, 3).map((list) => list.filter(isPlain)),
        depth: fc.integer({ min: 150, max: 280 }),
        low: fc.integer({ min: 40, max: 110 }),
      }),
    );
    fc.assert(
      fc.property(joist, ({ beam, loads, depth, low }) => {
        const section: Section = {
          materials: [{ id: 'w', name: '', E: 10_300, density: 430 }],
          pieces: [
            { id: 'joist', material: 'w', y: 0, z: 0, width: 48, depth },
            { id: 'ledger', material: 'w', y: 48, z: 0, width: 36, depth: low },
          ],
          connections: [
            {
              pieces: ['joist', 'ledger'],
              kind: 'fasteners',
              rows: 2,
              capacity: { basis: 'allowable', value: 870 },
            },
          ],
        };
        const member = memberOf(
          beam,
          section,
          loads.map((load) => ({ ...load, on: 'ledger' })),
          { spacingMin: 1, spacingStep: 1, maxZones: 4 },
        );
        const result = calculated(member);
        const [one] = result.interfaces;
        if (one === undefined) throw new Error('no interface');
        // each a stack of its own: shares go with width·depth³
        const share = (48 * depth ** 3) / (48 * depth ** 3 + 36 * low ** 3);
        const body = bodyOf(member, result);
        let most = 0;
        for (const x of places(member)) {
          const q = flowPerShear(result, one) * cut(body, x, 'right').V;
          const t = share * loads.reduce((sum, load) => sum + intensity(load, x, depth, member.length), 0);
          const resultant = Math.hypot(q, t);
          most = Math.max(most, resultant);
          const zone = one.zones.find(({ from, to }) => x > from && x < to);
          if (zone !== undefined) expect(resultant * zone.spacing).toBeLessThanOrEqual(2 * 870 * (1 + 1e-8));
        }
        expect(one.peakFlow.value).toBeGreaterThanOrEqual(most * (1 - 1e-9));
        expect(one.peakFlow.value).toBeLessThanOrEqual(most * 1.001 + 1e-6);
        expectClose(
          Math.hypot(one.peakFlow.along, one.peakFlow.across),
          one.peakFlow.value,
          1e-9,
          'resultant',
        );
      }),
      runs(60),
    );
  });

  it('a point load’s crossing adds up to the other plies’ share of it, wherever it stands', () => {
    fc.assert(
      fc.property(plies, fc.integer({ min: 0, max: 100 }), (section, percent) => {
        const beam = {
          length: 3000,
          supports: [
            { id: 'A', x: 0, kind: 'pin' as const },
            { id: 'B', x: 3000, kind: 'roller' as const },
          ],
          hinges: [],
        };
        const value = 4321;
        const member = memberOf(beam, section, [{ kind: 'point', x: 30 * percent, value, on: 'p0' }], {
          spacingMin: 1,
          spacingMax: 10,
          spacingStep: 1,
        });
        const result = calculated(member);
        const stiffness = section.pieces.map(
          ({ material, width }) => width * (section.materials.find(({ id }) => id === material)?.E ?? NaN),
        );
        const others = 1 - (stiffness[0] ?? NaN) / stiffness.reduce((sum, one) => sum + one, 0);
        const first = result.interfaces[0];
        if (first === undefined || first.zones.length === 0) return;
        const sum = (first.fasteners?.forces ?? []).flat().reduce((total, force) => total + force, 0);
        expectClose(sum, value * others, 1, 'Σ of the fasteners’ forces', 1e-9);
      }),
      runs(60),
    );
  });
});
