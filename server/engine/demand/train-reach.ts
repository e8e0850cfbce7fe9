import type { Beam } from '../beam/combinations';
import type { InfluenceLine } from '../beam/influence';
import { eachStretch, stationary, TrainSum, type Train } from '../beam/train';
import { corners, type Reach } from './reach';
import { spread } from './sideways-load';

/**
 * Pairs of shear at x and load per length on the train's own stack at x, for all positions of the train.
 * An axle spreads over the section's depth each side, so the load changes where an axle comes within reach;
 * near the beam's ends, where less length is left to spread over, it varies with the position and is sampled.
 */
export function reachAt(
  beam: Beam,
  trainIndex: number,
  x: number,
  line: InfluenceLine,
  depth: number,
): Reach[] {
  const train = beam.trains[trainIndex];
  if (!train) return [];
  const { length } = beam;
  // x − o + o may miss x by rounding, just where an axle stands on the beam's end or at the edge of its spread.
  const hair = 1e-9 * length;
  const perLength = (middle: number, p: number): number => {
    let sum = 0;
    eachAxle(train, (offset, value) => {
      const at = middle + offset;
      if (at < -hair || at > length + hair || Math.abs(at - x) > depth + hair) return;
      const over = spread(Math.min(length, Math.max(0, p + offset)), depth, length);
      sum += value / (over.to - over.from);
    });
    return sum;
  };
  return pairs(beam, train, trainIndex, line, [x - depth, x + depth, depth, length - depth], perLength);
}

/** The same for a stretch from a to b: ∫V and the load that falls on the stretch, N. */
export function reachOver(
  beam: Beam,
  trainIndex: number,
  a: number,
  b: number,
  line: InfluenceLine,
  depth: number,
): Reach[] {
  const train = beam.trains[trainIndex];
  if (!train) return [];
  const { length } = beam;
  const hair = 1e-9 * length;
  const onStretch = (middle: number, p: number): number => {
    let sum = 0;
    eachAxle(train, (offset, value) => {
      const at = middle + offset;
      if (at < -hair || at > length + hair) return;
      const over = spread(Math.min(length, Math.max(0, p + offset)), depth, length);
      const common = Math.min(b, over.to) - Math.max(a, over.from);
      if (common > 0) sum += (value * common) / (over.to - over.from);
    });
    return sum;
  };
  const cuts = [a - depth, a + depth, b - depth, b + depth, depth, length - depth];
  return pairs(beam, train, trainIndex, line, cuts, onStretch);
}

function eachAxle(train: Train, visit: (offset: number, value: number) => void): void {
  train.offsets.forEach((offset, i) => visit(offset, train.values[i] ?? 0));
}

/** How many places inside a stretch are tried where the load passed sideways varies with the position. */
const samples = 6;

function pairs(
  beam: Beam,
  train: Train,
  trainIndex: number,
  line: InfluenceLine,
  places: readonly number[],
  across: (middle: number, p: number) => number,
): Reach[] {
  const { influence } = beam;
  if (!influence) return [];
  const sum = new TrainSum(train, line, influence);
  const found: Reach[] = [];
  const cuts = places.flatMap((x) => Array.from(train.offsets, (o) => x - o));
  eachStretch(
    train,
    line,
    (k, a, b) => {
      const middle = (a + b) / 2;
      const note = (p: number): void => {
        sum.at(k, p, middle);
        found.push({ along: sum.value, across: across(middle, p), positions: [{ train: trainIndex, x: p }] });
      };
      note(a);
      const h = b - a;
      if (h === 0) return;
      const fa = sum.value;
      const sa = sum.slope;
      note(b);
      for (const u of stationary(sum.value - fa, h * sa, h * sum.slope)) if (u > 0 && u < 1) note(a + u * h);
      const first = found[found.length - 2]?.across ?? 0;
      if (Math.abs(across(middle, middle) - first) > 1e-12 * Math.abs(first)) {
        for (let i = 1; i < samples; i++) note(a + (i * h) / samples);
      }
    },
    cuts,
  );
  return corners(found);
}
