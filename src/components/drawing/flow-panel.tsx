import { memo, useId } from 'react';
import { anchorAt, areaTo, indexOfMost, polyline, stretchesAbove, withoutCollisions } from './curve';
import type { Step, WantedLabel, XScale } from './curve';

const LABEL = 16;
/** What is carried may be this many times what is needed before its line leaves the panel. */
const MOST = 2.4;

/** What an interface needs along the beam, and what its schedule carries. */
export interface FlowCurves {
  x: readonly number[];
  needed: readonly number[];
  carried: readonly Step[];
  /** true where `carried` is the most that rules and fasteners allow, because no schedule exists */
  onlyPossible: boolean;
}

const stepLine = (steps: readonly Step[], scale: XScale, at: (value: number) => number): string =>
  steps
    .map(({ from, to, value }, index) => {
      const y = at(value).toFixed(1);
      return index === 0
        ? `M${scale.at(from)} ${y}H${scale.at(to).toFixed(1)}`
        : `V${y}H${scale.at(to).toFixed(1)}`;
    })
    .join('');

/**
 * Shear flow: what is needed as a wash under its line, what is carried as a stepped line of ink; where needed is
 * above carried the stretch between is hatched in crayon.
 */
export const FlowPanel = memo(function FlowPanel({
  curves,
  scale,
  top,
  height,
  write,
}: {
  curves: FlowCurves;
  scale: XScale;
  top: number;
  height: number;
  write: (value: number) => string;
}) {
  const hatch = useId();
  const { x, needed, carried, onlyPossible } = curves;
  const peak = indexOfMost(needed, (value) => value);
  const most = Math.max(0, needed[peak] ?? 0);
  const strongest = Math.max(0, ...carried.map((step) => step.value));
  const limit = most > 0 ? Math.min(Math.max(most, strongest), most * MOST) : Math.max(strongest, 1e-9);
  const base = top + height;
  const factor = (height - LABEL) / limit;
  const at = (value: number) => base - Math.min(value, limit) * factor;
  const xs = x.map(scale.at);
  const over = stretchesAbove(x, needed, carried);
  const offScale = strongest > limit * (1 + 1e-9);

  const wanted: WantedLabel[] = [];
  if (most > 0) {
    const text = `needed ${write(most)}`;
    const last = x[needed.findLastIndex((value) => value >= most * (1 - 1e-9))] ?? 0;
    const first = x[peak] ?? 0;
    // the middle of a plateau; of two peaks apart the first
    const along = last - first < 0.2 * scale.length ? (first + last) / 2 : first;
    wanted.push({ ...anchorAt(scale.at(along), scale, text), y: base - 7, text });
  }
  const first = carried.reduce<Step | undefined>(
    (best, step) => (best && best.value >= step.value ? best : step),
    undefined,
  );
  if (first) {
    const word = onlyPossible ? 'at most' : 'carried';
    const text = `${word} ${write(first.value)}${offScale ? ', off the scale' : ''}`;
    const middle = scale.at((first.from + first.to) / 2);
    wanted.push({ ...anchorAt(middle, scale, text), y: at(first.value) - 5, text });
  }
  const labels = withoutCollisions(wanted);

  return (
    <g>
      <defs>
        <pattern id={hatch} width={6} height={6} patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <rect width={6} height={6} fill="var(--crayon-wash)" />
          <path d="M0 0V6" stroke="var(--crayon)" strokeWidth={2.4} />
        </pattern>
      </defs>
      <path d={areaTo(xs, needed.map(at), base)} fill="var(--spruce-wash)" />
      {over.map((points) => (
        <path
          key={`${points[0]?.x ?? 0} ${points.at(-1)?.x ?? 0}`}
          d={`${polyline(
            points.map((point) => scale.at(point.x)),
            points.map((point) => at(point.curve)),
          )}${[...points]
            .reverse()
            .map((point) => `L${scale.at(point.x).toFixed(1)} ${at(point.step).toFixed(1)}`)
            .join('')}Z`}
          fill={`url(#${hatch})`}
        />
      ))}
      <path d={`M${scale.left} ${base}H${scale.right}`} stroke="var(--ink2)" strokeOpacity={0.7} />
      <path d={polyline(xs, needed.map(at))} fill="none" stroke="var(--spruce)" strokeWidth={1.6} />
      {over.map((points) => (
        <path
          key={`line ${points[0]?.x ?? 0} ${points.at(-1)?.x ?? 0}`}
          d={polyline(
            points.map((point) => scale.at(point.x)),
            points.map((point) => at(point.curve)),
          )}
          fill="none"
          stroke="var(--crayon)"
          strokeWidth={1.8}
        />
      ))}
      <path
        d={stepLine(carried, scale, at)}
        fill="none"
        stroke="var(--ink)"
        strokeWidth={2.2}
        {...(onlyPossible || offScale ? { strokeDasharray: '7 4' } : {})}
      />
      {labels.map((label) => (
        <text
          key={label.text}
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
