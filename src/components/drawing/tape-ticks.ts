import { formatNumber } from '@shared/units';
import type { UnitSystem } from '@shared/units';

/** One mark on a tape: how long it is, and what is written under it, if anything. */
export interface TapeTick {
  /** mm */
  x: number;
  size: 'small' | 'middle' | 'large';
  label: string | null;
  /** the metre and the foot stand out, as on a real tape */
  bold: boolean;
}

export interface Tape {
  ticks: TapeTick[];
  /** mm; the smallest division drawn, and the step of the arrow keys */
  step: number;
}

interface Ladder {
  small: number;
  middle: number;
  large: number;
}

const INCH = 25.4;
const NEAREST = 3.4;
const LABEL_ROOM = 46;

const metricLadder: readonly Ladder[] = [
  { small: 1, middle: 5, large: 10 },
  { small: 2, middle: 10, large: 50 },
  { small: 5, middle: 10, large: 100 },
  { small: 10, middle: 50, large: 100 },
  { small: 20, middle: 100, large: 500 },
  { small: 50, middle: 100, large: 500 },
  { small: 100, middle: 500, large: 1_000 },
  { small: 200, middle: 1_000, large: 2_000 },
  { small: 500, middle: 1_000, large: 5_000 },
  { small: 1_000, middle: 5_000, large: 10_000 },
  { small: 10_000, middle: 50_000, large: 100_000 },
  { small: 100_000, middle: 500_000, large: 1_000_000 },
];

const usLadder: readonly Ladder[] = [
  { small: 1 / 16, middle: 1 / 4, large: 1 },
  { small: 1 / 4, middle: 1, large: 3 },
  { small: 1 / 2, middle: 1, large: 6 },
  { small: 1, middle: 6, large: 12 },
  { small: 2, middle: 12, large: 24 },
  { small: 6, middle: 12, large: 60 },
  { small: 12, middle: 60, large: 120 },
  { small: 60, middle: 120, large: 600 },
  { small: 120, middle: 600, large: 1_200 },
  { small: 1_200, middle: 6_000, large: 12_000 },
  { small: 12_000, middle: 60_000, large: 120_000 },
].map(({ small, middle, large }) => ({ small: small * INCH, middle: middle * INCH, large: large * INCH }));

const isMultiple = (count: number, small: number, of: number): boolean => {
  const every = Math.round(of / small);
  return count % every === 0;
};

const labelOf = (x: number, system: UnitSystem): string => {
  if (system === 'metric') return formatNumber(x);
  const inches = Math.round(x / INCH);
  const feet = Math.floor(inches / 12);
  const rest = inches - feet * 12;
  if (feet === 0) return `${rest}″`;
  return rest === 0 ? `${formatNumber(feet)}′` : `${formatNumber(feet)}′ ${rest}″`;
};

/**
 * The marks of a tape laid along a beam of `length` mm drawn at `scale` pixels a mm: ticks of 20, 100 and 500 mm,
 * or 1, 6 and 12 in, closer or wider as the scale asks, never nearer than the eye can tell.
 */
export function tapeTicks(length: number, scale: number, system: UnitSystem): Tape {
  const ladder = system === 'metric' ? metricLadder : usLadder;
  const fits = ladder.find(({ small, large }) => small * scale >= NEAREST && large * scale >= LABEL_ROOM);
  const { small, middle, large } = fits ?? { small: length, middle: length, large: length };
  const strong = system === 'metric' ? 1_000 : 12 * INCH;
  const count = Math.floor(length / small + 1e-9);
  const ticks = Array.from({ length: count + 1 }, (_, index): TapeTick => {
    const x = index * small;
    const isLarge = isMultiple(index, small, large);
    const size = isLarge ? 'large' : isMultiple(index, small, middle) ? 'middle' : 'small';
    const bold = Math.abs(x / strong - Math.round(x / strong)) < 1e-6;
    return { x, size, bold, label: isLarge && index > 0 ? labelOf(x, system) : null };
  });
  return { ticks, step: small };
}
