import { memo } from 'react';
import { anchorAt, areaTo, indexOfMost, polyline, withoutCollisions } from './curve';
import type { WantedLabel, XScale } from './curve';

const LABEL = 14;

/** The largest and the smallest value at each station; x repeats where the value jumps. */
export interface Envelope {
  x: readonly number[];
  max: readonly number[];
  min: readonly number[];
}

interface Room {
  top: number;
  height: number;
}

/** Values to pixels: nought and both extremes in sight, room for figures above and below. */
const valueScale = ({ max, min }: Envelope, { top, height }: Room) => {
  const high = Math.max(0, ...max);
  const low = Math.min(0, ...min);
  const above = high > 1e-12 ? LABEL : 2;
  const below = low < -1e-12 ? LABEL : 2;
  const factor = high - low > 1e-12 ? (height - above - below) / (high - low) : 0;
  const base = top + above + high * factor;
  return { base, at: (value: number) => base - value * factor, factor };
};

const jumpLabels = (
  x: readonly number[],
  values: readonly number[],
  largest: number,
): { x: number; value: number; anchor: 'start' | 'end' }[] =>
  values.flatMap((value, index) => {
    const before = values[index - 1];
    if (index === 0 || before === undefined || x[index] !== x[index - 1]) return [];
    if (Math.abs(value - before) < 0.2 * largest) return [];
    const at = x[index] ?? 0;
    return [
      { x: at, value: before, anchor: 'end' as const },
      { x: at, value, anchor: 'start' as const },
    ];
  });

/** The figures that are written: extremes first, then both sides of the larger jumps. */
const figures = (
  envelope: Envelope,
  scale: XScale,
  at: (value: number) => number,
  write: (value: number) => string,
  jumps: boolean,
): WantedLabel[] => {
  const { x, max, min } = envelope;
  const largest = Math.max(...max.map(Math.abs), ...min.map(Math.abs));
  if (!(largest > 0)) return [];
  const label = (position: number, value: number): WantedLabel => {
    const text = write(value);
    return { ...anchorAt(scale.at(position), scale, text), y: at(value) + (value < 0 ? 12 : -4), text };
  };
  const wanted: WantedLabel[] = [];
  const top = indexOfMost(max, (value) => value);
  const bottom = indexOfMost(min, (value) => -value);
  if ((max[top] ?? 0) > 1e-9 * largest) wanted.push(label(x[top] ?? 0, max[top] ?? 0));
  if ((min[bottom] ?? 0) < -1e-9 * largest) wanted.push(label(x[bottom] ?? 0, min[bottom] ?? 0));
  if (!jumps) return withoutCollisions(wanted);
  for (const jump of [...jumpLabels(x, max, largest), ...jumpLabels(x, min, largest)]) {
    if (Math.abs(jump.value) < 0.05 * largest) continue;
    const side = jump.anchor === 'start' ? 4 : -4;
    wanted.push({
      x: scale.at(jump.x) + side,
      y: at(jump.value) + (jump.value < 0 ? 12 : -4),
      text: write(jump.value),
      anchor: jump.anchor,
    });
  }
  return withoutCollisions(wanted.filter((one) => one.x > scale.left && one.x < scale.right));
};

/** Shear or moment over the beam: a wash under the lines of the envelope, its extremes written at the curve. */
export const EnvelopePanel = memo(function EnvelopePanel({
  envelope,
  scale,
  room,
  write,
  jumps,
}: {
  envelope: Envelope;
  scale: XScale;
  room: Room;
  write: (value: number) => string;
  /** whether both sides of a jump are written */
  jumps: boolean;
}) {
  const { base, at } = valueScale(envelope, room);
  const xs = envelope.x.map(scale.at);
  const upper = envelope.max.map(at);
  const lower = envelope.min.map(at);
  const apart = envelope.max.some((value, index) => value !== envelope.min[index]);
  return (
    <g>
      <path d={areaTo(xs, upper, base)} fill="var(--spruce-wash)" />
      {apart && <path d={areaTo(xs, lower, base)} fill="var(--spruce-wash)" />}
      <path d={`M${scale.left} ${base}H${scale.right}`} stroke="var(--ink2)" strokeOpacity={0.7} />
      <path d={polyline(xs, upper)} fill="none" stroke="var(--spruce)" strokeWidth={1.6} />
      {apart && (
        <path
          d={polyline(xs, lower)}
          fill="none"
          stroke="var(--spruce)"
          strokeWidth={1.6}
          className="print-dash"
        />
      )}
      {figures(envelope, scale, at, write, jumps).map((label) => (
        <text
          key={`${label.x} ${label.y}`}
          x={label.x}
          y={label.y}
          textAnchor={label.anchor}
          fontSize={11}
          fill="var(--ink2)"
          className="halo"
        >
          {label.text}
        </text>
      ))}
    </g>
  );
});
