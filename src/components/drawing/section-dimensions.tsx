import { dimensionStops } from './section-geometry';
import type { DrawnPiece } from './section-geometry';
import type { SectionScale } from './section-drawing';

const SLASH = 4;

/** The overall width, above the section. */
export function WidthDimension({
  scale,
  label,
  raised,
}: {
  scale: SectionScale;
  label: string;
  raised: boolean;
}) {
  const y = scale.top - (raised ? 46 : 22);
  const middle = (scale.left + scale.right) / 2;
  const half = label.length * 3.4 + 4;
  const fits = scale.right - scale.left > 2 * half + 12;
  return (
    <g stroke="var(--ink2)" fill="none">
      {fits ? (
        <path d={`M${scale.left} ${y}H${middle - half}M${middle + half} ${y}H${scale.right}`} />
      ) : (
        <path d={`M${scale.left} ${y}H${scale.right}`} />
      )}
      {[scale.left, scale.right].map((x) => (
        <path key={x} d={`M${x - SLASH} ${y + SLASH}L${x + SLASH} ${y - SLASH}`} />
      ))}
      <text
        x={middle}
        y={fits ? y : y - 9}
        dy="0.35em"
        textAnchor="middle"
        fontSize={11}
        stroke="none"
        fill="var(--ink2)"
      >
        {label}
      </text>
    </g>
  );
}

/** Depths as a chain along the right side, broken at every edge of a piece. */
export function DepthChain({
  pieces,
  scale,
  write,
}: {
  pieces: readonly DrawnPiece[];
  scale: SectionScale;
  write: (mm: number) => string;
}) {
  const stops = dimensionStops(
    pieces.flatMap((piece) => [piece.z, piece.z + piece.depth]),
    0.05,
  );
  const x = scale.right + 14;
  const first = stops[0];
  const last = stops.at(-1);
  if (first === undefined || last === undefined) return null;
  return (
    <g stroke="var(--ink2)" fill="none">
      <path d={`M${x} ${scale.y(last)}V${scale.y(first)}`} />
      {stops.map((stop) => (
        <path key={stop} d={`M${x - SLASH} ${scale.y(stop) + SLASH}L${x + SLASH} ${scale.y(stop) - SLASH}`} />
      ))}
      {stops.slice(1).map((stop, index) => {
        const from = stops[index] ?? stop;
        if ((stop - from) * scale.factor < 11) return null;
        return (
          <text
            key={stop}
            x={x + 9}
            y={scale.y((from + stop) / 2)}
            dy="0.35em"
            fontSize={11}
            stroke="none"
            fill="var(--ink2)"
          >
            {write(stop - from)}
          </text>
        );
      })}
    </g>
  );
}
