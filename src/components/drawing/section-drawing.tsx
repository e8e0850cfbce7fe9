import { useId } from 'react';
import { formatQuantity, formatWithUnit } from '@shared/units';
import { useUnits } from '@/lib/units';
import { useWidth } from '@/lib/use-width';
import { endGrain, seedOf } from './grain';
import { alternate, boundsOf, findContacts, findOverlaps } from './section-geometry';
import type { Contact, DrawnPiece, Overlap } from './section-geometry';
import { DepthChain, WidthDimension } from './section-dimensions';
import { InterfaceTags } from './section-tags';

const HEIGHT = 430;
const LARGEST_SCALE = 5;

/** From the section's mm (z up) to the drawing's pixels (y down). */
export interface SectionScale {
  x: (y: number) => number;
  y: (z: number) => number;
  factor: number;
  left: number;
  right: number;
  top: number;
  bottom: number;
}

const scaleFor = (
  pieces: readonly DrawnPiece[],
  width: number,
  tagsAbove: boolean,
  tagsBelow: boolean,
): SectionScale | null => {
  const bounds = boundsOf(pieces);
  if (bounds === null || width === 0) return null;
  const margin = { left: 68, right: 118, top: tagsAbove ? 66 : 40, bottom: tagsBelow ? 40 : 16 };
  const wide = bounds.right - bounds.left;
  const high = bounds.top - bounds.bottom;
  const factor = Math.min(
    (width - margin.left - margin.right) / wide,
    (HEIGHT - margin.top - margin.bottom) / high,
    LARGEST_SCALE,
  );
  const left = margin.left + (width - margin.left - margin.right - wide * factor) / 2;
  return {
    factor,
    left,
    right: left + wide * factor,
    top: margin.top,
    bottom: margin.top + high * factor,
    x: (y) => left + (y - bounds.left) * factor,
    y: (z) => margin.top + (bounds.top - z) * factor,
  };
};

function Piece({ piece, scale, fill }: { piece: DrawnPiece; scale: SectionScale; fill: string }) {
  const clip = useId();
  const box = {
    x: scale.x(piece.y),
    y: scale.y(piece.z + piece.depth),
    width: piece.width * scale.factor,
    height: piece.depth * scale.factor,
  };
  return (
    <g>
      <clipPath id={clip}>
        <rect {...box} />
      </clipPath>
      <rect {...box} fill={piece.kind === 'steel' ? 'var(--line2)' : fill} />
      <path
        d={endGrain(box, piece.kind, seedOf(piece.id))}
        clipPath={`url(#${clip})`}
        fill="none"
        stroke="var(--grain)"
        strokeOpacity={0.5}
      />
      <rect {...box} fill="none" stroke="var(--ink)" strokeWidth={1.4} />
    </g>
  );
}

/** The piece's name on a small plate; upright pieces too narrow for it carry it turned. */
function Plate({ piece, scale, shift }: { piece: DrawnPiece; scale: SectionScale; shift: number }) {
  const width = piece.id.length * 7 + 12;
  const high = piece.depth * scale.factor;
  const wide = piece.width * scale.factor;
  const turned = wide < width + 4 && high > wide && high > width;
  const [room, depth] = turned ? [high, wide] : [wide, high];
  if (room < width - 8 || depth < 9) return null;
  const small = depth < 18;
  return (
    <g
      transform={`translate(${scale.x(piece.y + piece.width / 2)} ${scale.y(piece.z + piece.depth / 2) + shift})${turned ? ' rotate(-90)' : ''}`}
    >
      {!small && (
        <rect
          x={-width / 2}
          y={-9.5}
          width={width}
          height={19}
          rx={2}
          fill="var(--sheet)"
          fillOpacity={0.92}
        />
      )}
      <text
        textAnchor="middle"
        dy="0.36em"
        fontSize={small ? 10 : 12}
        fontWeight={600}
        fill="var(--ink)"
        {...(small ? { style: { stroke: 'var(--sheet)' }, className: 'halo' } : {})}
      >
        {piece.id}
      </text>
    </g>
  );
}

function NeutralAxis({ centroid, scale, label }: { centroid: number; scale: SectionScale; label: string }) {
  const y = scale.y(centroid);
  return (
    <g>
      <path
        d={`M${scale.left - 18} ${y}H${scale.right + 8}`}
        stroke="var(--ink2)"
        strokeDasharray="10 3 2 3"
        fill="none"
      />
      <text x={scale.left - 22} y={y} dy="0.35em" textAnchor="end" fontSize={11} fill="var(--ink2)">
        {label}
      </text>
    </g>
  );
}

