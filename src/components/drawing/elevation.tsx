import { memo } from 'react';
import type { XScale } from './curve';
import { fastenerLook, isHidden } from './elevation-geometry';
import type { DrawnFasteners, ElevationScale } from './elevation-geometry';
import { longGrain, seedOf } from './grain';
import { alternate, findContacts } from './section-geometry';
import type { DrawnPiece } from './section-geometry';

const HEAD = 2.6;
const DOT = 1.7;

const r = (value: number): string => (Math.round(value * 10) / 10).toString();

const lines = (xs: readonly number[], head: number, tip: number, through: boolean, scale: XScale): string =>
  xs
    .map((x) => {
      const at = r(scale.at(x));
      const cap = (y: number) => `M${r(scale.at(x) - HEAD)} ${r(y)}h${2 * HEAD}`;
      return `M${at} ${r(head)}V${r(tip)}${cap(head)}${through ? cap(tip) : ''}`;
    })
    .join('');

const dots = (xs: readonly number[], y: number, scale: XScale): string =>
  xs
    .map(
      (x) =>
        `M${r(scale.at(x) - DOT)} ${r(y)}a${DOT} ${DOT} 0 1 0 ${2 * DOT} 0a${DOT} ${DOT} 0 1 0 ${-2 * DOT} 0`,
    )
    .join('');

function Fasteners({
  fasteners,
  pieces,
  scale,
  heights,
  quiet,
}: {
  fasteners: DrawnFasteners;
  pieces: readonly DrawnPiece[];
  scale: XScale;
  heights: ElevationScale;
  quiet: boolean;
}) {
  const look = fastenerLook(fasteners, pieces);
  if (look === null) return null;
  const opacity = (faint: boolean) => (quiet ? 0.45 : 1) * (faint ? 0.6 : 1);
  if (look.kind === 'heads')
    return look.rows.map(({ z, xs }) => (
      <path key={z} d={dots(xs, heights.y(z), scale)} fill="var(--ink)" opacity={opacity(look.faint)} />
    ));
  return look.rows.map(({ xs, faint }, index) => (
    <path
      key={index}
      d={lines(xs, heights.y(look.head), heights.y(look.tip), look.through, scale)}
      stroke="var(--ink)"
      strokeWidth={1.3}
      fill="none"
      opacity={opacity(faint)}
    />
  ));
}

/** The beam from its side: boards with their grain, hidden edges dashed, every fastener at its place. */
export const Elevation = memo(function Elevation({
  pieces,
  fasteners,
  chosen,
  scale,
  heights,
}: {
  pieces: readonly DrawnPiece[];
  fasteners: readonly DrawnFasteners[];
  /** the interface that is looked at; others are quieter */
  chosen: string | null;
  scale: XScale;
  heights: ElevationScale;
}) {
  const colours = alternate(pieces, findContacts(pieces));
  const boxes = pieces.map((piece) => ({
    piece,
    hidden: isHidden(piece, pieces),
    x: scale.left,
    y: heights.y(piece.z + piece.depth),
    width: scale.right - scale.left,
    height: heights.y(piece.z) - heights.y(piece.z + piece.depth),
  }));
  const farFirst = [...boxes].sort((a, b) => b.piece.y - a.piece.y);
  const fillOf = ({ id, kind }: DrawnPiece) =>
    kind === 'steel' ? 'var(--line2)' : colours.get(id) === 1 ? 'var(--timber2)' : 'var(--timber)';
  return (
    <g>
      {farFirst
        .filter(({ hidden }) => !hidden)
        .map(({ piece, x, y, width, height }) => (
          <g key={piece.id}>
            <rect {...{ x, y, width, height }} fill={fillOf(piece)} />
            <path
              d={longGrain({ x, y, width, height }, piece.kind, seedOf(piece.id))}
              fill="none"
              stroke="var(--grain)"
              strokeOpacity={0.5}
            />
            <rect {...{ x, y, width, height }} fill="none" stroke="var(--ink)" strokeWidth={1.2} />
          </g>
        ))}
      {boxes
        .filter(({ hidden }) => hidden)
        .map(({ piece, x, y, width, height }) => (
          <rect
            key={piece.id}
            {...{ x, y, width, height }}
            fill="none"
            stroke="var(--ink)"
            strokeOpacity={0.45}
            strokeDasharray="5 4"
          />
        ))}
      {fasteners.map((one) => (
        <Fasteners
          key={one.contact.id}
          fasteners={one}
          pieces={pieces}
          scale={scale}
          heights={heights}
          quiet={chosen !== null && chosen !== one.contact.id}
        />
      ))}
    </g>
  );
});
