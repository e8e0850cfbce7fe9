import { formatQuantity } from '@shared/units';
import type { UnitSystem } from '@shared/units';
import type { MemberDocument } from '@shared/schemas/member';
import type { DrawnFasteners } from '@/components/drawing/elevation-geometry';
import { findContacts } from '@/components/drawing/section-geometry';
import type { DrawnPiece } from '@/components/drawing/section-geometry';
import type { DrawnZone } from '@/components/drawing/zones-panel';
import { isSpaced, jointOf } from './worked';
import type { Joint, Worked } from './worked';

/** The pieces of a document, as the drawings take them. */
export function drawnPieces(document: MemberDocument): DrawnPiece[] {
  const kinds = new Map(document.materials.map(({ id, kind }) => [id, kind]));
  return document.pieces.map(({ id, y, z, width, depth, material }) => ({
    id,
    y,
    z,
    width,
    depth,
    kind: kinds.get(material) ?? 'solid',
  }));
}

/** The fasteners of every joint that has some, as the elevation takes them. */
export function drawnFasteners(worked: Worked, pieces: readonly DrawnPiece[]): DrawnFasteners[] {
  const contacts = findContacts(pieces);
  return worked.result.interfaces.flatMap(({ id, fasteners }) => {
    const contact = contacts.find((one) => one.id === id);
    const fastener = jointOf(worked, id)?.connection.fastener;
    if (fasteners === null || contact === undefined) return [];
    return [
      {
        contact,
        positions: fasteners.positions,
        headSide: fastener?.headSide,
        length: fastener?.length,
        through: fastener?.type === 'bolt',
      },
    ];
  });
}

/** The zones of a joint, as the zones panel takes them. */
export function drawnZones({ outcome }: Joint, units: UnitSystem): DrawnZone[] {
  return outcome.zones.map(({ from, to, spacing, perRow, utilisation }) => ({
    from,
    to,
    spacing: formatQuantity(spacing, 'size', units),
    count: `${outcome.rows} × ${perRow}`,
    over: utilisation > 1 + 1e-9,
  }));
}

/** What stands in place of zones where a joint has none. */
export function zonesNote(joint: Joint): string {
  if (isSpaced(joint)) return 'no schedule is possible';
  return joint.outcome.kind === 'adhesive' ? 'glued from end to end' : 'an unbroken line from end to end';
}
