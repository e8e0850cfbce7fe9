import { formatQuantity, formatWithUnit, unitOf } from '@shared/units';
import type { Quantity, UnitSystem } from '@shared/units';
import type { Load } from '@shared/schemas/member';
import type { ReactNode } from 'react';
import { Cell, HeadCell } from '@/components/ui/table';
import { classes } from '@/lib/classes';
import { useUnits } from '@/lib/units';
import { eventsAlong } from '../model/cursor';
import { carriedSteps } from '../model/worked';
import type { Joint, Worked } from '../model/worked';

function Scrolled({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section aria-label={title} className="mt-4 first:mt-0">
      <h2 className="mb-1 font-semibold">{title}</h2>
      <div className="border-line max-h-72 overflow-auto rounded border">
        <table className="w-full border-collapse" aria-label={title}>
          {children}
        </table>
      </div>
    </section>
  );
}

function Head({ names, words = 0 }: { names: readonly string[]; words?: number }) {
  return (
    <thead>
      <tr>
        {names.map((name, index) => (
          <HeadCell key={name} className={classes('bg-sheet sticky top-0', index >= words && 'text-right')}>
            {name}
          </HeadCell>
        ))}
      </tr>
    </thead>
  );
}

const placeOf = (load: Load, units: UnitSystem): string => {
  const at = (x: number) => formatQuantity(x, 'length', units);
  return load.kind === 'point' || load.kind === 'couple' ? at(load.x) : `${at(load.from)} to ${at(load.to)}`;
};

const sizeOf = (load: Load, units: UnitSystem): string => {
  switch (load.kind) {
    case 'uniform':
      return formatWithUnit(load.value, 'lineLoad', units);
    case 'varying':
      return `${formatQuantity(load.start, 'lineLoad', units)} to ${formatWithUnit(load.end, 'lineLoad', units)}`;
    case 'point':
      return formatWithUnit(load.value, 'force', units);
    case 'couple':
      return formatWithUnit(load.value, 'moment', units);
    case 'moving':
      return load.axles.map((axle) => formatWithUnit(axle.value, 'force', units)).join(' + ');
  }
};

function LoadsTable({ worked, onMove }: { worked: Worked; onMove: (x: number) => void }) {
  const units = useUnits();
  const { supports, loadCases } = worked.document;
  return (
    <Scrolled title="Supports and loads">
      <Head names={['What', 'Kind', 'Where', 'Size']} words={2} />
      <tbody>
        {supports.map((support) => (
          <tr key={support.id}>
            <Cell>Support {support.id}</Cell>
            <Cell>{support.kind}</Cell>
            <Cell className="text-right">
              <GoTo x={support.x} onMove={onMove} />
            </Cell>
            <Cell />
          </tr>
        ))}
        {loadCases.flatMap((one) =>
          one.loads.map((load, index) => (
            <tr key={`${one.id} ${index}`}>
              <Cell>{one.name === '' ? one.id : `${one.id} ${one.name}`}</Cell>
              <Cell>{load.kind}</Cell>
              <Cell className="text-right">{placeOf(load, units)}</Cell>
              <Cell className="text-right">{sizeOf(load, units)}</Cell>
            </tr>
          )),
        )}
      </tbody>
    </Scrolled>
  );
}

/** A place in a table that takes the cursor there. */
function GoTo({ x, onMove }: { x: number; onMove: (x: number) => void }) {
  const units = useUnits();
  return (
    <button
      type="button"
      className="text-spruce min-h-6 min-w-6 font-medium underline underline-offset-2"
      onClick={() => onMove(x)}
    >
      {formatQuantity(x, 'length', units)}
    </button>
  );
}

interface Column {
  name: string;
  values: readonly number[];
  quantity: Quantity;
}

/** Stations down the page; those where something happens take the cursor there. */
function StationTable({
  title,
  x,
  columns,
  events,
  onMove,
}: {
  title: string;
  x: readonly number[];
  columns: readonly Column[];
  events: readonly number[];
  onMove: (x: number) => void;
}) {
  const units = useUnits();
  const isEvent = (station: number) => events.some((event) => Math.abs(event - station) < 1e-6);
  return (
    <Scrolled title={title}>
      <Head
        names={[
          units === 'us' ? 'x' : 'x, mm',
          ...columns.map((column) => `${column.name}, ${unitOf(column.quantity, units)}`),
        ]}
      />
      <tbody>
        {x.map((station, index) => (
          <tr key={index}>
            <Cell className="py-1 text-right">
              {isEvent(station) ? (
                <GoTo x={station} onMove={onMove} />
              ) : (
                formatQuantity(station, 'length', units)
              )}
            </Cell>
            {columns.map((column) => (
              <Cell key={column.name} className="py-1 text-right">
                {formatQuantity(column.values[index] ?? 0, column.quantity, units)}
              </Cell>
            ))}
          </tr>
        ))}
      </tbody>
    </Scrolled>
  );
}

/** What the panels of the stack draw, as tables: the same figures, for who would rather read or cannot see. */
export function StackTables({
  worked,
  joint,
  onMove,
}: {
  worked: Worked;
  joint: Joint | null;
  onMove: (x: number) => void;
}) {
  const { envelope } = worked.result;
  const events = eventsAlong(worked.document, joint?.outcome ?? null);
  const common = { x: envelope.x, events, onMove };
  const steps = joint === null ? [] : carriedSteps(joint, worked.document.length).steps;
  const carried = envelope.x.map(
    (x) => (steps.find((step) => x <= step.to + 1e-6) ?? steps.at(-1))?.value ?? 0,
  );
  return (
    <>
      <LoadsTable worked={worked} onMove={onMove} />
      <StationTable
        title="Shear V"
        {...common}
        columns={[
          { name: 'largest', values: envelope.shearMax, quantity: 'force' },
          { name: 'smallest', values: envelope.shearMin, quantity: 'force' },
        ]}
      />
      <StationTable
        title="Moment M"
        {...common}
        columns={[
          { name: 'largest', values: envelope.momentMax, quantity: 'moment' },
          { name: 'smallest', values: envelope.momentMin, quantity: 'moment' },
        ]}
      />
      {joint !== null && (
        <StationTable
          title={`Shear flow q, ${joint.outcome.id}`}
          {...common}
          columns={[
            { name: 'needed', values: joint.outcome.needed, quantity: 'flow' },
            { name: 'carried', values: carried, quantity: 'flow' },
          ]}
        />
      )}
    </>
  );
}
