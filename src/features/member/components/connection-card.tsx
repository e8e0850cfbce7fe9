import { useId, useState } from 'react';
import type { ReactNode } from 'react';
import { formatQuantity, formatWithUnit } from '@shared/units';
import type { Contact } from '@/components/drawing/section-geometry';
import { Button } from '@/components/ui/button';
import { Panel } from '@/components/ui/panel';
import { StatusWord, Utilisation } from '@/components/ui/utilisation';
import { useUnits } from '@/lib/units';
import { connectionOfKind, valueAt, withConnections } from '../model/draft-document';
import { useEditor } from '../model/editor';
import { CapacityFields } from './capacity-fields';
import { ChoiceField, CheckField, QuantityField, useField } from './fields';
import { ConnectionRules } from './rules-fields';
import { Settling } from './settling';

const kinds = [
  { value: 'fasteners', label: 'Fasteners' },
  { value: 'adhesive', label: 'Adhesive' },
  { value: 'continuous', label: 'Continuous line' },
];
const types = [
  { value: 'nail', label: 'Nail' },
  { value: 'screw', label: 'Screw' },
  { value: 'bolt', label: 'Bolt' },
  { value: 'lag', label: 'Lag screw' },
];
const shanks = [
  { value: 'smooth', label: 'Smooth' },
  { value: 'ringed', label: 'Ringed' },
  { value: 'square', label: 'Square' },
];

/** A part of the form that may be folded away; open from the start where something stands in it. */
function Fold({ title, path, children }: { title: string; path: string; children: ReactNode }) {
  const { document, save } = useEditor();
  const [open, setOpen] = useState(() => {
    const value = valueAt(document, path);
    return (
      typeof value === 'object' && value !== null && Object.values(value).some((one) => one !== undefined)
    );
  });
  const id = useId();
  const wrong = save.answer.issues.some((issue) => issue.path.startsWith(`${path}.`));
  const shown = open || wrong;
  return (
    <div className="border-line border-t pt-1">
      <button
        type="button"
        aria-expanded={shown}
        aria-controls={id}
        onClick={() => setOpen(!shown)}
        className="flex min-h-9 w-full items-center gap-2 text-left font-semibold pointer-coarse:min-h-11"
      >
        <svg aria-hidden width={10} height={10} className={shown ? 'rotate-90' : ''}>
          <path d="M3 1l4 4l-4 4" fill="none" stroke="currentColor" strokeWidth={1.5} />
        </svg>
        {title}
      </button>
      <div id={id} hidden={!shown} className="pt-1 pb-2">
        {children}
      </div>
    </div>
  );
}

function FastenerFields({ path, pieces }: { path: string; pieces: [string, string] }) {
  return (
    <div className="grid grid-cols-2 gap-x-4 gap-y-3 sm:grid-cols-4">
      <ChoiceField path={`${path}.type`} label="Type" choices={types} none="Not said" />
      <QuantityField path={`${path}.diameter`} label="Diameter" measure="size" />
      <QuantityField path={`${path}.length`} label="Length" measure="size" />
      <QuantityField path={`${path}.headDiameter`} label="Head diameter" measure="size" />
      <ChoiceField path={`${path}.shank`} label="Shank" choices={shanks} none="Not said" />
      <ChoiceField
        path={`${path}.headSide`}
        label="Head in"
        choices={pieces.map((id) => ({ value: id, label: id }))}
        none="The thinner piece"
      />
      <CheckField path={`${path}.predrilled`} label="Predrilled" className="col-span-2 self-end" />
    </div>
  );
}

/** What the schedule makes of this joint now, in one line under its head. */
function Outcome({ id }: { id: string }) {
  const units = useUnits();
  const { save } = useEditor();
  const outcome = save.good?.result?.interfaces.find((one) => one.id === id);
  if (!outcome) return null;
  const spacings = outcome.zones.map((zone) => formatQuantity(zone.spacing, 'size', units));
  return (
    <Settling>
      <p className="border-line mb-3 flex flex-wrap items-center gap-x-5 gap-y-1 border-b pb-2.5">
        <StatusWord status={outcome.status} />
        <Utilisation value={outcome.utilisation} />
        {spacings.length > 0 && (
          <span>
            at <strong className="font-semibold">{spacings.join(' · ')}</strong>
          </span>
        )}
        {outcome.fasteners !== null && outcome.fasteners.count > 0 && (
          <span className="text-ink2">{outcome.fasteners.count} fasteners</span>
        )}
        {outcome.kind === 'fasteners' && outcome.zones.length === 0 && (
          <span className="text-crayon">no schedule carries it</span>
        )}
      </p>
    </Settling>
  );
}

/** One interface and what joins it, as a form. */
export function ConnectionCard({
  contact,
  index,
  pieces,
}: {
  /** null where the pieces named do not touch */
  contact: Contact | null;
  /** place in the document's connections */
  index: number;
  pieces: [string, string];
}) {
  const units = useUnits();
  const { document, replace, readOnly } = useEditor();
  const path = `connections.${index}`;
  const kind = useField(`${path}.kind`).value;
  const pieceIssue = useField(`${path}.pieces`).error;
  const name = contact?.id ?? 'No interface';
  const length =
    contact === null ? 0 : Math.hypot(contact.to.y - contact.from.y, contact.to.z - contact.from.z);
  return (
    <Panel
      title={
        <>
          {name} <span className="text-ink2 font-normal">{pieces.join(' – ')}</span>
        </>
      }
      aside={
        contact === null
          ? 'these pieces do not touch'
          : `${contact.orientation === 'horizontal' ? 'flat' : 'upright'}, contact ${formatWithUnit(length, 'size', units)}`
      }
    >
      {pieceIssue !== undefined && <p className="text-crayon mb-2">{pieceIssue}</p>}
      {contact !== null && <Outcome id={contact.id} />}
      <div className="grid gap-4">
        <div className="grid grid-cols-2 gap-x-4 gap-y-3 sm:grid-cols-3">
          <ChoiceField
            path={`${path}.kind`}
            label="Joined by"
            choices={kinds}
            onChoose={(chosen) =>
              replace(
                withConnections(document, (list) =>
                  list.map((one, at) => (at === index ? connectionOfKind(one, chosen) : one)),
                ),
              )
            }
          />
          {kind === 'fasteners' && (
            <>
              <QuantityField path={`${path}.rows`} label="Rows" measure="number" placeholder="1" />
              <QuantityField
                path={`${path}.slipModulus`}
                label="Slip modulus, if known"
                measure="stiffness"
              />
            </>
          )}
          {kind === 'continuous' && (
            <QuantityField
              path={`${path}.bead`}
              label="Length of each run"
              measure="size"
              placeholder="unbroken"
            />
          )}
        </div>
        <CapacityFields path={`${path}.capacity`} kind={typeof kind === 'string' ? kind : 'fasteners'} />
        <div>
          {kind === 'fasteners' && (
            <Fold title="Fastener" path={`${path}.fastener`}>
              <FastenerFields path={`${path}.fastener`} pieces={pieces} />
            </Fold>
          )}
          {kind !== 'adhesive' && (
            <Fold title="Rules of this joint" path={`${path}.rules`}>
              <ConnectionRules path={`${path}.rules`} />
            </Fold>
          )}
          {!readOnly && (
            <div className="border-line border-t pt-3">
              <Button
                className="text-small min-h-8"
                onClick={() =>
                  replace(withConnections(document, (list) => list.filter((_, at) => at !== index)))
                }
              >
                Remove what joins {contact?.id ?? pieces.join(' and ')}
              </Button>
            </div>
          )}
        </div>
      </div>
    </Panel>
  );
}
