import type { MemberInput } from '@shared/schemas/member';
import type { Random } from './random';

/** Layups of every kind that the trade builds, and some that it does not, with figures nobody would choose. */

type PieceInput = MemberInput['pieces'][number];
export type MaterialInput = MemberInput['materials'][number];
/** Two pieces that touch, and whether the layup falls apart without a connection there. */
export interface Joint {
  pieces: [string, string];
  needed: boolean;
}
export interface Layup {
  materials: MaterialInput[];
  pieces: PieceInput[];
  joints: Joint[];
}

const joint = (a: string, b: string, needed = true): Joint => ({ pieces: [a, b], needed });

function materials(random: Random): MaterialInput[] {
  return Array.from({ length: random.whole(1, 3) }, (_, i) => ({
    id: `w${i + 1}`,
    name: `Wood ${i + 1}`,
    E: random.whole(60, 150) * 100 + random.whole(0, 99),
    density: random.whole(350, 650),
  }));
}

interface Maker {
  random: Random;
  piece: (id: string, y: number, z: number, width: number, depth: number) => PieceInput;
  board: () => { width: number; depth: number };
}

const centred = (width: number): number => -width / 2;

function stack({ random, piece, board }: Maker): [PieceInput[], Joint[]] {
  const alike = random.chance(0.4) ? board() : null;
  const pieces: PieceInput[] = [];
  let z = random.decimal(-50, 50, 1);
  for (let i = 0; i < random.whole(2, 5); i += 1) {
    const { width, depth } = alike ?? board();
    pieces.push(piece(`P${i + 1}`, centred(width) + random.decimal(-10, 10, 1), z, width, depth));
    z += depth;
  }
  return [pieces, pieces.slice(1).map((each, i) => joint(`P${i + 1}`, each.id))];
}

function teeOrI({ random, piece }: Maker): [PieceInput[], Joint[]] {
  const web = { width: random.whole(30, 60), depth: random.whole(120, 300) };
  const pieces = [piece('web', centred(web.width), 0, web.width, web.depth)];
  const joints: Joint[] = [];
  const shape = random.pick('top', 'bottom', 'both');
  const flange = { width: random.whole(80, 220), depth: random.decimal(20, 50, 1) };
  if (shape !== 'bottom') {
    pieces.push(piece('top', centred(flange.width), web.depth, flange.width, flange.depth));
    joints.push(joint('web', 'top'));
  }
  if (shape !== 'top') {
    const width = random.chance(0.5) ? flange.width : random.whole(80, 220);
    pieces.push(piece('bottom', centred(width), -flange.depth, width, flange.depth));
    joints.push(joint('bottom', 'web'));
  }
  return [random.chance(0.5) ? random.shuffled(pieces) : pieces, joints];
}

/** Webs outside the flanges: vertical interfaces. With `between`, webs stand on the flanges: horizontal ones. */
function box({ random, piece }: Maker, between: boolean): [PieceInput[], Joint[]] {
  const inside = random.whole(80, 160);
  const depth = random.whole(220, 400);
  const flange = random.whole(35, 60);
  const left = random.whole(9, 40);
  const right = random.chance(0.5) ? left : random.whole(9, 40);
  const webZ = between ? flange : 0;
  const webDepth = between ? depth - 2 * flange : depth;
  const flangeY = between ? 0 : left;
  const flangeWidth = between ? inside + left + right : inside;
  const pieces = [
    piece('bottom', flangeY, 0, flangeWidth, flange),
    piece('top', flangeY, depth - flange, flangeWidth, flange),
    piece('left', 0, webZ, left, webDepth),
    piece('right', left + inside, webZ, right, webDepth),
  ];
  const joints = [joint('top', 'left'), joint('top', 'right'), joint('bottom', 'left')];
  // the fourth closes the loop; without it the box is a tree
  joints.push(joint('bottom', 'right', false));
  if (between && random.chance(0.3)) {
    const width = random.whole(9, 20);
    pieces.push(piece('middle', left + Math.floor(inside / 2) - 5, webZ, width, webDepth));
    joints.push(joint('top', 'middle'), joint('bottom', 'middle', false));
  }
  return [random.shuffled(pieces), joints];
}

function plies({ random, piece }: Maker): [PieceInput[], Joint[]] {
  const depth = random.whole(140, 300);
  const level = random.chance(0.6);
  const pieces: PieceInput[] = [];
  let y = random.decimal(-20, 20, 1);
  for (let i = 0; i < random.whole(2, 5); i += 1) {
    const width = random.pick(19, 38, 45, 63.5, 90);
    const own = level ? depth : depth - random.whole(0, 60);
    pieces.push(piece(`P${i + 1}`, y, level ? 0 : random.whole(0, 30), width, own));
    y += width;
  }
  return [pieces, pieces.slice(1).map((each, i) => joint(`P${i + 1}`, each.id))];
}

/** Two plies, each of two boards on each other: a ring of four interfaces, or three and one left open. */
function ring({ random, piece }: Maker): [PieceInput[], Joint[]] {
  const lower = random.whole(90, 160);
  const upper = random.whole(60, 140);
  const width = [random.whole(30, 60), random.whole(30, 90)] as const;
  const shift = random.pick(0, random.whole(-20, 20));
  const pieces = [
    piece('a', 0, 0, width[0], lower),
    piece('b', 0, lower, width[0], upper),
    piece('c', width[0], shift, width[1], lower + shift),
    piece('d', width[0], lower + 2 * shift, width[1], upper),
  ];
  return [pieces, [joint('a', 'b'), joint('c', 'd'), joint('a', 'c'), joint('b', 'd', false)]];
}

export const layupKinds = ['stack', 'tee-or-i', 'box-outside', 'box-between', 'plies', 'ring'] as const;
export type LayupKind = (typeof layupKinds)[number];

/** A layup of one kind; the origin is somewhere, the woods are unlike in most. */
export function randomLayup(random: Random, kind: LayupKind): Layup {
  const woods = materials(random);
  const material = (): string => random.pick('w1', ...woods.map(({ id }) => id));
  const shift = random.chance(0.3)
    ? { y: random.whole(-500, 500), z: random.whole(-500, 500) }
    : { y: 0, z: 0 };
  const maker: Maker = {
    random,
    piece: (id, y, z, width, depth) => ({
      id,
      material: material(),
      y: y + shift.y,
      z: z + shift.z,
      width,
      depth,
    }),
    board: () => ({ width: random.decimal(80, 240, 1), depth: random.pick(19, 38, 45.5, 63, 89) }),
  };
  const make: Record<LayupKind, () => [PieceInput[], Joint[]]> = {
    stack: () => stack(maker),
    'tee-or-i': () => teeOrI(maker),
    'box-outside': () => box(maker, false),
    'box-between': () => box(maker, true),
    plies: () => plies(maker),
    ring: () => ring(maker),
  };
  const [pieces, joints] = make[kind]();
  return { materials: woods, pieces, joints };
}
