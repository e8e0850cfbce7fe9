import { useId } from 'react';
import { formatQuantity } from '@shared/units';
import type { UnitSystem } from '@shared/units';
import { rulesSchema } from '@shared/schemas/member';
import { FieldFrame, controlClass } from '@/components/ui/field-frame';
import { useUnits } from '@/lib/units';
import { valueAt } from '../model/draft-document';
import { useEditor } from '../model/editor';
import { CheckField, QuantityField, useField } from './fields';

const usual = rulesSchema.parse({});

const fields = [
  { key: 'spacingStep', label: 'Spacing step', measure: 'size' },
  { key: 'spacingMin', label: 'Smallest spacing', measure: 'size' },
  { key: 'spacingMax', label: 'Largest spacing', measure: 'size' },
  { key: 'maxZones', label: 'Most zones', measure: 'number' },
  { key: 'zoneGrid', label: 'Zone grid', measure: 'size' },
  { key: 'minZoneLength', label: 'Shortest zone', measure: 'size' },
] as const;

const write = (value: number, measure: 'size' | 'number', units: UnitSystem): string =>
  measure === 'number' ? String(value) : formatQuantity(value, measure, units);

const gridClass = 'grid grid-cols-2 gap-x-4 gap-y-3 sm:grid-cols-3';

/** The member's rules for every joint that has none of its own. */
export function MemberRules() {
  const units = useUnits();
  return (
    <>
      <div className={gridClass}>
        {fields.map(({ key, label, measure }) => (
          <QuantityField
            key={key}
            path={`rules.${key}`}
            label={label}
            measure={measure}
            placeholder={`usually ${write(usual[key], measure, units)}`}
          />
        ))}
      </div>
      <CheckField path="rules.mirror" label="The schedule reads the same from both ends" className="mt-2" />
    </>
  );
}

/** Mirror of one joint: as the member, yes or no. */
function MirrorChoice({ path }: { path: string }) {
  const id = useId();
  const { value, error, set, readOnly } = useField(path);
  return (
    <FieldFrame id={id} label="Same from both ends" error={error}>
      <select
        id={id}
        disabled={readOnly}
        value={value === true ? 'yes' : value === false ? 'no' : ''}
        aria-describedby={`${id}-note`}
        onChange={(event) => set(event.target.value === '' ? undefined : event.target.value === 'yes')}
        className={controlClass(error !== undefined)}
      >
        <option value="">As the member</option>
        <option value="yes">Yes</option>
        <option value="no">No</option>
      </select>
    </FieldFrame>
  );
}

/** Rules of one joint; what is left empty is as the member's rules say. */
export function ConnectionRules({ path }: { path: string }) {
  const units = useUnits();
  const { document } = useEditor();
  return (
    <div className={gridClass}>
      {fields.map(({ key, label, measure }) => {
        const own = valueAt(document, `rules.${key}`);
        const inherited = typeof own === 'number' ? own : usual[key];
        return (
          <QuantityField
            key={key}
            path={`${path}.${key}`}
            label={label}
            measure={measure}
            placeholder={`member’s ${write(inherited, measure, units)}`}
          />
        );
      })}
      <MirrorChoice path={`${path}.mirror`} />
    </div>
  );
}
