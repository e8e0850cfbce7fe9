import type { MemberDocument } from '@shared/schemas/member';
import { refuse } from '../refused';

/**
 * Refuses a beam that can move without bending. Each part between hinges is a rigid bar with two freedoms
 * (sinking, turning); supports, clamps and hinges take freedoms away. Rank by elimination with full pivoting
 * on coordinates divided by the beam's length.
 */
export function refuseMechanism(document: MemberDocument): void {
  const { length, supports } = document;
  const hinges = [...document.hinges].sort((a, b) => a - b);
  const parts = hinges.length + 1;
  const rows: number[][] = [];
  const row = (): number[] => new Array<number>(2 * parts).fill(0);
  // w at x of part p: w_p + θ_p · x
  hinges.forEach((x, i) => {
    const line = row();
    line[2 * i] = 1;
    line[2 * i + 1] = x / length;
    line[2 * i + 2] = -1;
    line[2 * i + 3] = -x / length;
    rows.push(line);
  });
  for (const support of supports) {
    let part = hinges.findIndex((x) => support.x <= x);
    if (part < 0) part = parts - 1;
    const held = row();
    held[2 * part] = 1;
    held[2 * part + 1] = support.x / length;
    rows.push(held);
    if (support.kind === 'fixed') {
      const clamped = row();
      clamped[2 * part + 1] = 1;
      rows.push(clamped);
    }
  }
  const free = freeMotion(rows, 2 * parts);
  if (free === null) return;

  const only = supports[0];
  if (hinges.length === 0 && supports.length === 1 && only) {
    refuse(
      'unstable-beam',
      'supports',
      `The beam turns about its only support, ${only.id}: add a second support, or make ${only.id} fixed.`,
    );
  }
  const edges = [0, ...hinges, length];
  let moving = 0;
  let most = 0;
  for (let p = 0; p < parts; p++) {
    const motion = Math.abs(free[2 * p] ?? 0) + Math.abs(free[2 * p + 1] ?? 0);
    if (motion > most * (1 + 1e-9)) {
      most = motion;
      moving = p;
    }
  }
  const from = edges[moving] ?? 0;
  const to = edges[moving + 1] ?? length;
  refuse(
    'unstable-beam',
    'supports',
    `The part of the beam from x = ${from} to ${to} mm can move without bending: it needs one more support, or one hinge less.`,
  );
}

/** A motion that all rows allow, or null where they allow none. */
function freeMotion(rows: number[][], size: number): number[] | null {
  const order = Array.from({ length: size }, (_, i) => i);
  let rank = 0;
  while (rank < size && rank < rows.length) {
    let pivotRow = -1;
    let pivotColumn = -1;
    let largest = 1e-9;
    for (let r = rank; r < rows.length; r++) {
      for (let c = rank; c < size; c++) {
        const value = Math.abs(rows[r]?.[order[c] ?? 0] ?? 0);
        if (value > largest) {
          largest = value;
          pivotRow = r;
          pivotColumn = c;
        }
      }
    }
    if (pivotRow < 0) break;
    const pivot = rows[pivotRow] ?? [];
    rows[pivotRow] = rows[rank] ?? [];
    rows[rank] = pivot;
    const column = order[pivotColumn] ?? 0;
    order[pivotColumn] = order[rank] ?? 0;
    order[rank] = column;
    for (const line of rows) {
      if (line === pivot) continue;
      const factor = (line[column] ?? 0) / (pivot[column] ?? 1);
      if (factor === 0) continue;
      for (let c = 0; c < size; c++) line[c] = (line[c] ?? 0) - factor * (pivot[c] ?? 0);
    }
    rank++;
  }
  if (rank === size) return null;
  const motion = new Array<number>(size).fill(0);
  const freeColumn = order[rank] ?? 0;
  motion[freeColumn] = 1;
  for (let r = 0; r < rank; r++) {
    const column = order[r] ?? 0;
    motion[column] = -(rows[r]?.[freeColumn] ?? 0) / (rows[r]?.[column] ?? 1);
  }
  return motion;
}
