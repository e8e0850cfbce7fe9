import { dimensionStops } from './section-geometry';
import type { DrawnPiece } from './section-geometry';
import type { SectionScale } from './section-drawing';

const SLASH = 4;

/** The width above the section: overall, or ply by ply where all pieces stand side by side. */
export function WidthDimension({
  pieces,
  scale,
  write,
  raised,
}: {
  pieces: readonly DrawnPiece[];
  scale: SectionScale;
  write: (mm: number) => string;
  raised: boolean;
}) {
  const [first] = pieces;
  const plies = pieces.every((piece) => piece.z === first?.z && piece.depth === first.depth);
  const edges = dimensionStops(
    pieces.flatMap((piece) => [piece.y, piece.y + piece.width]),
    0.05,
  );
  const stops = plies ? edges : [edges[0] ?? 0, edges.at(-1) ?? 0];
  const y = scale.top - (raised ? 46 : 22);
  const spans = stops.slice(1).map((to, index) => ({ from: stops[index] ?? to, to }));
  return (
    <g stroke="var(--ink2)" fill="none">
      {stops.map((stop) => (
        <path key={stop} d={`M${scale.x(stop) - SLASH} ${y + SLASH}L${scale.x(stop) + SLASH} ${y - SLASH}`} />
      ))}
      {spans.map(({ from, to }) => {
        const label = write(to - from);
        const middle = (scale.x(from) + scale.x(to)) / 2;
        const half = label.length * 3.4 + 4;
        const wide = (to - from) * scale.factor;
        const inLine = wide > 2 * half + 12;
        const line = inLine
          ? `M${scale.x(from)} ${y}H${middle - half}M${middle + half} ${y}H${scale.x(to)}`
          : `M${scale.x(from)} ${y}H${scale.x(to)}`;
        return (
          <g key={to}>
            <path d={line} />
            {(inLine || wide > 2 * half - 8) && (
              <text
                x={middle}
                y={inLine ? y : y - 9}
                dy="0.35em"
                textAnchor="middle"
                fontSize={11}
                stroke="none"
                fill="var(--ink2)"
              >
                {label}
              </text>
            )}
          </g>
        );
      })}
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
