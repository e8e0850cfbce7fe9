import { useId, useState } from 'react';
import { useController } from 'react-hook-form';
import {
  formatExact,
  formatForField,
  formatWithUnit,
  parseNumber,
  parseQuantity,
  unitOf,
} from '@shared/units';
import type { Quantity, UnitSystem } from '@shared/units';
import { FieldFrame, controlClass } from '@/components/ui/field-frame';
import { classes } from '@/lib/classes';
import { useUnits } from '@/lib/units';
import { useEditor } from '../model/editor';

/** The value at a path of the document, what is wrong with it, and how to change it. */
export function useField(path: string) {
  const { form, set, save, readOnly } = useEditor();
  const { field, fieldState } = useController({ control: form.control, name: path });
  const refused = save.answer.issues.find((issue) => issue.path === path)?.message;
  return {
    value: field.value,
    error: fieldState.error?.message ?? refused,
    set: (value: unknown) => set(path, value),
    readOnly,
  };
}

type Measure = Quantity | 'number';

const read = (text: string, measure: Measure, units: UnitSystem) =>
  measure === 'number' ? parseNumber(text) : parseQuantity(text, measure, units);

const show = (value: unknown, measure: Measure, units: UnitSystem): string => {
  if (typeof value === 'string') return value;
  if (typeof value !== 'number') return '';
  return measure === 'number' ? formatExact(value) : formatForField(value, measure, units);
};

/** A typed text that says more than its bare number, so that what it was taken for is worth saying. */
const needsSaying = (text: string): boolean => !/^\s*[\d\s\u202f.,]*\s*$/.test(text);

/**
 * A number with its unit. What is typed stays as typed until the field is left, then stands in the person's units;
 * what cannot be read stays in the document as it was typed, with what to do about it underneath.
 */
export function QuantityField({
  path,
  label,
  measure,
  placeholder,
  className,
}: {
  path: string;
  label: string;
  measure: Measure;
  /** what holds where nothing is typed */
  placeholder?: string | undefined;
  className?: string;
}) {
  const id = useId();
  const units = useUnits();
  const { value, error, set, readOnly } = useField(path);
  const [typed, setTyped] = useState<string | null>(null);
  const [focused, setFocused] = useState(false);
  const unit = measure === 'number' ? null : unitOf(measure, units);

  const unreadable = typeof value === 'string' ? read(value, measure, units) : null;
  const wrong = unreadable !== null && !unreadable.ok ? unreadable.message : error;
  const said =
    typed !== null && needsSaying(typed) && typeof value === 'number' && measure !== 'number'
      ? `${focused ? '' : `${typed} `}= ${formatWithUnit(value, measure, units)}`
      : undefined;

  const type = (text: string) => {
    setTyped(text);
    const answer = read(text, measure, units);
    if (text.trim() === '') set(undefined);
    else set(answer.ok ? answer.value : text);
  };

  return (
    <FieldFrame id={id} label={label} error={wrong} hint={said} className={className}>
      <div className="relative">
        <input
          id={id}
          inputMode="text"
          autoComplete="off"
          spellCheck={false}
          readOnly={readOnly}
          value={focused && typed !== null ? typed : show(value, measure, units)}
          placeholder={placeholder}
          aria-invalid={wrong !== undefined}
          aria-describedby={`${id}-note`}
          onFocus={() => {
            setTyped(null);
            setFocused(true);
          }}
          onBlur={() => setFocused(false)}
          onChange={(event) => type(event.target.value)}
          className={classes(controlClass(wrong !== undefined), unit !== null && 'pr-13')}
        />
        {unit !== null && (
          <span
            aria-hidden
            className="text-small text-ink2 pointer-events-none absolute inset-y-0 right-2.5 flex items-center"
          >
            {unit}
          </span>
        )}
      </div>
    </FieldFrame>
  );
}

interface Choice {
  value: string;
  label: string;
}

/** One of a list; a value that the list does not know is kept and shown as it stands. */
export function ChoiceField({
  path,
  label,
  choices,
  none,
  onChoose,
  className,
}: {
  path: string;
  label: string;
  choices: readonly Choice[];
  /** the wording for nothing chosen, where that is allowed */
  none?: string;
  /** takes the place of setting the value, where choosing changes more than this field */
  onChoose?: (value: string) => void;
  className?: string;
}) {
  const id = useId();
  const { value, error, set, readOnly } = useField(path);
  const current = typeof value === 'string' ? value : '';
  const known = current === '' || choices.some((choice) => choice.value === current);
  return (
    <FieldFrame id={id} label={label} error={error} className={className}>
      <select
        id={id}
        disabled={readOnly}
        value={current}
        aria-invalid={error !== undefined}
        aria-describedby={`${id}-note`}
        onChange={(event) => {
          if (onChoose) onChoose(event.target.value);
          else set(event.target.value === '' ? undefined : event.target.value);
        }}
        className={controlClass(error !== undefined)}
      >
        {(none !== undefined || current === '') && <option value="">{none ?? 'Choose…'}</option>}
        {choices.map((choice) => (
          <option key={choice.value} value={choice.value}>
            {choice.label}
          </option>
        ))}
        {!known && <option value={current}>{current}</option>}
      </select>
    </FieldFrame>
  );
}

/** Yes or no. */
export function CheckField({ path, label, className }: { path: string; label: string; className?: string }) {
  const { value, error, set, readOnly } = useField(path);
  return (
    <div className={className}>
      <label className="flex min-h-9 items-center gap-2.5 pointer-coarse:min-h-11">
        <input
          type="checkbox"
          checked={value === true}
          disabled={readOnly}
          onChange={(event) => set(event.target.checked)}
          className="accent-spruce size-4.5 shrink-0"
        />
        {label}
      </label>
      {error !== undefined && <p className="text-small text-crayon mt-1">{error}</p>}
    </div>
  );
}
