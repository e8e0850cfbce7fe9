import { memo } from 'react';
import type { XScale } from './curve';
import type { Tape } from './tape-ticks';

const TICK = { small: 5, middle: 9, large: 13 };

/** A tape laid along the beam, its figures as on a real one. */
export const TapeRule = memo(function TapeRule({
  tape,
  scale,
  top,
  height,
}: {
  tape: Tape;
  scale: XScale;
  top: number;
  height: number;
}) {
  const ticks = (size: 'small' | 'middle' | 'large') =>
    tape.ticks
      .filter((tick) => tick.size === size)
      .map((tick) => `M${scale.at(tick.x).toFixed(1)} ${top}v${TICK[size]}`)
      .join('');
  return (
    <g>
      <rect
        x={scale.left}
        y={top}
        width={scale.right - scale.left}
        height={height}
        fill="var(--amber-wash)"
        stroke="var(--ink)"
      />
      <path d={ticks('small')} stroke="var(--ink)" strokeWidth={0.8} strokeOpacity={0.75} />
      <path d={ticks('middle')} stroke="var(--ink)" strokeWidth={1} />
      <path d={ticks('large')} stroke="var(--ink)" strokeWidth={1.4} />
      {tape.ticks.map((tick) => {
        if (tick.label === null) return null;
        const x = scale.at(tick.x);
        if (x + tick.label.length * 3.5 > scale.right - 2) return null;
        return (
          <text
            key={tick.x}
            x={x}
            y={top + height - 6}
            textAnchor="middle"
            fontSize={11.5}
            fontWeight={tick.bold ? 600 : 400}
            fill="var(--ink)"
          >
            {tick.label}
          </text>
        );
      })}
    </g>
  );
});
