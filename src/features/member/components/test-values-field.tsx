import { useId, useState } from 'react';
import { formatForField, formatWithUnit, parseQuantity, unitOf } from '@shared/units';
import type { UnitSystem } from '@shared/units';
import { FieldFrame, controlClass } from '@/components/ui/field-frame';
import { useUnits } from '@/lib/units';
import { useEditor } from '../model/editor';
import { useField } from './fields';

/** Splits a pasted column (or row) of a spreadsheet; a comma inside a number stays. */
export function splitValues(text: string): string[] {
  return text
    .split(/[\n\r\t;]+|,\s+/)
    .map((part) => part.trim())
    .filter((part) => part !== '');
}

const show = (values: unknown, units: UnitSystem): string => {
  if (typeof values === 'string') return values;
  if (!Array.isArray(values)) return '';
  const list: unknown[] = values;
  return list
    .map((value) => (typeof value === 'number' ? formatForField(value, 'force', units) : String(value)))
    .join('\n');
};

const summary = (values: unknown, units: UnitSystem): string => {
  const list: unknown[] = Array.isArray(values) ? values : [];
  const numbers = list.filter((value): value is number => typeof value === 'number');
  if (numbers.length === 0) return 'One value a line; paste a column of a spreadsheet. At least 5.';
  const mean = numbers.reduce((sum, value) => sum + value, 0) / numbers.length;
  return `${numbers.length} values, mean ${formatWithUnit(mean, 'force', units)}, least ${formatWithUnit(Math.min(...numbers), 'force', units)}`;
};

/** Ultimate loads of test specimens, one a line, taken from a spreadsheet as they are. */
export function TestValuesField({ path, className }: { path: string; className?: string }) {
  const id = useId();
  const units = useUnits();
  const { save } = useEditor();
  const { value, error, set, readOnly } = useField(path);
  const [typed, setTyped] = useState<string | null>(null);
  const list: unknown[] = Array.isArray(value) ? value : [];
  const unreadable = list.findIndex((one) => typeof one !== 'number');
  const inside = save.answer.issues.find((issue) => issue.path.startsWith(`${path}.`))?.message;
  const wrong =
    unreadable >= 0
      ? `Line ${unreadable + 1}, “${String(list[unreadable])}”, is no load: correct it or take it out`
      : (error ?? inside);

  return (
    <FieldFrame
      id={id}
      label={`Ultimate loads of the specimens, ${unitOf('force', units)}`}
      error={wrong}
      hint={summary(value, units)}
      className={className}
    >
      <textarea
        id={id}
        rows={6}
        spellCheck={false}
        readOnly={readOnly}
        value={typed ?? show(value, units)}
        aria-invalid={wrong !== undefined}
        aria-describedby={`${id}-note`}
        onBlur={() => setTyped(null)}
        onChange={(event) => {
          const text = event.target.value;
          setTyped(text);
          const parts = splitValues(text);
          set(
            parts.map((part) => {
              const answer = parseQuantity(part, 'force', units);
              return answer.ok ? answer.value : part;
            }),
          );
        }}
        className={`${controlClass(wrong !== undefined)} py-2`}
      />
    </FieldFrame>
  );
}
