import { describe, expect, it } from 'vitest';
import type { MemberDocument } from '@shared/schemas/member';
import { buildModel } from '../../server/engine/second-method/model';
import { recalculate } from '../../server/engine/second-method/recalculate';
import { boardMember, EI, expectNear } from './support';

const pinned = (length: number) => [
  { id: 'A', x: 0, kind: 'pin' as const },
  { id: 'B', x: length, kind: 'roller' as const },
];

/** V, M and w at rest at x, and the reactions, of the only case. */
function solved(document: MemberDocument) {
  const still = buildModel(document).cases[0]?.still;
  if (still === undefined) throw new Error('no case');
  return still;
}

const L = 3000;
const w = 2;
const P = 5000;

describe('Beams at rest, against closed forms', () => {
  it('uniform load, simple span: wL/2, wL²/8, 5wL⁴/384EI (closed form)', () => {
    const still = solved(boardMember(L, pinned(L), [{ kind: 'uniform', from: 0, to: L, value: w }]));
    expectNear(still.reactions[0]?.force, (w * L) / 2);
    expectNear(still.at(L / 2).moment, (w * L ** 2) / 8);
    expectNear(still.at(L / 2).deflection, (5 * w * L ** 4) / (384 * EI));
    expectNear(still.at(1e-7).shear, (w * L) / 2);
    expectNear(still.at(L / 3).shear, w * (L / 2 - L / 3));
  });

  it('triangular load rising to w at the right: wL/6, wL/3, M = wL²/9√3 at L/√3 (closed form)', () => {
    const still = solved(boardMember(L, pinned(L), [{ kind: 'varying', from: 0, to: L, start: 0, end: w }]));
    expectNear(still.reactions[0]?.force, (w * L) / 6);
    expectNear(still.reactions[1]?.force, (w * L) / 3);
    expectNear(still.at(L / Math.sqrt(3)).moment, (w * L ** 2) / (9 * Math.sqrt(3)));
    // w(x) = w₀x(7L⁴ − 10L²x² + 3x⁴)/360EIL (closed form)
    const x = 1100;
    expectNear(
      still.at(x).deflection,
      (w * x * (7 * L ** 4 - 10 * L ** 2 * x ** 2 + 3 * x ** 4)) / (360 * EI * L),
    );
  });

  it('load on a part of the span, inside one element and over several: by statics', () => {
    const [from, to] = [1010, 1040];
    const still = solved(boardMember(L, pinned(L), [{ kind: 'uniform', from, to, value: 40 }]));
    const whole = 40 * (to - from);
    const left = (whole * (L - (from + to) / 2)) / L;
    expectNear(still.reactions[0]?.force, left);
    expectNear(still.at(1025).shear, left - 40 * 15);
    expectNear(still.at(1025).moment, left * 1025 - (40 * 15 ** 2) / 2);
    expectNear(still.at(2000).moment, (whole - left) * 1000);
  });

  it('point load at a: Pb/L, Pab/L, Pa²b²/3EIL under it; V jumps by P (closed form)', () => {
    const a = 1234;
    const b = L - a;
    const still = solved(boardMember(L, pinned(L), [{ kind: 'point', x: a, value: P }]));
    expectNear(still.at(a - 1e-6).shear, (P * b) / L);
    expectNear(still.at(a + 1e-6).shear, (-P * a) / L);
    expectNear(still.at(a).moment, (P * a * b) / L, 1e-9);
    expectNear(still.at(a).deflection, (P * a ** 2 * b ** 2) / (3 * EI * L));
  });

  it('couple at a: reactions ∓C/L, M jumps by +C (statics)', () => {
    const C = 1e6;
    const a = 800;
    const still = solved(boardMember(L, pinned(L), [{ kind: 'couple', x: a, value: C }]));
    expectNear(still.reactions[0]?.force, -C / L);
    expectNear(still.at(a - 1e-7).moment, (-C / L) * a, 1e-8);
    expectNear(still.at(a + 1e-7).moment, C - (C / L) * a, 1e-8);
  });

  it('cantilever: PL³/3EI, moment −PL at the clamp, whose moment adds to M (closed form)', () => {
    const still = solved(
      boardMember(L, [{ id: 'A', x: 0, kind: 'fixed' }], [{ kind: 'point', x: L, value: P }]),
    );
    expectNear(still.at(L).deflection, (P * L ** 3) / (3 * EI));
    expectNear(still.reactions[0]?.moment, -P * L);
    expectNear(still.at(0).moment, -P * L);
  });

  it('propped cantilever, uniform load: 5wL/8 and −wL²/8 at the clamp, 3wL/8 at the prop (closed form)', () => {
    const supports = [
      { id: 'A', x: 0, kind: 'fixed' as const },
      { id: 'B', x: L, kind: 'roller' as const },
    ];
    const still = solved(boardMember(L, supports, [{ kind: 'uniform', from: 0, to: L, value: w }]));
    expectNear(still.reactions[0]?.force, (5 * w * L) / 8);
    expectNear(still.reactions[0]?.moment, (-w * L ** 2) / 8);
    expectNear(still.reactions[1]?.force, (3 * w * L) / 8);
    expectNear(still.at((5 * L) / 8).moment, (9 * w * L ** 2) / 128);
  });

  it('clamped at both ends, point load: Pab²/L² (closed form)', () => {
    const a = 1000;
    const supports = [
      { id: 'A', x: 0, kind: 'fixed' as const },
      { id: 'B', x: L, kind: 'fixed' as const },
    ];
    const still = solved(boardMember(L, supports, [{ kind: 'point', x: a, value: P }]));
    expectNear(still.reactions[0]?.moment, (-P * a * (L - a) ** 2) / L ** 2);
    expectNear(still.reactions[1]?.moment, (P * a ** 2 * (L - a)) / L ** 2);
  });

  it('two equal spans, uniform load: 3wL/8, 5wL/4, −wL²/8 over the middle (closed form)', () => {
    const supports = [...pinned(L), { id: 'C', x: 2 * L, kind: 'roller' as const }];
    const still = solved(boardMember(2 * L, supports, [{ kind: 'uniform', from: 0, to: 2 * L, value: w }]));
    expectNear(still.reactions[0]?.force, (3 * w * L) / 8);
    expectNear(still.reactions[1]?.force, 1.25 * w * L);
    expectNear(still.at(L).moment, (-w * L ** 2) / 8);
  });

  it('a spring under the middle of a simple span takes δ/(1/k + L³/48EI) (force method)', () => {
    const k = 700;
    const supports = [...pinned(L), { id: 'S', x: L / 2, kind: 'spring' as const, stiffness: k }];
    const still = solved(boardMember(L, supports, [{ kind: 'uniform', from: 0, to: L, value: w }]));
    const free = (5 * w * L ** 4) / (384 * EI);
    const force = free / (1 / k + L ** 3 / (48 * EI));
    expectNear(still.reactions[2]?.force, force);
    expectNear(still.at(L / 2).deflection, force / k);
  });

  it('a span hung on a clamped arm: no moment at the hinge, half the load on the arm’s tip (statics)', () => {
    const hinge = 1000;
    const supports = [
      { id: 'A', x: 0, kind: 'fixed' as const },
      { id: 'B', x: hinge + 2000, kind: 'roller' as const },
    ];
    const still = solved(
      boardMember(
        hinge + 2000,
        supports,
        [{ kind: 'uniform', from: hinge, to: hinge + 2000, value: w }],
        [hinge],
      ),
    );
    expectNear(still.reactions[1]?.force, 1000 * w);
    expectNear(still.reactions[0]?.moment, -1000 * w * hinge);
    expect(Math.abs(still.at(hinge).moment)).toBeLessThan(1e-9 * 1000 * w * hinge);
    expectNear(still.at(hinge).deflection, (1000 * w * hinge ** 3) / (3 * EI));
  });

  it('a couple at a hinge acts on its left: the arm alone bends (contract of the document)', () => {
    const supports = [
      { id: 'A', x: 0, kind: 'fixed' as const },
      { id: 'B', x: 3000, kind: 'roller' as const },
    ];
    const still = solved(boardMember(3000, supports, [{ kind: 'couple', x: 1000, value: 5e5 }], [1000]));
    expectNear(still.reactions[0]?.moment, -5e5);
    expectNear(still.at(500).moment, -5e5);
    expect(Math.abs(still.at(2000).moment)).toBeLessThan(1e-3);
  });
});

