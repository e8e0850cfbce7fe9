import type { Connection, MemberDocument, Piece } from '@shared/schemas/member';
import type { Issue } from '@shared/schemas/refusal';
import { touching } from '../beam/events';
import { Refused } from '../refused';

/** A contact face between two pieces, found from the geometry. */
export interface Interface {
  id: string;
  /** indices of the two pieces, the earlier first */
  a: number;
  b: number;
  orientation: 'horizontal' | 'vertical';
  /** length of the face in the section, mm */
  contact: number;
  connection: Connection | null;
  /** index of the connection in the document, −1 where there is none */
  connectionIndex: number;
  /** the pieces' ids, in the connection's order where there is one */
  pieces: [string, string];
}

interface Meeting {
  acrossY: number;
  acrossZ: number;
}

/** How far two pieces overlap in y and in z; below zero is a gap. */
function meeting(p: Piece, q: Piece): Meeting {
  return {
    acrossY: Math.min(p.y + p.width, q.y + q.width) - Math.max(p.y, q.y),
    acrossZ: Math.min(p.z + p.depth, q.z + q.depth) - Math.max(p.z, q.z),
  };
}

const mm = (value: number): string => String(Math.round(value * 1000) / 1000);

/** Refuses pieces that overlap, each pair with what would mend it. */
export function refuseOverlaps(pieces: readonly Piece[]): void {
  const issues: Issue[] = [];
  pieces.forEach((q, j) => {
    pieces.slice(0, j).forEach((p) => {
      const { acrossY, acrossZ } = meeting(p, q);
      if (acrossY <= touching || acrossZ <= touching) return;
      const vertical = acrossZ <= acrossY;
      const by = vertical ? acrossZ : acrossY;
      const field = vertical ? 'z' : 'y';
      const size = vertical ? 'depth' : 'width';
      const above = q[field] >= p[field];
      const place = above ? p[field] + p[size] : p[field] - q[size];
      issues.push({
        path: `pieces.${j}.${field}`,
        message: `${p.id} and ${q.id} overlap by ${mm(by)} mm. Pieces may touch, not overlap: set ${field} of ${q.id} to ${mm(place)}, or make one of them smaller.`,
      });
    });
  });
  const [first] = issues;
  if (first) throw new Refused('overlapping-pieces', first.message, issues);
}

/**
 * All interfaces, J1, J2 … in the order of the pieces (by the earlier piece, then the later), each with the
 * connection that joins it. Connections between pieces that do not touch are refused, and so are two
 * connections for one pair.
 */
export function findInterfaces(document: MemberDocument): Interface[] {
  const { pieces, connections } = document;
  const index = new Map(pieces.map((p, i) => [p.id, i]));
  const found: Interface[] = [];
  const byPair = new Map<string, Interface>();
  pieces.forEach((p, a) => {
    pieces.forEach((q, b) => {
      if (b <= a) return;
      const { acrossY, acrossZ } = meeting(p, q);
      const flat = Math.abs(acrossZ) <= touching && acrossY > touching;
      const upright = Math.abs(acrossY) <= touching && acrossZ > touching;
      if (!flat && !upright) return;
      const item: Interface = {
        id: `J${found.length + 1}`,
        a,
        b,
        orientation: flat ? 'horizontal' : 'vertical',
        contact: flat ? acrossY : acrossZ,
        connection: null,
        connectionIndex: -1,
        pieces: [p.id, q.id],
      };
      found.push(item);
      byPair.set(`${a} ${b}`, item);
    });
  });
  const apart: Issue[] = [];
  const twice: Issue[] = [];
  connections.forEach((connection, i) => {
    const [first, second] = connection.pieces.map((id) => index.get(id) ?? -1);
    const pair = `${Math.min(first ?? -1, second ?? -1)} ${Math.max(first ?? -1, second ?? -1)}`;
    const item = byPair.get(pair);
    const names = connection.pieces.join(' and ');
    if (!item) {
      apart.push({
        path: `connections.${i}.pieces`,
        message: `${names} do not touch along an edge, so nothing can join them: move one of them, or take the connection out.`,
      });
    } else if (item.connection) {
      twice.push({
        path: `connections.${i}.pieces`,
        message: `${names} are joined twice: keep one connection for each interface.`,
      });
    } else {
      item.connection = connection;
      item.connectionIndex = i;
      item.pieces = connection.pieces;
    }
  });
  const issues = [...apart, ...twice];
  const [first] = issues;
  if (first) throw new Refused(apart.length > 0 ? 'not-touching' : 'invalid-document', first.message, issues);
  return found;
}

/** Refuses pieces that no connection holds to the rest. */
export function refuseLoosePieces(document: MemberDocument, interfaces: readonly Interface[]): void {
  const { pieces } = document;
  const group = pieces.map((_, i) => i);
  const root = (i: number): number => {
    let r = i;
    while ((group[r] ?? r) !== r) r = group[r] ?? r;
    return r;
  };
  for (const { a, b, connection } of interfaces) if (connection) group[root(b)] = root(a);
  const held = root(0);
  const issues: Issue[] = [];
  pieces.forEach((piece, i) => {
    if (root(i) === held) return;
    issues.push({
      path: `pieces.${i}`,
      message: `Nothing connects ${piece.id} to ${pieces[held]?.id ?? 'the rest'}: give it a connection, or take it out.`,
    });
  });
  const [first] = issues;
  if (first) throw new Refused('loose-piece', first.message, issues);
}
