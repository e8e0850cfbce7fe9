import { formatQuantity, formatWithUnit } from '@shared/units';
import type { UnitSystem } from '@shared/units';
import type { Load, LoadCase } from '@shared/schemas/member';
import { labelSpan, withoutCollisions } from './curve';
import type { WantedLabel, XScale } from './curve';

/** The height kept for loads above an elevation, and the part of it that combs and arrows take. */
export const LOADS_HEIGHT = 64;
const BAND = 19;
const COMB = 8;
const MOST_BANDS = 3;

interface Shown {
  load: Load;
  caseId: string;
  caseName: string;
  /** where its foremost axle stands, of a train */
  standing: number | null;
}

/** A distributed load with its line of the stack of combs. */
type Distributed = Extract<Load, { kind: 'uniform' | 'varying' }>;

const isDistributed = (load: Load): load is Distributed => load.kind === 'uniform' || load.kind === 'varying';

/** Combs are laid in as few rows as overlap asks for; more than three rows share the last. */
const bandsFor = (loads: readonly Distributed[]): number[] => {
  const ends: number[] = [];
  return loads.map((load) => {
    const from = Math.min(load.from, load.to);
    const free = ends.findIndex((end) => end <= from + 1e-6);
    const band = free >= 0 ? free : Math.min(ends.length, MOST_BANDS - 1);
    ends[band] = Math.max(ends[band] ?? -Infinity, load.from, load.to);
    return band;
  });
};

function Comb({ load, scale, base }: { load: Distributed; scale: XScale; base: number }) {
  const x0 = scale.at(Math.min(load.from, load.to));
  const x1 = scale.at(Math.max(load.from, load.to));
  const [start, end] = load.kind === 'uniform' ? [load.value, load.value] : [load.start, load.end];
  const most = Math.max(Math.abs(start), Math.abs(end), 1e-12);
  const valueAt = (at: number) => start + (end - start) * at;
  const height = (at: number) => COMB * Math.abs(valueAt(at) / most);
  // what presses hangs its teeth from the ridge onto the beam; what lifts stands on a ridge at the beam
  const ridgeAt = (at: number) => (valueAt(at) < 0 ? base : base - height(at));
  const teeth = Math.max(2, Math.round((x1 - x0) / 29));
  const comb = Array.from({ length: teeth + 1 }, (_, index) => {
    const at = index / teeth;
    return `M${(x0 + (x1 - x0) * at).toFixed(1)} ${base}v${(-height(at)).toFixed(1)}`;
  }).join('');
  const turn = start * end < 0 ? start / (start - end) : null;
  const ridge = `M${x0} ${ridgeAt(0)}${turn === null ? '' : `L${x0 + (x1 - x0) * turn} ${base}`}L${x1} ${ridgeAt(1)}`;
  return (
    <g fill="none" stroke="var(--ink2)">
      <path d={comb} strokeOpacity={0.55} />
      <path d={ridge} strokeWidth={1.4} />
    </g>
  );
}

function Arrow({ x, from, to, up }: { x: number; from: number; to: number; up: boolean }) {
  const [tail, head, side] = up ? [to, from, -1] : [from, to, 1];
  return (
    <path
      d={`M${x} ${tail}V${head}m-4 ${-6 * side}l4 ${6 * side}l4 ${-6 * side}`}
      fill="none"
      stroke="var(--ink)"
      strokeWidth={1.4}
    />
  );
}

const COUPLE_RADIUS = 8;
const BARB = 5.5;

/** An arc open at the bottom with a barb where it ends; `turn` in radians, clockwise from the right. */
const onArc = (x: number, y: number, turn: number) => ({
  x: x + COUPLE_RADIUS * Math.cos(turn),
  y: y + COUPLE_RADIUS * Math.sin(turn),
});

function Couple({ x, y, clockwise }: { x: number; y: number; clockwise: boolean }) {
  const [left, right] = [onArc(x, y, (5 * Math.PI) / 6), onArc(x, y, Math.PI / 6)];
  const [from, to] = clockwise ? [left, right] : [right, left];
  const side = clockwise ? 1 : -1;
  // the way the arc comes from at its end, turned half a barb to each side
  const back = Math.atan2(-0.87, 0.5 * side);
  const barb = [-0.55, 0.55].map(
    (half) => `M${to.x} ${to.y}l${BARB * Math.cos(back + half)} ${BARB * Math.sin(back + half)}`,
  );
  const path = `M${from.x} ${from.y}A${COUPLE_RADIUS} ${COUPLE_RADIUS} 0 1 ${clockwise ? 1 : 0} ${to.x} ${to.y}${barb.join('')}`;
  return (
    <g fill="none">
      <path d={path} stroke="var(--sheet)" strokeWidth={5} />
      <path d={path} stroke="var(--ink)" strokeWidth={1.5} />
    </g>
  );
}

function Train({
  load,
  standing,
  scale,
  base,
}: {
  load: Extract<Load, { kind: 'moving' }>;
  /** where its offset 0 is drawn; null leaves only the travel line */
  standing: number | null;
  scale: XScale;
  base: number;
}) {
  const from = scale.at(Math.max(0, Math.min(load.from, load.to)));
  const to = scale.at(Math.min(scale.length, Math.max(load.from, load.to)));
  const axles = (standing === null ? [] : load.axles.map((axle) => standing + axle.offset)).filter(
    (x) => x >= -1e-6 && x <= scale.length + 1e-6,
  );
  const xs = axles.map((x) => scale.at(x));
  return (
    <g fill="none" stroke="var(--ink)">
      <path
        d={`M${from} ${base - 27}H${to}m0 -3.5v7M${from} ${base - 30.5}v7`}
        stroke="var(--ink2)"
        strokeDasharray="5 3"
      />
      {xs.length > 1 && <path d={`M${Math.min(...xs)} ${base - 14}H${Math.max(...xs)}`} strokeWidth={1.4} />}
      {xs.map((x) => (
        <g key={x}>
          <path d={`M${x} ${base - 27}v13`} strokeWidth={1.4} />
          <circle cx={x} cy={base - 7} r={5.5} fill="var(--sheet)" strokeWidth={1.4} />
        </g>
      ))}
    </g>
  );
}