describe('Trains, against closed forms', () => {
  const crossing = (axles: { offset: number; value: number }[], from = 0, to = L): MemberDocument =>
    boardMember(L, pinned(L), [{ kind: 'moving', from, to, axles }]);

  it('one axle: V = P(L − x)/L just right of it, M = Px(L − x)/L, and PL/4 at midspan (closed form)', () => {
    const result = recalculate(crossing([{ offset: 0, value: P }]), [0, 700, L / 2]);
    const station = result.stations.find(({ x }) => x === 700);
    expectNear(station?.right.shearMax, (P * (L - 700)) / L, 1e-8);
    expectNear(station?.right.shearMin, (-P * 700) / L, 1e-8);
    expectNear(station?.right.momentMax, (P * 700 * (L - 700)) / L, 1e-8);
    expectNear(result.extremes.moment.value, (P * L) / 4, 1e-8);
    expectNear(result.extremes.deflection.value, (P * L ** 3) / (48 * EI), 1e-8);
    expectNear(result.reactions[0]?.max, P);
  });

  it('two equal axles a apart, a < 0.586L: 2P/L·(L/2 − a/4)² = (2P)x²/L (closed form)', () => {
    const a = 900;
    const result = recalculate(
      crossing(
        [
          { offset: 0, value: P },
          { offset: -a, value: P },
        ],
        0,
        L + a,
      ),
    );
    expectNear(result.extremes.moment.value, (2 * P * (L / 2 - a / 4) ** 2) / L, 1e-8);
  });

  it('two equal spans, one axle: M⁺ 0.2074PL within a span, M⁻ PL/6√3 over the middle (closed form)', () => {
    const supports = [...pinned(L), { id: 'C', x: 2 * L, kind: 'roller' as const }];
    const document = boardMember(2 * L, supports, [
      { kind: 'moving', from: 0, to: 2 * L, axles: [{ offset: 0, value: P }] },
    ]);
    const result = recalculate(document, [L]);
    expectNear(result.stations[0]?.left.momentMin, (-P * L) / (6 * Math.sqrt(3)), 1e-8);
    // largest of Px(L−x)(4L² − x(L+x))/4L³, by its own dense scan
    let largest = 0;
    for (let i = 0; i <= 200_000; i += 1) {
      const x = (L * i) / 200_000;
      largest = Math.max(largest, (P * x * (L - x) * (4 * L ** 2 - x * (L + x))) / (4 * L ** 3));
    }
    expectNear(largest / (P * L), 0.2074, 2e-4);
    expectNear(result.extremes.moment.value, largest, 1e-8);
  });

  it('an axle beyond the end carries nothing, at the very end it counts (contract of the document)', () => {
    const off = recalculate(crossing([{ offset: 0, value: P }], -500, -1));
    expect(off.extremes.moment.value).toBe(0);
    const tip = boardMember(
      L,
      [{ id: 'A', x: 0, kind: 'fixed' }],
      [{ kind: 'moving', from: L, to: L + 500, axles: [{ offset: 0, value: P }] }],
    );
    expectNear(recalculate(tip).reactions[0]?.momentMin, -P * L, 1e-8);
  });
});
