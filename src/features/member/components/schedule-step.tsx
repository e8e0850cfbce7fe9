import { useEffect, useMemo, useState } from 'react';
import { Panel } from '@/components/ui/panel';
import { Segmented } from '@/components/ui/segmented';
import { EmptyState } from '@/components/ui/states';
import { StatusWord, Utilisation } from '@/components/ui/utilisation';
import { inField } from '@/lib/keys';
import { useUnits } from '@/lib/units';
import { useEditor } from '../model/editor';
import { jointOf, workedOf } from '../model/worked';
import type { Joint, Worked } from '../model/worked';
import { OneRuleStack } from './one-rule-stack';
import { Readout, WhyPanel, spokenAt } from './readout';
import { Cautions, Notices, ToBring } from './schedule-notes';
import { FreshnessNote, Settling } from './settling';
import { StackTables } from './stack-tables';
import { ZonesTable } from './zones-table';

/** T, outside of fields, turns diagrams into tables and back. */
function useTableKey(toggle: () => void): void {
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.key.toLowerCase() !== 't' || event.ctrlKey || event.metaKey || event.altKey) return;
      if (inField(event.target)) return;
      toggle();
    };
    document.addEventListener('keydown', onKey);
    return () => document.removeEventListener('keydown', onKey);
  }, [toggle]);
}

function StackHead({
  joints,
  chosen,
  onChoose,
  tables,
  onTables,
}: {
  joints: readonly string[];
  chosen: Joint | null;
  onChoose: (id: string) => void;
  tables: boolean;
  onTables: (tables: boolean) => void;
}) {
  return (
    <div className="mb-2 flex flex-wrap items-center gap-x-4 gap-y-2">
      {chosen !== null && joints.length > 1 && (
        <Segmented
          label="Interface"
          value={chosen.outcome.id}
          options={joints.map((id) => ({ value: id, label: id }))}
          onChange={onChoose}
        />
      )}
      <Segmented
        label="Shown as"
        value={tables ? 'tables' : 'drawing'}
        options={[
          { value: 'drawing', label: 'Drawing' },
          { value: 'tables', label: 'Tables' },
        ]}
        onChange={(value) => onTables(value === 'tables')}
        className="no-print"
      />
      {chosen !== null && (
        <span className="flex flex-wrap items-center gap-x-3">
          <span className="text-ink2">{chosen.outcome.pieces.join(' – ')}</span>
          <Utilisation value={chosen.outcome.utilisation} bar={false} />
          <StatusWord status={chosen.outcome.status} />
        </span>
      )}
      <FreshnessNote />
      <p className="text-small text-ink2 no-print ml-auto pointer-coarse:hidden max-md:hidden">
        ← → move the cursor · Shift jumps to the next event · T shows tables
      </p>
    </div>
  );
}

function WorkedSchedule({ worked }: { worked: Worked }) {
  const units = useUnits();
  const [chosen, setChosen] = useState<string | null>(null);
  const [place, setPlace] = useState<number | null>(null);
  const [tables, setTables] = useState(false);
  const toggle = useMemo(() => () => setTables((shown) => !shown), []);
  useTableKey(toggle);

  const joint = useMemo(() => jointOf(worked, chosen), [worked, chosen]);
  const x = Math.min(worked.document.length, place ?? joint?.outcome.peakFlow.x ?? 0);
  const joints = worked.result.interfaces.map((one) => one.id);
  const zoned = joint !== null && joint.outcome.zones.length > 0;

  return (
    <div className="grid gap-5 lg:grid-cols-[minmax(0,1fr)_268px]">
      <Panel label="One-rule stack" className="min-w-0 lg:row-span-2">
        <StackHead joints={joints} chosen={joint} onChoose={setChosen} tables={tables} onTables={setTables} />
        <Settling>
          {tables ? (
            <StackTables worked={worked} joint={joint} onMove={setPlace} />
          ) : (
            <OneRuleStack
              worked={worked}
              joint={joint}
              x={x}
              onMove={setPlace}
              spoken={spokenAt(worked, joint, x, units)}
            />
          )}
        </Settling>
      </Panel>
      <div className="grid content-start gap-4 md:max-lg:grid-cols-2">
        <Settling>
          <Readout worked={worked} joint={joint} x={x} />
        </Settling>
        {joint !== null && (
          <Settling>
            <WhyPanel worked={worked} joint={joint} x={x} />
          </Settling>
        )}
      </div>
      <div className="grid content-start gap-4 lg:col-span-2">
        <Settling>
          <Panel label="Zones and what to bring">
            <div className={zoned ? 'grid gap-6 lg:grid-cols-[minmax(0,1fr)_252px]' : ''}>
              {zoned && <ZonesTable joint={joint} x={x} onMove={setPlace} />}
              <ToBring worked={worked} joint={joint} />
            </div>
          </Panel>
        </Settling>
        <Notices worked={worked} />
        <Cautions />
      </div>
    </div>
  );
}

/** The one-rule stack and everything that is read from it. */
export function ScheduleStep() {
  const { save } = useEditor();
  const worked = useMemo(() => workedOf(save.good), [save.good]);
  if (worked === null)
    return (
      <Panel label="Schedule">
        <EmptyState title="No schedule yet">
          The schedule appears here as soon as the document can be calculated. What has to be mended stands
          above.
        </EmptyState>
      </Panel>
    );
  return <WorkedSchedule worked={worked} />;
}
