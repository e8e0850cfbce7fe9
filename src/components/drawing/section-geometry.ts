/** A rectangle of the section: y to the right, z up, in mm; `kind` is its material's. */
export interface DrawnPiece {
  id: string;
  y: number;
  z: number;
  width: number;
  depth: number;
  kind: string;
}

/** Where two pieces meet: a line across the section. */
export interface Contact {
  id: string;
  pieces: [string, string];
  orientation: 'horizontal' | 'vertical';
  /** ends of the line, from left to right or from bottom to top */
  from: { y: number; z: number };
  to: { y: number; z: number };
}

/** What two pieces have in common that they may not have. */
export interface Overlap {
  pieces: [string, string];
  y: number;
  z: number;
  width: number;
  depth: number;
}

/** mm; what is nearer than this touches */
const TOUCHING = 1e-6;

const shared = (a: number, aSize: number, b: number, bSize: number): [number, number] => [
  Math.max(a, b),
  Math.min(a + aSize, b + bSize),
];

const contactOf = (a: DrawnPiece, b: DrawnPiece): Omit<Contact, 'id'> | null => {
  const [left, right] = shared(a.y, a.width, b.y, b.width);
  const [bottom, top] = shared(a.z, a.depth, b.z, b.depth);
  const pieces: [string, string] = [a.id, b.id];
  if (right - left > TOUCHING && Math.abs(top - bottom) <= TOUCHING)
    return { pieces, orientation: 'horizontal', from: { y: left, z: top }, to: { y: right, z: top } };
  if (top - bottom > TOUCHING && Math.abs(right - left) <= TOUCHING)
    return { pieces, orientation: 'vertical', from: { y: right, z: bottom }, to: { y: right, z: top } };
  return null;
};

const pairs = (pieces: readonly DrawnPiece[]): [DrawnPiece, DrawnPiece][] =>
  pieces.flatMap((a, index) => pieces.slice(index + 1).map((b): [DrawnPiece, DrawnPiece] => [a, b]));

/** Every interface of the section, numbered J1, J2 … by the earlier piece, then the later. */
export function findContacts(pieces: readonly DrawnPiece[]): Contact[] {
  return pairs(pieces)
    .flatMap(([a, b]) => contactOf(a, b) ?? [])
    .map((contact, index) => ({ id: `J${index + 1}`, ...contact }));
}

/** Every pair of pieces that lie in each other, with the rectangle they share. */
export function findOverlaps(pieces: readonly DrawnPiece[]): Overlap[] {
  return pairs(pieces).flatMap(([a, b]) => {
    const [left, right] = shared(a.y, a.width, b.y, b.width);
    const [bottom, top] = shared(a.z, a.depth, b.z, b.depth);
    if (right - left <= TOUCHING || top - bottom <= TOUCHING) return [];
    return [{ pieces: [a.id, b.id], y: left, z: bottom, width: right - left, depth: top - bottom }];
  });
}

/** The smallest rectangle around all pieces; null without pieces. */
export function boundsOf(
  pieces: readonly DrawnPiece[],
): { left: number; right: number; bottom: number; top: number } | null {
  if (pieces.length === 0) return null;
  return {
    left: Math.min(...pieces.map((piece) => piece.y)),
    right: Math.max(...pieces.map((piece) => piece.y + piece.width)),
    bottom: Math.min(...pieces.map((piece) => piece.z)),
    top: Math.max(...pieces.map((piece) => piece.z + piece.depth)),
  };
}

/**
 * Which of the two timbers each piece is drawn in, so that neighbours differ where two colours suffice: the first
 * colour not taken by a neighbour that already has one.
 */
export function alternate(pieces: readonly DrawnPiece[], contacts: readonly Contact[]): Map<string, 0 | 1> {
  const colours = new Map<string, 0 | 1>();
  for (const piece of pieces) {
    const neighbours = contacts
      .filter((contact) => contact.pieces.includes(piece.id))
      .map((contact) => colours.get(contact.pieces[0] === piece.id ? contact.pieces[1] : contact.pieces[0]));
    colours.set(piece.id, neighbours.includes(0) ? 1 : 0);
  }
  return colours;
}

/** The breaks of a chain of dimensions: every edge once, ascending, none nearer to the next than `least`. */
export function dimensionStops(edges: readonly number[], least: number): number[] {
  const sorted = [...edges].sort((a, b) => a - b);
  const last = sorted.at(-1);
  const stops: number[] = [];
  for (const edge of sorted) if (stops.length === 0 || edge - (stops.at(-1) ?? 0) > least) stops.push(edge);
  if (last !== undefined && stops.length > 1 && stops.at(-1) !== last) stops[stops.length - 1] = last;
  return stops;
}

/**
 * Moves labels apart along one axis: each wants to be at its place, none may be nearer than `gap` to its neighbour,
 * all stay between `low` and `high` while there is room. Answers the places in the order given.
 */
export function spread(wanted: readonly number[], gap: number, low: number, high: number): number[] {
  const order = wanted.map((place, index) => ({ place, index })).sort((a, b) => a.place - b.place);
  const placed: number[] = [];
  for (const { place } of order)
    placed.push(Math.max(place, placed.length === 0 ? low : (placed.at(-1) ?? low) + gap));
  for (let i = placed.length - 1, limit = high; i >= 0; i -= 1) {
    placed[i] = Math.min(placed[i] ?? limit, limit);
    limit = (placed[i] ?? limit) - gap;
  }
  const answer = new Array<number>(wanted.length).fill(0);
  order.forEach(({ index }, at) => {
    answer[index] = placed[at] ?? 0;
  });
  return answer;
}
