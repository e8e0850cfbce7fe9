import { useEffect, useMemo } from 'react';
import type { PointerEvent } from 'react';
import { formatExact, formatQuantity, unitOf } from '@shared/units';
import { xScale } from '@/components/drawing/curve';
import { Elevation } from '@/components/drawing/elevation';
import { elevationScale } from '@/components/drawing/elevation-geometry';
import { EnvelopePanel } from '@/components/drawing/envelope-panel';
import { FlowPanel } from '@/components/drawing/flow-panel';
import { LoadMarks, shownLoads } from '@/components/drawing/load-marks';
import { SupportMarks } from '@/components/drawing/support-marks';
import { TapeRule } from '@/components/drawing/tape-rule';
import { tapeTicks } from '@/components/drawing/tape-ticks';
import { ZonesPanel } from '@/components/drawing/zones-panel';
import { useUnits } from '@/lib/units';
import { useWidth } from '@/lib/use-width';
import { eventsAlong, moveCursor, pointerGrain, snap, zoneAt } from '../model/cursor';
import { drawnFasteners, drawnPieces, drawnZones, zonesNote } from '../model/drawn';
import { carriedSteps } from '../model/worked';
import type { Joint, Worked } from '../model/worked';
import { CursorLine, GUTTER, HEIGHTS, NARROW, PanelName, layOut, zoneUnits } from './stack-frame';

type MovingKeys = 'key' | 'shiftKey' | 'ctrlKey' | 'metaKey' | 'altKey' | 'preventDefault';

/** Pixels within which the pointer catches on an event. */
const CATCH = 5;

/**
 * Elevation, loads, shear, moment, flow, zones and tape on one scale, with one cursor through all of them. Moves the
 * cursor by pointer, touch and keys; `x` is in mm.
 */
