import { memo } from 'react';
import type { XScale } from './curve';

/** A zone with what is written in it: the spacing, and rows × fasteners a row. */
export interface DrawnZone {
  from: number;
  to: number;
  spacing: string;
  count: string;
  over: boolean;
}

const CHARACTER = 6.9;

/** The longest wording that fits; nothing where none does. */
const fitting = (width: number, ...wordings: string[]): string =>
  wordings.find((text) => text.length * CHARACTER + 6 <= width) ?? '';

/** Zones as boxes on the tape, in turn on paper and sheet; `note` stands in place of zones where there are none. */
export const ZonesPanel = memo(function ZonesPanel({
  zones,
  chosen,
  note,
  scale,
  top,
  height,
}: {
  zones: readonly DrawnZone[];
  /** index of the zone the cursor is in, −1 where it is in none */
  chosen: number;
  note: string;
  scale: XScale;
  top: number;
  height: number;
}) {
  const bottom = top + height;
  return (
    <g>
      {zones.map((zone, index) => {
        const x = scale.at(zone.from);
        const width = scale.at(zone.to) - x;
        const middle = x + width / 2;
        return (
          <g key={zone.from}>
            <rect
              {...{ x, y: top, width, height }}
              fill={
                index === chosen ? 'var(--spruce-wash)' : index % 2 === 0 ? 'var(--paper)' : 'var(--sheet)'
              }
              stroke="var(--ink)"
            />
            <text
              x={middle}
              y={top + height / 2 - 4}
              textAnchor="middle"
              fontSize={12}
              fontWeight={600}
              fill={zone.over ? 'var(--crayon)' : 'var(--ink)'}
            >
              {fitting(width, `at ${zone.spacing}`, zone.spacing)}
            </text>
            <text x={middle} y={top + height / 2 + 12} textAnchor="middle" fontSize={11} fill="var(--ink2)">
              {fitting(width, zone.count)}
            </text>
          </g>
        );
      })}
      {zones.length === 0 && (
        <>
          <rect
            x={scale.left}
            y={top}
            width={scale.right - scale.left}
            height={height}
            fill="var(--sheet)"
            stroke="var(--ink)"
          />
          <text
            x={(scale.left + scale.right) / 2}
            y={top + height / 2}
            dy="0.35em"
            textAnchor="middle"
            fontSize={12}
            fill="var(--ink)"
          >
            {fitting(scale.right - scale.left, note)}
          </text>
        </>
      )}
      {zones.slice(1).map((zone) => (
        <path key={zone.from} d={`M${scale.at(zone.from)} ${bottom}l-5 -6h10Z`} fill="var(--ink)" />
      ))}
    </g>
  );
});
