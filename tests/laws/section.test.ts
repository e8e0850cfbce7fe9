import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { MemberInput } from '@shared/schemas/member';
import type { CalculationResult } from '@shared/schemas/result';
import { between, calculated, expectClose, largest } from './calculated';
import { anySection, box, determinateBeam, fixedLoads, fixedMember, memberOf, runs } from './members';

/** EI, centroid and each piece's flow per unit shear, s = EA(z−z̄)/EI, straight from their definitions. */
function transformed({ pieces, materials }: MemberInput) {
  const parts = pieces.map(({ id, material, width, depth, z }) => {
    const E = materials.find((one) => one.id === material)?.E ?? NaN;
    return { id, E, EA: E * width * depth, middle: z + depth / 2, own: (E * width * depth ** 3) / 12 };
  });
  const EA = parts.reduce((sum, part) => sum + part.EA, 0);
  const centroid = parts.reduce((sum, part) => sum + part.EA * part.middle, 0) / EA;
  const EI = parts.reduce((sum, part) => sum + part.own + part.EA * (part.middle - centroid) ** 2, 0);
  const needs = new Map(parts.map(({ id, EA: ea, middle }) => [id, (ea * (middle - centroid)) / EI]));
  return { EA, centroid, EI, needs };
}

/** Every result figure that the section's place, the order of its pieces and the like must not touch. */
function figures(result: CalculationResult): Record<string, number> {
  const list: Record<string, number> = { EI: result.section.EI, EA: result.section.EA };
  for (const { pieces, flowPerShear, contact } of result.section.interfaces) {
    const key = [...pieces].sort().join('|');
    list[`flow ${key}`] = flowPerShear;
    list[`contact ${key}`] = contact;
  }
  for (const one of result.interfaces) {
    const key = [...one.pieces].sort().join('|');
    list[`peak ${key}`] = one.peakFlow.value;
    list[`required ${key}`] = one.requiredSpacing ?? 0;
    list[`utilisation ${key}`] = one.utilisation;
    one.zones.forEach(({ from, to, spacing }, i) => {
      list[`zone ${key} ${i} from`] = from;
      list[`zone ${key} ${i} to`] = to;
      list[`zone ${key} ${i} spacing`] = spacing;
    });
    one.fasteners?.forces.forEach(
      (row, i) => (list[`forces ${key} ${i}`] = row.reduce((sum, f) => sum + f, 0)),
    );
  }
  return list;
}

function expectSame(found: CalculationResult, expected: CalculationResult, rel = 1e-7): void {
  const a = figures(found);
  const b = figures(expected);
  expect(Object.keys(a).sort()).toEqual(Object.keys(b).sort());
  for (const [key, value] of Object.entries(a)) expectClose(value, b[key] ?? NaN, 1e-9, key, rel);
}

const onSimpleBeam = (section: typeof anySection) =>
  determinateBeam.chain((beam) =>
    fc
      .record({ section, loads: fixedLoads(beam) })
      .map(({ section: layup, loads }) =>
        memberOf(beam, layup, loads, { minZoneLength: 200, spacingMin: 5 }),
      ),
  );