export function OneRuleStack({
  worked,
  joint,
  x,
  onMove,
  spoken,
}: {
  worked: Worked;
  joint: Joint | null;
  x: number;
  onMove: (x: number) => void;
  /** what a screen reader says of the place the cursor is at */
  spoken: string;
}) {
  const units = useUnits();
  const [ref, width] = useWidth<HTMLDivElement>();
  const { document, result } = worked;
  const { length } = document;
  const narrow = width < NARROW;
  const rows = layOut(narrow);

  const scale = useMemo(
    () => (width === 0 ? null : xScale(length, narrow ? 10 : GUTTER, width - (narrow ? 10 : 14))),
    [width, narrow, length],
  );
  const tape = useMemo(() => tapeTicks(length, scale?.factor ?? 1, units), [length, scale, units]);
  const pieces = useMemo(() => drawnPieces(document), [document]);
  const fasteners = useMemo(() => drawnFasteners(worked, pieces), [worked, pieces]);
  const heights = useMemo(
    () => elevationScale(pieces, scale?.factor ?? 1, rows.elevation + HEIGHTS.elevation, HEIGHTS.elevation),
    [pieces, scale, rows.elevation],
  );
  const loads = useMemo(
    () => shownLoads(document.loadCases, joint?.outcome.peakFlow.positions ?? []),
    [document, joint],
  );
  const events = useMemo(() => eventsAlong(document, joint?.outcome ?? null), [document, joint]);
  const zones = useMemo(() => (joint === null ? [] : drawnZones(joint, units)), [joint, units]);
  const drawn = useMemo(() => {
    const { envelope } = result;
    const write = (quantity: 'force' | 'moment' | 'flow') => (value: number) =>
      formatQuantity(value, quantity, units);
    return {
      shear: { x: envelope.x, max: envelope.shearMax, min: envelope.shearMin },
      moment: { x: envelope.x, max: envelope.momentMax, min: envelope.momentMin },
      rooms: {
        shear: { top: rows.shear, height: HEIGHTS.shear },
        moment: { top: rows.moment, height: HEIGHTS.moment },
      },
      writeShear: write('force'),
      writeMoment: write('moment'),
      writeFlow: write('flow'),
    };
  }, [result, units, rows.shear, rows.moment]);
  const curves = useMemo(() => {
    if (joint === null) return null;
    const { steps, onlyPossible } = carriedSteps(joint, length);
    return { x: result.envelope.x, needed: joint.outcome.needed, carried: steps, onlyPossible };
  }, [joint, length, result]);

  const point = (event: PointerEvent<SVGSVGElement>) => {
    if (scale === null) return;
    const pixel = event.clientX - event.currentTarget.getBoundingClientRect().left;
    onMove(
      snap(scale.back(pixel), length, pointerGrain(1 / scale.factor, units), events, CATCH / scale.factor),
    );
  };

  const byKey = (event: Pick<KeyboardEvent, MovingKeys>) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const moved = moveCursor(event, x, tape.step, length, events);
    if (moved === null) return;
    event.preventDefault();
    onMove(moved);
  };
  // while nothing on the page has the focus, the arrow keys are the cursor's
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.target === window.document.body) byKey(event);
    };
    window.addEventListener('keydown', onKey);
    return () => window.removeEventListener('keydown', onKey);
  });

  return (
    <div
      ref={ref}
      role="slider"
      tabIndex={0}
      aria-label="Place along the beam"
      aria-valuemin={0}
      aria-valuemax={Math.round(length)}
      aria-valuenow={Math.round(x)}
      aria-valuetext={spoken}
      className="rounded"
      onKeyDown={byKey}
    >
      {scale !== null && (
        <svg
          aria-hidden
          width={width}
          height={rows.end}
          className="block touch-pan-y select-none"
          onPointerDown={point}
          onPointerMove={(event) => {
            if (event.pointerType === 'mouse' || event.buttons > 0 || event.pressure > 0) point(event);
          }}
        >
          <PanelName
            name="Elevation"
            unit={`depth × ${formatExact(heights.exaggeration)}`}
            y={narrow ? 14 : rows.elevation + 24}
            narrow={narrow}
            right={scale.right}
          />
          <LoadMarks loads={loads} scale={scale} base={heights.top} units={units} />
          <Elevation
            pieces={pieces}
            fasteners={fasteners}
            chosen={joint?.outcome.id ?? null}
            scale={scale}
            heights={heights}
          />
          <SupportMarks
            supports={document.supports}
            hinges={document.hinges}
            scale={scale}
            top={heights.top}
            bottom={heights.bottom}
          />
          <PanelName
            name="Shear V"
            unit={unitOf('force', units)}
            y={narrow ? rows.shear - 4 : rows.shear + 40}
            narrow={narrow}
            right={scale.right}
          />
          <EnvelopePanel
            envelope={drawn.shear}
            scale={scale}
            room={drawn.rooms.shear}
            write={drawn.writeShear}
            jumps
          />
          <PanelName
            name="Moment M"
            unit={unitOf('moment', units)}
            y={narrow ? rows.moment - 4 : rows.moment + 38}
            narrow={narrow}
            right={scale.right}
          />
          <EnvelopePanel
            envelope={drawn.moment}
            scale={scale}
            room={drawn.rooms.moment}
            write={drawn.writeMoment}
            jumps={false}
          />
          {joint !== null && curves !== null && (
            <>
              <PanelName
                name="Shear flow q"
                unit={`${unitOf('flow', units)}, ${joint.outcome.id}`}
                y={narrow ? rows.flow - 4 : rows.flow + 66}
                narrow={narrow}
                right={scale.right}
              />
              <FlowPanel
                curves={curves}
                scale={scale}
                top={rows.flow}
                height={HEIGHTS.flow}
                write={drawn.writeFlow}
              />
              {!narrow && (
                <PanelName
                  name="Zones"
                  unit={zoneUnits(joint, units)}
                  y={rows.zones + 13}
                  narrow={false}
                  right={0}
                />
              )}
              <ZonesPanel
                zones={zones}
                chosen={zoneAt(joint.outcome.zones, x)}
                note={zonesNote(joint)}
                scale={scale}
                top={rows.zones}
                height={HEIGHTS.zones}
              />
            </>
          )}
          <TapeRule tape={tape} scale={scale} top={rows.tape} height={HEIGHTS.tape} />
          <CursorLine
            x={scale.at(Math.min(x, length))}
            text={formatQuantity(Math.min(x, length), 'length', units)}
            top={narrow ? 20 : 4}
            tape={rows.tape}
            width={width}
          />
        </svg>
      )}
    </div>
  );
}
