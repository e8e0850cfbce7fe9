/**
 * A member document as it stands while somebody is typing: JSON of which nothing may be taken for granted. A field
 * that cannot be read as a number holds what was typed, so that nothing is lost and the calculation can say what is wrong.
 */
export type DraftDocument = Record<string, unknown>;

const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

/** The value at a dotted path, undefined where nothing is there. */
export function valueAt(document: unknown, path: string): unknown {
  let value = document;
  for (const key of path === '' ? [] : path.split('.')) {
    if (Array.isArray(value)) value = value[Number(key)];
    else if (isRecord(value)) value = value[key];
    else return undefined;
  }
  return value;
}

const withKey = (value: unknown, keys: readonly string[], next: unknown): unknown => {
  const [key, ...rest] = keys;
  if (key === undefined) return next;
  if (Array.isArray(value)) {
    const list: unknown[] = value;
    return list.map((item, index) => (index === Number(key) ? withKey(item, rest, next) : item));
  }
  const record = isRecord(value) ? value : {};
  const { [key]: before, ...others } = record;
  const after = withKey(before, rest, next);
  // what is emptied leaves no trace: neither a key without a value nor a group without keys
  const gone = after === undefined || (rest.length > 0 && isRecord(after) && Object.keys(after).length === 0);
  return gone ? others : { ...record, [key]: after };
};

/** A draft with another value at a dotted path, none for undefined; the draft given stays as it is. */
export function withValueAt(document: DraftDocument, path: string, value: unknown): DraftDocument {
  const changed = withKey(document, path.split('.'), value);
  return isRecord(changed) ? changed : document;
}

/** Whether two JSON values say the same, whatever the order of their keys; undefined and absent are one. */
export function sameJson(a: unknown, b: unknown): boolean {
  if (a === b) return true;
  if (Array.isArray(a) && Array.isArray(b))
    return a.length === b.length && a.every((item, index) => sameJson(item, b[index]));
  if (isRecord(a) && isRecord(b))
    return [...new Set([...Object.keys(a), ...Object.keys(b)])].every((key) => sameJson(a[key], b[key]));
  return false;
}

/** The dotted paths of the innermost values that differ. */
export function differences(a: unknown, b: unknown, path = ''): string[] {
  if (sameJson(a, b)) return [];
  const under = (key: string | number) => (path === '' ? String(key) : `${path}.${key}`);
  if (Array.isArray(a) && Array.isArray(b))
    return Array.from({ length: Math.max(a.length, b.length) }, (_, index) =>
      differences(a[index], b[index], under(index)),
    ).flat();
  if (isRecord(a) && isRecord(b))
    return [...new Set([...Object.keys(a), ...Object.keys(b)])].flatMap((key) =>
      differences(a[key], b[key], under(key)),
    );
  return [path];
}

/** A connection of a draft with its place in the document. */
export interface DraftConnection {
  index: number;
  pieces: [string, string];
}

/** The connections that name two pieces; others cannot be shown beside an interface. */
export function connectionsOf(document: DraftDocument): DraftConnection[] {
  const list = document.connections;
  if (!Array.isArray(list)) return [];
  return list.flatMap((item: unknown, index) => {
    const pieces = isRecord(item) ? item.pieces : undefined;
    if (!Array.isArray(pieces)) return [];
    const ends: unknown[] = pieces;
    const [a, b] = ends;
    return typeof a === 'string' && typeof b === 'string' ? [{ index, pieces: [a, b] }] : [];
  });
}

/** A piece of a draft that can be drawn. */
export interface DraftPiece {
  id: string;
  y: number;
  z: number;
  width: number;
  depth: number;
  kind: string;
}

const finite = (value: unknown): value is number => typeof value === 'number' && Number.isFinite(value);

/** The pieces whose numbers can be drawn, with the kind of their material. */
export function piecesOf(document: DraftDocument): DraftPiece[] {
  const kinds = new Map<unknown, string>();
  const materials: unknown[] = Array.isArray(document.materials) ? document.materials : [];
  for (const material of materials)
    if (isRecord(material))
      kinds.set(material.id, typeof material.kind === 'string' ? material.kind : 'solid');
  const pieces: unknown[] = Array.isArray(document.pieces) ? document.pieces : [];
  return pieces.flatMap((piece) => {
    if (!isRecord(piece)) return [];
    const { id, y, z, width, depth, material } = piece;
    if (typeof id !== 'string' || !finite(y) || !finite(z) || !finite(width) || !finite(depth)) return [];
    if (width <= 0 || depth <= 0) return [];
    return [{ id, y, z, width, depth, kind: kinds.get(material) ?? 'solid' }];
  });
}

/** A draft with another value in the list of connections. */
export function withConnections(
  document: DraftDocument,
  change: (list: unknown[]) => unknown[],
): DraftDocument {
  const list: unknown[] = Array.isArray(document.connections) ? document.connections : [];
  return { ...document, connections: change(list) };
}

const capacityFor = (kind: string, before: unknown): Record<string, unknown> => {
  const basis = isRecord(before) ? before.basis : undefined;
  const factor = isRecord(before) ? before.factorOfSafety : undefined;
  const kept = basis === 'allowable' || (kind === 'fasteners' && basis === 'test') ? basis : 'ultimate';
  return kept === 'allowable' ? { basis: kept } : { basis: kept, factorOfSafety: factor ?? 2.5 };
};

/**
 * A connection of another kind. Its capacity is measured in another unit then, so the value has to be typed anew; what
 * only the old kind has goes.
 */
export function connectionOfKind(connection: unknown, kind: string): unknown {
  if (!isRecord(connection)) return connection;
  const { pieces, rules, zones, slipModulus, rows, fastener, capacity } = connection;
  const common = {
    pieces,
    kind,
    capacity: capacityFor(kind, capacity),
    ...(rules === undefined ? {} : { rules }),
  };
  if (kind !== 'fasteners') return common;
  return {
    ...common,
    rows: rows ?? 1,
    ...(zones === undefined ? {} : { zones }),
    ...(slipModulus === undefined ? {} : { slipModulus }),
    ...(fastener === undefined ? {} : { fastener }),
  };
}

/**
 * A capacity on another basis. A value on one basis is no value on another (an ultimate load is not an allowable one), so it
 * is not carried over; the factor of safety is.
 */
export function capacityOnBasis(before: unknown, basis: string): Record<string, unknown> {
  const factor = isRecord(before) ? before.factorOfSafety : undefined;
  if (basis === 'allowable') return { basis };
  return { basis, factorOfSafety: factor ?? 2.5, ...(basis === 'test' ? { values: [] } : {}) };
}

/** What a new connection between two pieces starts from: a copy of the last one of fasteners, else an empty one. */
export function newConnection(document: DraftDocument, pieces: [string, string]): unknown {
  const list: unknown[] = Array.isArray(document.connections) ? document.connections : [];
  const model = list.findLast((one) => isRecord(one) && one.kind === 'fasteners');
  if (!isRecord(model)) return connectionOfKind({ pieces }, 'fasteners');
  const { zones: _pinned, ...copied } = model;
  const fastener = isRecord(copied.fastener) ? { ...copied.fastener } : undefined;
  delete fastener?.headSide;
  return { ...structuredClone(copied), ...(fastener ? { fastener } : {}), pieces };
}