describe('the transformed section', () => {
  it('is the sum of its pieces', () => {
    fc.assert(
      fc.property(fixedMember, (member) => {
        const { section } = calculated(member);
        const own = transformed(member);
        expectClose(section.EA, own.EA, 0, 'EA', 1e-12);
        expectClose(section.EI, own.EI, 0, 'EI', 1e-11);
        expectClose(section.centroid, own.centroid, 100, 'centroid', 1e-12);
        expectClose(section.I * section.referenceModulus, section.EI, 0, 'I', 1e-12);
      }),
      runs(100),
    );
  });

  it('moved anywhere in y and z, gives the same schedule; only the centroid moves along', () => {
    const shift = fc.integer({ min: -5000, max: 5000 });
    fc.assert(
      fc.property(onSimpleBeam(anySection), shift, shift, (member, dy, dz) => {
        const here = calculated(member);
        const there = calculated({
          ...member,
          pieces: member.pieces.map((piece) => ({ ...piece, y: piece.y + dy, z: piece.z + dz })),
        });
        expectSame(there, here);
        expectClose(there.section.centroid, here.section.centroid + dz, 100, 'centroid', 1e-9);
      }),
      runs(60),
    );
  });

  it('all moduli times k: the flow is as it was, deflections are divided by k', () => {
    fc.assert(
      fc.property(onSimpleBeam(anySection), fc.integer({ min: 2, max: 50 }), (member, tenths) => {
        const k = tenths / 10;
        const here = calculated(member);
        const stiffer = calculated({
          ...member,
          materials: member.materials.map((material) => ({ ...material, E: material.E * k })),
        });
        const scale = largest(here.envelope.deflectionMax, 1e-12);
        stiffer.envelope.deflectionMax.forEach((w, i) =>
          expectClose(w * k, here.envelope.deflectionMax[i] ?? NaN, scale, 'deflection'),
        );
        expectClose(stiffer.section.EI, here.section.EI * k, 0, 'EI', 1e-10);
        stiffer.interfaces.forEach((one, i) => {
          expectClose(one.peakFlow.value, here.interfaces[i]?.peakFlow.value ?? NaN, 1e-9, 'peak flow');
          expect(one.zones.map(({ spacing }) => spacing)).toEqual(
            here.interfaces[i]?.zones.map((z) => z.spacing),
          );
        });
      }),
      runs(60),
    );
  });

  it('in any order of pieces and connections: only the interfaces’ numbers and the reference modulus change', () => {
    fc.assert(
      fc.property(
        onSimpleBeam(anySection).chain((member) =>
          fc.record({
            member: fc.constant(member),
            pieces: fc.shuffledSubarray(member.pieces, { minLength: member.pieces.length }),
            connections: fc.shuffledSubarray(member.connections ?? [], {
              minLength: (member.connections ?? []).length,
            }),
          }),
        ),
        ({ member, pieces, connections }) => {
          const shuffled = calculated({ ...member, pieces, connections });
          expectSame(shuffled, calculated(member));
          const order = pieces.map(({ id }) => id);
          const keys = shuffled.section.interfaces.map(({ pieces: two }) => {
            const [a = NaN, b = NaN] = two.map((id) => order.indexOf(id)).sort((i, j) => i - j);
            return a * 1000 + b;
          });
          // numbered by the earlier piece, then the later
          expect([...keys].sort((a, b) => a - b)).toEqual(keys);
          expect(shuffled.section.interfaces.map(({ id }) => id)).toEqual(keys.map((_, i) => `J${i + 1}`));
        },
      ),
      runs(60),
    );
  });
});

describe('shear flow', () => {
  it('every piece of a tree gets what it needs: the flow is what one side of the interface needs', () => {
    fc.assert(
      fc.property(onSimpleBeam(anySection), (member) => {
        const { section } = calculated(member);
        const { needs } = transformed(member);
        const joined = section.interfaces.filter(({ connected }) => connected);
        if (joined.length !== member.pieces.length - 1) return;
        for (const edge of joined) {
          const side = new Set([edge.pieces[0]]);
          for (let grown = true; grown;) {
            grown = false;
            for (const other of joined) {
              if (other === edge) continue;
              const [a, b] = other.pieces;
              if (side.has(a) !== side.has(b)) {
                side.add(a).add(b);
                grown = true;
              }
            }
          }
          const flow = Math.abs([...side].reduce((sum, id) => sum + (needs.get(id) ?? NaN), 0));
          expectClose(edge.flowPerShear, flow, 1e-9, `q/V of ${edge.pieces.join(' and ')}`, 1e-9);
          expectClose(edge.firstMoment ?? NaN, (flow * section.EI) / section.referenceModulus, 1, 'Q', 1e-9);
        }
      }),
      runs(80),
    );
  });

  it('round a box every piece is in balance and no other split has less slip energy', () => {
    fc.assert(
      fc.property(onSimpleBeam(box), (member) => {
        const { section } = calculated(member);
        const { needs } = transformed(member);
        const known = (member.connections ?? []).every(({ slipModulus }) => slipModulus !== undefined);
        const flow = (a: string, b: string) => between(section.interfaces, a, b).flowPerShear;
        const stiffness = (a: string, b: string) => {
          const joint = between(member.connections ?? [], a, b);
          return known ? (joint.rows ?? 1) * (joint.slipModulus ?? NaN) : 1;
        };
        // the flange's force leaves it through its two joints; the webs are on the axis and pass on what they get
        const flange = Math.abs(needs.get('top') ?? NaN);
        expectClose(flow('top', 'left') + flow('top', 'right'), flange, 0, 'top flange', 1e-9);
        expectClose(flow('bottom', 'left') + flow('bottom', 'right'), flange, 0, 'bottom flange', 1e-9);
        expectClose(flow('top', 'left'), flow('bottom', 'left'), 0, 'left web', 1e-9);
        const energy = (left: number) =>
          (['top', 'bottom'] as const).reduce(
            (sum, f) =>
              sum +
              left ** 2 / (2 * stiffness(f, 'left')) +
              (flange - left) ** 2 / (2 * stiffness(f, 'right')),
            0,
          );
        const least = energy(flow('top', 'left'));
        for (let i = 0; i <= 200; i += 1)
          expect(least).toBeLessThanOrEqual(energy((flange * i) / 200) * (1 + 1e-9));
        expect(between(section.interfaces, 'top', 'left').firstMoment).toBeNull();
      }),
      runs(80),
    );
  });
});

