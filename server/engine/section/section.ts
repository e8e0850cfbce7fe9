import type { Material, MemberDocument, Piece } from '@shared/schemas/member';
import { refuse } from '../refused';

/** A piece with what the section needs of it; lengths mm, stiffness N and N·mm². */
export interface SectionPiece {
  piece: Piece;
  material: Material;
  area: number;
  /** height of its own centroid, and its second moment about its own axis */
  z: number;
  ownI: number;
  EA: number;
}

export interface Section {
  pieces: SectionPiece[];
  EA: number;
  /** Σ EAz, kept for the calculation's lines */
  EAz: number;
  centroid: number;
  EI: number;
  referenceModulus: number;
  I: number;
  bottom: number;
  top: number;
  depth: number;
}

/**
 * The transformed section: EA, z̄ = ΣEAz/ΣEA, EI = Σ(EI_own + EA(z − z̄)²) (parallel axes; mechanics of
 * materials). Heights are taken from the section's lower edge so that a far origin costs no digits.
 */
export function transformedSection(document: MemberDocument): Section {
  const materials = new Map(document.materials.map((m) => [m.id, m]));
  const bottom = Math.min(...document.pieces.map((p) => p.z));
  const top = Math.max(...document.pieces.map((p) => p.z + p.depth));
  const pieces = document.pieces.map((piece): SectionPiece => {
    const material = materials.get(piece.material);
    if (!material) return refuse('unknown-reference', 'pieces', `No material has the id ${piece.material}.`);
    const area = piece.width * piece.depth;
    return {
      piece,
      material,
      area,
      z: piece.z + piece.depth / 2,
      ownI: (piece.width * piece.depth ** 3) / 12,
      EA: material.E * area,
    };
  });
  let EA = 0;
  let moment = 0;
  for (const p of pieces) {
    EA += p.EA;
    moment += p.EA * (p.piece.z - bottom + p.piece.depth / 2);
  }
  const fromBottom = moment / EA;
  const centroid = bottom + fromBottom;
  let EI = 0;
  for (const p of pieces) EI += p.material.E * p.ownI + p.EA * arm(p, bottom, fromBottom) ** 2;
  const referenceModulus = pieces[0]?.material.E ?? 1;
  return {
    pieces,
    EA,
    EAz: EA * centroid,
    centroid,
    EI,
    referenceModulus,
    I: EI / referenceModulus,
    bottom,
    top,
    depth: top - bottom,
  };
}

function arm(p: SectionPiece, bottom: number, fromBottom: number): number {
  return p.piece.z - bottom + p.piece.depth / 2 - fromBottom;
}

/** EA(z − z̄) of a piece: its share of the longitudinal force per unit of V/EI. */
export function stiffnessMoment(section: Section, p: SectionPiece): number {
  return p.EA * arm(p, section.bottom, section.centroid - section.bottom);
}

/** True where the section reads the same from left and right: equal pieces of equal wood about one vertical. */
export function isSymmetric(section: Section): boolean {
  const left = Math.min(...section.pieces.map((p) => p.piece.y));
  const right = Math.max(...section.pieces.map((p) => p.piece.y + p.piece.width));
  const tolerance = 1e-6 * Math.max(1, right - left);
  const close = (a: number, b: number): boolean => Math.abs(a - b) <= tolerance;
  return section.pieces.every((p) => {
    const mirrored = left + right - (p.piece.y + p.piece.width);
    return section.pieces.some(
      (q) =>
        close(q.piece.y, mirrored) &&
        close(q.piece.z, p.piece.z) &&
        close(q.piece.width, p.piece.width) &&
        close(q.piece.depth, p.piece.depth) &&
        q.material.E === p.material.E,
    );
  });
}
