import type { Support } from '@shared/schemas/member';
import type { XScale } from './curve';

const INK = { stroke: 'var(--ink)', strokeWidth: 1.2, fill: 'none' };

function Mark({ kind, x, top }: { kind: Support['kind']; x: number; top: number }) {
  switch (kind) {
    case 'pin':
      return <path d={`M${x} ${top + 1}l8 12h-16Z`} {...INK} fill="var(--sheet)" />;
    case 'roller':
      return (
        <g {...INK}>
          <path d={`M${x} ${top + 1}l7 9h-14Z`} fill="var(--sheet)" />
          <path d={`M${x - 8} ${top + 13.5}h16`} />
        </g>
      );
    case 'spring':
      return <path d={`M${x} ${top + 1}v2l5 2l-10 3l10 3l-5 2v1m-8 0h16`} {...INK} />;
    case 'fixed':
      return null;
  }
}

/** A clamp grips the end over its whole depth. */
function Clamp({ x, top, bottom, atLeft }: { x: number; top: number; bottom: number; atLeft: boolean }) {
  const side = atLeft ? -1 : 1;
  const hatches = Array.from({ length: 6 }, (_, index) => top - 4 + ((bottom - top + 8) * (index + 1)) / 6);
  return (
    <g {...INK}>
      <path d={`M${x} ${top - 5}V${bottom + 5}`} strokeWidth={2} />
      {hatches.map((y) => (
        <path key={y} d={`M${x} ${y - 6}l${side * 6} 6`} strokeWidth={1} />
      ))}
    </g>
  );
}

/** Supports under the beam and hinges in it. */
export function SupportMarks({
  supports,
  hinges,
  scale,
  top,
  bottom,
}: {
  supports: readonly Support[];
  hinges: readonly number[];
  scale: XScale;
  /** pixels of the elevation's upper and lower edge */
  top: number;
  bottom: number;
}) {
  return (
    <g>
      {supports.map((support) => {
        const x = scale.at(support.x);
        return support.kind === 'fixed' ? (
          <Clamp key={support.id} x={x} top={top} bottom={bottom} atLeft={support.x < scale.length / 2} />
        ) : (
          <Mark key={support.id} kind={support.kind} x={x} top={bottom} />
        );
      })}
      {hinges.map((x) => (
        <circle
          key={x}
          cx={scale.at(x)}
          cy={(top + bottom) / 2}
          r={4}
          fill="var(--sheet)"
          stroke="var(--ink)"
          strokeWidth={1.4}
        />
      ))}
    </g>
  );
}
