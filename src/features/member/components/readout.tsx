import type { ReactNode } from 'react';
import { formatQuantity, formatWithUnit } from '@shared/units';
import type { Quantity, UnitSystem } from '@shared/units';
import { Panel } from '@/components/ui/panel';
import { Utilisation } from '@/components/ui/utilisation';
import { useUnits } from '@/lib/units';
import { curveAt, governingAt, zoneAt } from '../model/cursor';
import type { Sides } from '../model/cursor';
import { combinationName, whyAt } from '../model/why';
import { carriedSteps } from '../model/worked';
import type { Joint, Worked } from '../model/worked';

const same = (a: number, b: number): boolean =>
  Math.abs(a - b) <= 1e-9 * Math.max(1, Math.abs(a), Math.abs(b));

const larger = ({ left, right }: Sides): number => (Math.abs(left) > Math.abs(right) ? left : right);

/** An envelope's value at a place in words: one figure, or the two it lies between, or both sides of a jump. */
const sayEnvelope = (max: Sides, min: Sides, quantity: Quantity, units: UnitSystem): string => {
  const say = (value: number) => formatQuantity(value, quantity, units);
  const jumps = !same(max.left, max.right) || !same(min.left, min.right);
  if (same(max.left, min.left) && same(max.right, min.right))
    return jumps
      ? `${say(max.left)} | ${formatWithUnit(max.right, quantity, units)}`
      : formatWithUnit(max.left, quantity, units);
  const most = Math.max(max.left, max.right);
  const least = Math.min(min.left, min.right);
  return `${say(least)} … ${formatWithUnit(most, quantity, units)}`;
};

/** The interface's figures at x. */
export function jointAt({ result, document }: Worked, joint: Joint, x: number) {
  const { outcome } = joint;
  const needed = Math.abs(larger(curveAt(result.envelope.x, outcome.needed, x)));
  const { steps, onlyPossible } = carriedSteps(joint, document.length);
  const index = zoneAt(outcome.zones, x);
  const carried = (steps[zoneAt(steps, x)] ?? { value: 0 }).value;
  return { needed, carried, onlyPossible, zone: index, used: carried > 0 ? needed / carried : 0 };
}

/** One sentence for a screen reader: the place, and what is asked and carried there. */
export function spokenAt(worked: Worked, joint: Joint | null, x: number, units: UnitSystem): string {
  const place = formatWithUnit(x, 'length', units);
  if (joint === null) return place;
  const { needed, carried } = jointAt(worked, joint, x);
  return `${place}: needed ${formatWithUnit(needed, 'flow', units)}, carried ${formatWithUnit(carried, 'flow', units)}`;
}

/** Everything at the cursor's place, and the combination that asks most there. */
export function Readout({ worked, joint, x }: { worked: Worked; joint: Joint | null; x: number }) {
  const units = useUnits();
  const { envelope } = worked.result;
  const at = (values: readonly number[]) => curveAt(envelope.x, values, x);
  const rows: { name: string; value: ReactNode }[] = [
    { name: 'Shear V', value: sayEnvelope(at(envelope.shearMax), at(envelope.shearMin), 'force', units) },
    { name: 'Moment M', value: sayEnvelope(at(envelope.momentMax), at(envelope.momentMin), 'moment', units) },
    {
      name: 'Deflection',
      value: sayEnvelope(at(envelope.deflectionMax), at(envelope.deflectionMin), 'size', units),
    },
  ];
  if (joint !== null) {
    const { needed, carried, onlyPossible, zone, used } = jointAt(worked, joint, x);
    const inZone = joint.outcome.zones[zone];
    const governs = governingAt(worked.result, joint.outcome, x);
    rows.push(
      { name: `Needed q, ${joint.outcome.id}`, value: formatWithUnit(needed, 'flow', units) },
      { name: onlyPossible ? 'Carried at most' : 'Carried', value: formatWithUnit(carried, 'flow', units) },
    );
    if (inZone)
      rows.push({ name: 'Zone', value: `${zone + 1} · at ${formatQuantity(inZone.spacing, 'size', units)}` });
    rows.push(
      { name: 'Utilisation', value: <Utilisation value={used} bar={false} /> },
      { name: 'Governs', value: governs === null ? 'nothing' : combinationName(governs) },
    );
  }
  return (
    <Panel label="At x">
      <p className="text-small text-ink2">At x</p>
      <p className="text-figure mb-1 font-semibold">{formatWithUnit(x, 'length', units)}</p>
      <dl className="sm:max-md:grid sm:max-md:grid-cols-2 sm:max-md:gap-x-6">
        {rows.map(({ name, value }) => (
          <div
            key={name}
            className="border-line flex items-baseline justify-between gap-3 border-b py-1.5 last:border-0 lg:py-2"
          >
            <dt className="shrink-0">{name}</dt>
            <dd className="text-right">{value}</dd>
          </div>
        ))}
      </dl>
    </Panel>
  );
}

/** From load to spacing for the zone under the cursor, in steps one can work out again. */
export function WhyPanel({ worked, joint, x }: { worked: Worked; joint: Joint; x: number }) {
  const units = useUnits();
  const why = whyAt(worked, joint, x, units);
  return (
    <Panel title={why.title}>
      <ol className="text-small list-decimal space-y-1 pl-5">
        {why.lines.map((line) => (
          <li key={line}>{line}</li>
        ))}
      </ol>
    </Panel>
  );
}