const labelFor = (
  shown: Shown,
  scale: XScale,
  base: number,
  band: number,
  units: UnitSystem,
): WantedLabel => {
  const { load } = shown;
  const raised = base - band * BAND;
  switch (load.kind) {
    case 'uniform':
    case 'varying': {
      const text =
        load.kind === 'uniform'
          ? formatWithUnit(load.value, 'lineLoad', units)
          : `${formatQuantity(load.start, 'lineLoad', units)} … ${formatWithUnit(load.end, 'lineLoad', units)}`;
      const end = scale.at(Math.min(scale.length, Math.max(load.from, load.to)));
      return { x: end - 2, y: raised - COMB - 3, text: `${shown.caseId} ${text}`, anchor: 'end' };
    }
    case 'point': {
      const x = scale.at(load.x);
      const text = `${shown.caseId} ${formatWithUnit(load.value, 'force', units)}`;
      return x > scale.right - 80
        ? { x: x - 7, y: base - 44, text, anchor: 'end' }
        : { x: x + 7, y: base - 44, text, anchor: 'start' };
    }
    case 'couple': {
      const x = scale.at(load.x);
      return {
        x: x > scale.right - 90 ? x - 12 : x + 12,
        y: base - 24,
        text: `${shown.caseId} ${formatWithUnit(load.value, 'moment', units)}`,
        anchor: x > scale.right - 90 ? 'end' : 'start',
      };
    }
    case 'moving': {
      const sum = load.axles.map((axle) => formatQuantity(axle.value, 'force', units));
      const text =
        sum.length > 3
          ? `${shown.caseId} ${sum.length} axles moving`
          : `${shown.caseId} ${sum.join(' + ')} ${units === 'us' ? 'lb' : 'N'} moving`;
      const from = scale.at(Math.max(0, Math.min(load.from, load.to)));
      return { x: from + 2, y: base - 35, text, anchor: 'start' };
    }
  }
};

/** A label on a patch of sheet, so that no comb runs through it. */
function Written({ label }: { label: WantedLabel }) {
  const [from, to] = labelSpan(label);
  return (
    <g>
      <rect
        x={from - 2}
        y={label.y - 10}
        width={to - from + 4}
        height={12}
        fill="var(--sheet)"
        fillOpacity={0.92}
      />
      <text x={label.x} y={label.y} textAnchor={label.anchor} fontSize={11} fill="var(--ink)">
        {label.text}
      </text>
    </g>
  );
}

/** Loads of every case, with where their trains stand for the interface that is looked at. */
export function shownLoads(
  cases: readonly LoadCase[],
  positions: readonly { loadCase: string; load: number; x: number }[],
): Shown[] {
  return cases.flatMap((one) =>
    one.loads.map((load, index) => ({
      load,
      caseId: one.id,
      caseName: one.name,
      standing:
        load.kind === 'moving'
          ? (positions.find((place) => place.loadCase === one.id && place.load === index)?.x ?? null)
          : null,
    })),
  );
}

/** Where a train is drawn while no train’s governing place is known: a third along its travel. */
const somewhere = (load: Extract<Load, { kind: 'moving' }>, length: number): number => {
  const from = Math.max(0, Math.min(load.from, load.to));
  const to = Math.min(length, Math.max(load.from, load.to));
  return from + (to - from) / 3;
};

/**
 * Loads over the beam: combs for what is spread, arrows for points, turned arrows for couples, wheels on a travel
 * line for what moves (standing where it asks most of the interface looked at). `base` is the beam's upper edge.
 */
export function LoadMarks({
  loads,
  scale,
  base,
  units,
}: {
  loads: readonly Shown[];
  scale: XScale;
  base: number;
  units: UnitSystem;
}) {
  const spreadOut = loads.filter((shown): shown is Shown & { load: Distributed } =>
    isDistributed(shown.load),
  );
  const bands = bandsFor(spreadOut.map((shown) => shown.load));
  const single = loads.filter((shown) => !isDistributed(shown.load));
  const known = loads.some(({ standing }) => standing !== null);
  const floor = base - 4;
  const labels = withoutCollisions([
    ...single.map((shown) => labelFor(shown, scale, floor, 0, units)),
    ...spreadOut.map((shown, index) => labelFor(shown, scale, floor, bands[index] ?? 0, units)),
  ]);
  return (
    <g>
      {spreadOut.map((shown, index) => (
        <Comb key={index} load={shown.load} scale={scale} base={floor - (bands[index] ?? 0) * BAND} />
      ))}
      {single.map(({ load, standing }, index) => {
        if (load.kind === 'point')
          return (
            <Arrow key={index} x={scale.at(load.x)} from={base - 56} to={base - 2} up={load.value < 0} />
          );
        // a positive couple adds to M on its right: it turns clockwise
        if (load.kind === 'couple')
          return <Couple key={index} x={scale.at(load.x)} y={base - 14} clockwise={load.value > 0} />;
        if (load.kind === 'moving')
          return (
            <Train
              key={index}
              load={load}
              standing={standing ?? (known ? null : somewhere(load, scale.length))}
              scale={scale}
              base={base}
            />
          );
        return null;
      })}
      {labels.map((label) => (
        <Written key={`${label.x} ${label.y} ${label.text}`} label={label} />
      ))}
    </g>
  );
}