describe('glue and lines', () => {
  const kinds = fc.record({
    kind: fc.constantFrom('adhesive' as const, 'continuous' as const),
    value: fc.integer({ min: 1, max: 900 }),
    bead: fc.option(fc.integer({ min: 20, max: 90 }), { nil: null }),
  });
  it('glue carries over its contact width, a line per length, runs by bead·R/q', () => {
    fc.assert(
      fc.property(onSimpleBeam(anySection), kinds, (member, { kind, value, bead }) => {
        const result = calculated({
          ...member,
          rules: { spacingMin: 1, spacingStep: 1, spacingMax: 1000, maxZones: 4 },
          connections: (member.connections ?? []).map(({ pieces }) => ({
            pieces,
            kind,
            capacity: { basis: 'allowable', value: kind === 'adhesive' ? value / 100 : value },
            ...(kind === 'continuous' && bead !== null ? { bead } : {}),
          })),
        });
        for (const one of result.interfaces) {
          const contact = result.section.interfaces.find(({ id }) => id === one.id)?.contact ?? NaN;
          const q = one.peakFlow.value;
          expect(one.fasteners).toBeNull();
          if (kind === 'continuous' && bead !== null) {
            if (one.requiredSpacing !== null)
              expectClose(one.requiredSpacing, (bead * value) / q, 0, 'pitch', 1e-9);
            for (const { spacing } of one.zones) expect(spacing).toBeGreaterThanOrEqual(1);
            if (one.zones.some(({ spacing }) => spacing < bead)) expect(one.status).toBe('over');
          } else {
            const most = kind === 'adhesive' ? (value / 100) * contact : value;
            expect(one.zones).toEqual([]);
            expectClose(one.utilisation, q / most, 1e-9, 'utilisation', 1e-9);
            expect(one.status).toBe(q / most > 1 ? 'over' : 'ok');
          }
        }
      }),
      runs(80),
    );
  });
});

describe('capacity and spacing', () => {
  it('a factor of safety divides the required spacing, two rows double it', () => {
    fc.assert(
      fc.property(
        onSimpleBeam(anySection),
        fc.integer({ min: 11, max: 60 }),
        fc.integer({ min: 2, max: 5 }),
        (member, tenths, more) => {
          const factorOfSafety = tenths / 10;
          const known = (member.connections ?? []).some(({ slipModulus }) => slipModulus !== undefined);
          const change = (
            basis: (value: number) => NonNullable<MemberInput['connections']>[number]['capacity'],
            times: number,
          ): MemberInput => ({
            ...member,
            connections: (member.connections ?? []).map((connection) => ({
              ...connection,
              rows: (connection.rows ?? 1) * times,
              capacity: basis(1234.5),
            })),
          });
          const plain = calculated(change((value) => ({ basis: 'allowable', value }), 1));
          const safe = calculated(change((value) => ({ basis: 'ultimate', value, factorOfSafety }), 1));
          const rows = calculated(change((value) => ({ basis: 'allowable', value }), more));
          plain.interfaces.forEach(({ requiredSpacing }, i) => {
            if (requiredSpacing === null) return;
            const found = (r: CalculationResult) => r.interfaces[i]?.requiredSpacing ?? NaN;
            expectClose(found(safe), requiredSpacing / factorOfSafety, 0, 'with a factor of safety', 1e-12);
            // in a loop with known slip all k grow alike, so the split is the same
            expectClose(found(rows), requiredSpacing * more, 0, `rows (${String(known)})`, 1e-9);
          });
        },
      ),
      runs(60),
    );
  });
});