function Overlapping({ overlap, scale, text }: { overlap: Overlap; scale: SectionScale; text: string }) {
  const x = scale.x(overlap.y);
  const y = scale.y(overlap.z + overlap.depth);
  const width = overlap.width * scale.factor;
  const height = Math.max(2, overlap.depth * scale.factor);
  return (
    <g>
      <rect {...{ x, y, width, height }} fill="var(--crayon-wash)" stroke="var(--crayon)" strokeWidth={2} />
      <path d={`M${x + width} ${y + height / 2}H${scale.right + 26}`} stroke="var(--crayon)" />
      <text
        x={scale.right + 30}
        y={y + height / 2}
        dy="0.35em"
        fontSize={11}
        fontWeight={600}
        className="halo"
        fill="var(--crayon)"
      >
        {text}
      </text>
    </g>
  );
}

/** A screen reader's view of the drawing. */
const describe = (
  pieces: readonly DrawnPiece[],
  contacts: readonly Contact[],
  say: (mm: number) => string,
): string =>
  `Section of ${pieces.length} pieces: ${pieces.map((piece) => `${piece.id} ${say(piece.width)} wide and ${say(piece.depth)} deep`).join(', ')}. ${contacts.map((contact) => `${contact.id} between ${contact.pieces.join(' and ')}`).join(', ')}.`;

/**
 * A section to scale: end grain, names, dimensions, neutral axis, interfaces with their tags; what overlaps is in
 * crayon with its size. `centroid` is left out where there is no result; `chosen` marks an interface.
 */
export function SectionDrawing({
  pieces,
  centroid,
  chosen,
  loose,
}: {
  pieces: readonly DrawnPiece[];
  centroid: number | null;
  chosen?: string | null;
  /** ids of interfaces that nothing joins: their line is dashed */
  loose: ReadonlySet<string>;
}) {
  const units = useUnits();
  const [ref, width] = useWidth<HTMLDivElement>();
  const contacts = findContacts(pieces);
  const overlaps = findOverlaps(pieces);
  const bounds = boundsOf(pieces);
  const middle = bounds === null ? 0 : (bounds.top + bounds.bottom) / 2;
  const upright = contacts.filter((contact) => contact.orientation === 'vertical');
  const above = upright.filter((contact) => (contact.from.z + contact.to.z) / 2 > middle + 1e-6);
  const scale = scaleFor(pieces, width, above.length > 0, upright.length > above.length);
  const colours = alternate(pieces, contacts);
  const size = (mm: number) => formatQuantity(mm, 'size', units);
  const axisAt = centroid === null || scale === null ? null : scale.y(centroid);

  return (
    <div ref={ref} style={{ minHeight: 120 }}>
      {scale !== null && (
        <svg
          role="img"
          aria-label={describe(pieces, contacts, (mm) => formatWithUnit(mm, 'size', units))}
          width={width}
          height={Math.ceil(scale.bottom + (upright.length > above.length ? 40 : 16))}
          className="block"
        >
          {pieces.map((piece) => (
            <Piece
              key={piece.id}
              piece={piece}
              scale={scale}
              fill={colours.get(piece.id) === 1 ? 'var(--timber2)' : 'var(--timber)'}
            />
          ))}
          <WidthDimension pieces={pieces} scale={scale} write={size} raised={above.length > 0} />
          <DepthChain pieces={pieces} scale={scale} write={size} />
          {centroid !== null && (
            <NeutralAxis centroid={centroid} scale={scale} label={`z̄ ${size(centroid)}`} />
          )}
          {pieces.map((piece) => {
            const plate = scale.y(piece.z + piece.depth / 2);
            const crossed =
              axisAt !== null && Math.abs(plate - axisAt) < 12 && piece.depth * scale.factor > 70;
            return <Plate key={piece.id} piece={piece} scale={scale} shift={crossed ? 22 : 0} />;
          })}
          <InterfaceTags
            contacts={contacts}
            middle={middle}
            scale={scale}
            width={width}
            chosen={chosen ?? null}
            loose={loose}
          />
          {overlaps.map((overlap) => (
            <Overlapping
              key={overlap.pieces.join()}
              overlap={overlap}
              scale={scale}
              text={`${overlap.pieces.join(', ')} overlap by ${formatWithUnit(Math.min(overlap.width, overlap.depth), 'size', units)}`}
            />
          ))}
        </svg>
      )}
    </div>
  );
}
