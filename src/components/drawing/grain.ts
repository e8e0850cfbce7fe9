/** A seeded stream of numbers between 0 and 1 (mulberry32), so that a piece has the same grain every time. */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}

/** A seed from a name. */
export function seedOf(name: string): number {
  let seed = 2_166_136_261;
  for (const sign of Array.from(name)) seed = Math.imul(seed ^ (sign.codePointAt(0) ?? 0), 16_777_619);
  return seed >>> 0;
}

interface Box {
  x: number;
  y: number;
  width: number;
  height: number;
}

const r = (value: number): string => value.toFixed(1);

/** Annual rings of an end face: arcs about a pith outside of it. Drawn clipped to the face. */
function endGrainArcs(box: Box, seed: number): string {
  const random = seeded(seed);
  const flat = box.width >= box.height;
  const across = Math.min(box.width, box.height);
  const below = random() < 0.5;
  const away = across * (0.5 + 0.9 * random());
  const pithX = box.x + box.width * (0.3 + 0.4 * random());
  const pith = flat
    ? { x: pithX, y: below ? box.y + box.height + away : box.y - away }
    : { x: pithX, y: below ? box.y + box.height + box.width * 3 : box.y - box.width * 3 };
  const corners = [box.x, box.x + box.width].flatMap((x) =>
    [box.y, box.y + box.height].map((y) => Math.hypot(x - pith.x, y - pith.y)),
  );
  const nearest = Math.max(2, pith.y > box.y + box.height ? pith.y - box.y - box.height : box.y - pith.y);
  const farthest = Math.max(...corners);
  const paths: string[] = [];
  for (let radius = nearest + 4; radius < farthest; radius += 8 + 5 * random())
    paths.push(
      `M${r(pith.x - radius)} ${r(pith.y)}A${r(radius)} ${r(radius)} 0 1 1 ${r(pith.x + radius)} ${r(pith.y)}A${r(radius)} ${r(radius)} 0 1 1 ${r(pith.x - radius)} ${r(pith.y)}`,
    );
  return paths.join('');
}

/** Plies of a panel, along the longer side of its face. */
function panelPlies(box: Box): string {
  const along = box.width >= box.height;
  const thickness = along ? box.height : box.width;
  const plies = Math.max(3, Math.min(9, 2 * Math.floor(thickness / 8) + 1));
  return Array.from({ length: plies - 1 }, (_, index) => {
    const at = ((index + 1) * thickness) / plies;
    return along
      ? `M${r(box.x)} ${r(box.y + at)}h${r(box.width)}`
      : `M${r(box.x + at)} ${r(box.y)}v${r(box.height)}`;
  }).join('');
}

/** What an end face of a material looks like, as one path; nothing for steel. */
export function endGrain(box: Box, kind: string, seed: number): string {
  if (kind === 'steel') return '';
  if (kind === 'plywood' || kind === 'osb' || kind === 'lvl') return panelPlies(box);
  return endGrainArcs(box, seed);
}

/** A board seen from its side: a few lines that wander along it. */
export function longGrain(box: Box, kind: string, seed: number): string {
  if (kind === 'steel' || box.height < 5) return '';
  const random = seeded(seed);
  const lines = Math.max(1, Math.min(5, Math.round(box.height / 9)));
  const steps = Math.max(3, Math.round(box.width / 130));
  const sway = Math.min(2.2, box.height / 9);
  return Array.from({ length: lines }, (_, index) => {
    const base = box.y + (box.height * (index + 0.35 + 0.3 * random())) / lines;
    const from = box.x + (index % 2 === 0 ? 0 : box.width * 0.3 * random());
    const to = box.x + box.width * (index % 3 === 1 ? 0.7 + 0.3 * random() : 1);
    const step = (to - from) / steps;
    let path = `M${r(from)} ${r(base)}`;
    for (let at = 1; at <= steps; at += 1) {
      const y = base + (random() - 0.5) * 2 * sway;
      path += `Q${r(from + step * (at - 0.5))} ${r(y)} ${r(from + step * at)} ${r(base + (random() - 0.5) * sway)}`;
    }
    return path;
  }).join('');
}
