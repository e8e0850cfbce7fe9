import { LOADS_HEIGHT } from '@/components/drawing/load-marks';
import { formatQuantity } from '@shared/units';
import type { UnitSystem } from '@shared/units';
import type { Joint } from '../model/worked';

/** Pixels at the left for the panels’ names, and the width below which these stand above instead. */
export const GUTTER = 86;
export const NARROW = 600;
export const HEIGHTS = { elevation: 76, shear: 84, moment: 78, flow: 138, zones: 44, tape: 34, plate: 30 };
const GAP = 20;

/** Where each panel begins; on a narrow screen every panel has its name above it instead of at its left. */
export const layOut = (narrow: boolean) => {
  const name = narrow ? 16 : 0;
  const elevation = 8 + name + LOADS_HEIGHT;
  const shear = elevation + HEIGHTS.elevation + GAP + name;
  const moment = shear + HEIGHTS.shear + GAP + name;
  const flow = moment + HEIGHTS.moment + GAP + name;
  const zones = flow + HEIGHTS.flow + (narrow ? GAP : 10);
  const tape = zones + HEIGHTS.zones;
  return { elevation, shear, moment, flow, zones, tape, end: tape + HEIGHTS.tape + HEIGHTS.plate };
};

/** A panel’s name and unit: at its left, or on a narrow screen above it at the right. */
export function PanelName({
  name,
  unit,
  y,
  narrow,
  right,
}: {
  name: string;
  unit: string;
  y: number;
  narrow: boolean;
  right: number;
}) {
  if (narrow)
    return (
      <text x={right} y={y} textAnchor="end" fontSize={11} fill="var(--ink2)">
        {unit === '' ? name : `${name}, ${unit}`}
      </text>
    );
  return (
    <g>
      <text x={0} y={y} fontSize={12} fontWeight={600} fill="var(--ink)">
        {name}
      </text>
      {unit.split('\n').map((line, index) => (
        <text key={line} x={0} y={y + 15 + 13 * index} fontSize={11} fill="var(--ink2)">
          {line}
        </text>
      ))}
    </g>
  );
}

/** The cursor through all panels, with x on a plate under the tape. */
export function CursorLine({
  x,
  text,
  top,
  tape,
  width,
}: {
  x: number;
  text: string;
  top: number;
  tape: number;
  width: number;
}) {
  const plate = text.length * 7 + 14;
  const middle = Math.min(width - plate / 2 - 1, Math.max(plate / 2 + 1, x));
  return (
    <g pointerEvents="none">
      <path
        d={`M${x} ${top}V${tape + HEIGHTS.tape + 4}`}
        stroke="var(--ink)"
        strokeDasharray="3 3"
        strokeWidth={1.2}
      />
      <rect
        x={middle - plate / 2}
        y={tape + HEIGHTS.tape + 4}
        width={plate}
        height={20}
        rx={2}
        fill="var(--ink)"
      />
      <text
        x={middle}
        y={tape + HEIGHTS.tape + 14}
        dy="0.36em"
        textAnchor="middle"
        fontSize={12}
        fontWeight={500}
        fill="var(--paper)"
      >
        {text}
      </text>
    </g>
  );
}

/** Under the name of the zones: rows, and the fastener’s diameter × length. */
export const zoneUnits = ({ outcome, connection }: Joint, units: UnitSystem): string => {
  if (outcome.kind !== 'fasteners') return outcome.kind === 'adhesive' ? 'glued' : 'a line';
  const { diameter, length } = connection.fastener ?? {};
  const rows = outcome.rows === 1 ? '1 row' : `${outcome.rows} rows`;
  if (diameter === undefined || length === undefined) return rows;
  return `${rows}\n${formatQuantity(diameter, 'size', units)} × ${formatQuantity(length, 'size', units)}`;
};
