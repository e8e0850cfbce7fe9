import { formatQuantity, unitOf } from '@shared/units';
import { Cell, HeadCell, Table } from '@/components/ui/table';
import { Utilisation } from '@/components/ui/utilisation';
import { classes } from '@/lib/classes';
import { useUnits } from '@/lib/units';
import { zoneAt } from '../model/cursor';
import type { Joint } from '../model/worked';

/** The zones of a joint; choosing one takes the cursor into it. */
export function ZonesTable({ joint, x, onMove }: { joint: Joint; x: number; onMove: (x: number) => void }) {
  const units = useUnits();
  const { outcome } = joint;
  const current = zoneAt(outcome.zones, x);
  const length = (value: number) => formatQuantity(value, 'length', units);
  const unit = units === 'us' ? '' : `, ${unitOf('length', units)}`;
  return (
    <Table label={`Zones of ${outcome.id}`}>
      <thead>
        <tr>
          <HeadCell>Zone</HeadCell>
          <HeadCell className="text-right">from{unit}</HeadCell>
          <HeadCell className="text-right">to{unit}</HeadCell>
          <HeadCell className="text-right">at{unit}</HeadCell>
          <HeadCell className="text-right">a row</HeadCell>
          <HeadCell className="max-sm:text-right">
            <span className="sm:hidden">used</span>
            <span className="max-sm:hidden">needed ÷ carried</span>
          </HeadCell>
          {outcome.pinned && <HeadCell className="max-sm:hidden" aria-label="How it came about" />}
        </tr>
      </thead>
      <tbody>
        {outcome.zones.map((zone, index) => (
          <tr
            key={zone.from}
            className={classes('relative', index === current ? 'bg-spruce-wash' : 'hover:bg-paper')}
          >
            <Cell>
              <button
                type="button"
                aria-pressed={index === current}
                onClick={() => onMove((zone.from + zone.to) / 2)}
                className="-my-1.5 min-h-8 min-w-8 text-left after:absolute after:inset-0"
              >
                {index + 1}
              </button>
            </Cell>
            <Cell className="text-right whitespace-nowrap">{length(zone.from)}</Cell>
            <Cell className="text-right whitespace-nowrap">{length(zone.to)}</Cell>
            <Cell className="text-right font-semibold whitespace-nowrap">
              {formatQuantity(zone.spacing, 'size', units)}
            </Cell>
            <Cell className="text-right">{zone.perRow}</Cell>
            <Cell className="max-sm:text-right">
              <span className="sm:hidden">
                <Utilisation value={zone.utilisation} bar={false} />
              </span>
              <span className="max-sm:hidden">
                <Utilisation value={zone.utilisation} />
              </span>
            </Cell>
            {outcome.pinned && <Cell className="text-small text-ink2 max-sm:hidden">pinned by hand</Cell>}
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
