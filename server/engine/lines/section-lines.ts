import type { MemberDocument } from '@shared/schemas/member';
import { massPerLength } from '../beam/cases';
import type { Section } from '../section/section';
import { given, sumOf, type LineBook, type Term } from './book';

const statics = 'Transformed section, parallel axes (mechanics of materials)';

/** What later lines use of the section. */
export interface SectionTerms {
  EA: Term[];
  z: Term[];
  zbar: Term;
  EI: Term;
  I: Term;
  Eref: Term;
}

/** Group 1: EA, z̄, EI and I of the transformed section, piece by piece. */
export function sectionLines(book: LineBook, document: MemberDocument, section: Section): SectionTerms {
  book.open('Section');
  const EA: Term[] = [];
  const z: Term[] = [];
  section.pieces.forEach(({ piece, material, EA: value, z: height }, i) => {
    const k = i + 1;
    EA.push(
      book.write({
        label: `Axial stiffness of ${piece.id}`,
        symbol: `EA_${k}`,
        formula: `E_${k} * b_${k} * h_${k}`,
        inputs: [
          given(`E_${k}`, material.E, 'MPa'),
          given(`b_${k}`, piece.width, 'mm'),
          given(`h_${k}`, piece.depth, 'mm'),
        ],
        value,
        unit: 'N',
        source: `E of ${material.name || material.id}, as entered`,
      }),
    );
    z.push(
      book.write({
        label: `Height of the middle of ${piece.id}`,
        symbol: `z_${k}`,
        formula: `z0_${k} + h_${k} / 2`,
        inputs: [given(`z0_${k}`, piece.z, 'mm'), given(`h_${k}`, piece.depth, 'mm')],
        value: height,
        unit: 'mm',
        source: 'Layup as entered',
      }),
    );
  });
  const total = book.write({
    label: 'Axial stiffness of the section',
    symbol: 'EA',
    formula: sumOf(EA.map((t) => t.symbol)),
    inputs: EA,
    value: section.EA,
    unit: 'N',
    source: statics,
  });
  const zbar = book.write({
    label: 'Height of the neutral axis',
    symbol: 'zbar',
    formula: `(${sumOf(EA.map((t, i) => `${t.symbol} * z_${i + 1}`))}) / EA`,
    inputs: [...EA, ...z, total],
    value: section.centroid,
    unit: 'mm',
    source: statics,
  });
  const own = section.pieces.map(({ piece, material, ownI, EA: stiffness, z: height }, i) => {
    const k = i + 1;
    const EAk = EA[i];
    const zk = z[i];
    return book.write({
      label: `Bending stiffness of ${piece.id} about the neutral axis`,
      symbol: `EI_${k}`,
      formula: `E_${k} * b_${k} * h_${k}^3 / 12 + EA_${k} * (z_${k} - zbar)^2`,
      inputs: [
        given(`E_${k}`, material.E, 'MPa'),
        given(`b_${k}`, piece.width, 'mm'),
        given(`h_${k}`, piece.depth, 'mm'),
        ...(EAk && zk ? [EAk, zk] : []),
        zbar,
      ],
      value: material.E * ownI + stiffness * (height - section.centroid) ** 2,
      unit: 'N mm^2',
      source: statics,
    });
  });
  const EI = book.write({
    label: 'Bending stiffness of the section',
    symbol: 'EI',
    formula: sumOf(own.map((t) => t.symbol)),
    inputs: own,
    value: section.EI,
    unit: 'N mm^2',
    source: statics,
  });
  const Eref = given('E_ref', section.referenceModulus, 'MPa');
  const I = book.write({
    label: `Second moment of area, referred to ${section.pieces[0]?.piece.id ?? 'the first piece'}`,
    symbol: 'I',
    formula: 'EI / E_ref',
    inputs: [EI, Eref],
    value: section.I,
    unit: 'mm^4',
    source: statics,
  });
  const mass = massPerLength(document);
  if (mass !== null) {
    book.write({
      label: 'Mass per length',
      symbol: 'm',
      formula: sumOf(section.pieces.map((_, i) => `rho_${i + 1} * b_${i + 1} * h_${i + 1}`)),
      inputs: section.pieces.flatMap(({ piece, material }, i) => [
        given(`rho_${i + 1}`, material.density ?? 0, 'kg/m^3'),
        given(`b_${i + 1}`, piece.width, 'mm'),
        given(`h_${i + 1}`, piece.depth, 'mm'),
      ]),
      value: mass,
      unit: 'kg/m',
      source: 'Densities as entered',
    });
  }
  return { EA, z, zbar, EI, I, Eref };
}
