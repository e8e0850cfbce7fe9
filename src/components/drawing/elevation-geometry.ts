import type { Contact, DrawnPiece } from './section-geometry';
import { boundsOf } from './section-geometry';

/** By how much depth may be drawn larger or smaller than length, so that it can be written in a word. */
const EXAGGERATIONS = [
  0.05, 0.1, 0.2, 0.25, 0.5, 0.75, 1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10, 12, 15, 20, 25, 30, 40, 50, 75,
  100,
];

/** Heights of an elevation: mm up the section to pixels down the drawing. */
export interface ElevationScale {
  exaggeration: number;
  top: number;
  bottom: number;
  y: (z: number) => number;
}

/**
 * Fits a section's depth under `bottom` pixels and within `height`, at a depth exaggeration that is a round number.
 * `factor` is the pixels a mm along the beam.
 */
export function elevationScale(
  pieces: readonly DrawnPiece[],
  factor: number,
  bottom: number,
  height: number,
): ElevationScale {
  const bounds = boundsOf(pieces) ?? { left: 0, right: 0, bottom: 0, top: 1 };
  const depth = bounds.top - bounds.bottom;
  const most = height / (depth * factor);
  const exaggeration = EXAGGERATIONS.findLast((one) => one <= most * (1 + 1e-9)) ?? most;
  const vertical = factor * exaggeration;
  return {
    exaggeration,
    top: bottom - depth * vertical,
    bottom,
    y: (z) => bottom - (z - bounds.bottom) * vertical,
  };
}

/** Whether a piece in front hides all of this one from somebody who looks along y. */
export function isHidden(piece: DrawnPiece, pieces: readonly DrawnPiece[]): boolean {
  return pieces.some(
    (other) =>
      other.id !== piece.id &&
      (other.y < piece.y || (other.y === piece.y && other.width < piece.width && other.id < piece.id)) &&
      other.z <= piece.z + 1e-6 &&
      other.z + other.depth >= piece.z + piece.depth - 1e-6,
  );
}

/** What is known of the fasteners of one interface, for drawing them. */
export interface DrawnFasteners {
  contact: Contact;
  /** mm, a list for each row */
  positions: readonly (readonly number[])[];
  headSide?: string | undefined;
  /** mm */
  length?: number | undefined;
  /** bolts have something at both ends */
  through: boolean;
}

/** How the fasteners of an interface look from the side, in mm up the section. */
export type FastenerLook =
  | {
      kind: 'line';
      head: number;
      tip: number;
      through: boolean;
      rows: { xs: readonly number[]; faint: boolean }[];
    }
  | { kind: 'heads'; faint: boolean; rows: { z: number; xs: readonly number[] }[] };

const headPiece = (
  a: DrawnPiece,
  b: DrawnPiece,
  size: 'width' | 'depth',
  wanted: string | undefined,
): DrawnPiece => {
  if (wanted === b.id) return b;
  if (wanted === a.id) return a;
  return b[size] < a[size] ? b : a;
};

/** A row that stands exactly behind another cannot be seen. */
const visibleRows = (rows: readonly (readonly number[])[]) =>
  rows.filter(
    (row, index) =>
      !rows
        .slice(0, index)
        .some((other) => other.length === row.length && other.every((x, at) => x === row[at])),
  );

/** How an interface's fasteners are drawn; null where its pieces are not known. */
export function fastenerLook(fasteners: DrawnFasteners, pieces: readonly DrawnPiece[]): FastenerLook | null {
  const { contact } = fasteners;
  const a = pieces.find((piece) => piece.id === contact.pieces[0]);
  const b = pieces.find((piece) => piece.id === contact.pieces[1]);
  if (!a || !b) return null;
  const covered = isHidden(a, pieces) && isHidden(b, pieces);
  if (contact.orientation === 'vertical') {
    const head = headPiece(a, b, 'width', fasteners.headSide);
    const [low, high] = [contact.from.z, contact.to.z];
    const rows = fasteners.positions.map((xs, index) => ({
      z: low + ((high - low) * (index + 0.5)) / fasteners.positions.length,
      xs,
    }));
    return { kind: 'heads', faint: covered || isHidden(head, pieces), rows };
  }
  const head = headPiece(a, b, 'depth', fasteners.headSide);
  const other = head === a ? b : a;
  const down = head.z > other.z;
  const from = down ? head.z + head.depth : head.z;
  const farthest = down ? other.z : other.z + other.depth;
  const most = Math.abs(farthest - from);
  const usual = fasteners.through ? most : head.depth + Math.min(other.depth * 0.85, head.depth * 1.5);
  const reach = Math.min(most, fasteners.length ?? usual);
  return {
    kind: 'line',
    head: from,
    tip: down ? from - reach : from + reach,
    through: fasteners.through,
    rows: visibleRows(fasteners.positions).map((xs, index) => ({ xs, faint: covered || index > 0 })),
  };
}
