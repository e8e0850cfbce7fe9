import { capacityOnBasis, valueAt, withValueAt } from '../model/draft-document';
import { useEditor } from '../model/editor';
import { ChoiceField, QuantityField, useField } from './fields';
import { TestValuesField } from './test-values-field';

const bases = [
  { value: 'ultimate', label: 'Ultimate load ÷ factor of safety' },
  { value: 'allowable', label: 'Allowable load' },
] as const;
const testBasis = { value: 'test', label: 'Tests, lower 5 % value (EN 14358)' } as const;

const valueLabels: Record<
  string,
  { ultimate: string; allowable: string; measure: 'force' | 'stress' | 'flow' }
> = {
  fasteners: { ultimate: 'Ultimate, one fastener', allowable: 'Allowable, one fastener', measure: 'force' },
  adhesive: { ultimate: 'Ultimate shear stress', allowable: 'Allowable shear stress', measure: 'stress' },
  continuous: { ultimate: 'Ultimate, per length', allowable: 'Allowable, per length', measure: 'flow' },
};

/** What one fastener, one length of line or one area of glue may carry, and on what ground. */
export function CapacityFields({ path, kind }: { path: string; kind: string }) {
  const { document, replace } = useEditor();
  const basis = useField(`${path}.basis`).value;
  const labels = valueLabels[kind] ?? valueLabels.fasteners;
  if (!labels) return null;
  const choices = kind === 'fasteners' ? [...bases, testBasis] : bases;
  return (
    <fieldset className="grid gap-x-4 gap-y-3 sm:grid-cols-8">
      <legend className="mb-2 font-semibold">Capacity</legend>
      <ChoiceField
        path={`${path}.basis`}
        label="Basis"
        choices={choices}
        onChoose={(chosen) =>
          replace(withValueAt(document, path, capacityOnBasis(valueAt(document, path), chosen)))
        }
        className="sm:col-span-3"
      />
      {basis === 'ultimate' && (
        <>
          <QuantityField
            path={`${path}.value`}
            label={labels.ultimate}
            measure={labels.measure}
            className="sm:col-span-3"
          />
          <QuantityField
            path={`${path}.factorOfSafety`}
            label="Factor of safety"
            measure="number"
            className="sm:col-span-2"
          />
        </>
      )}
      {basis === 'allowable' && (
        <QuantityField
          path={`${path}.value`}
          label={labels.allowable}
          measure={labels.measure}
          className="sm:col-span-3"
        />
      )}
      {basis === 'test' && (
        <>
          <QuantityField
            path={`${path}.factorOfSafety`}
            label="Factor of safety"
            measure="number"
            className="sm:col-span-3"
          />
          <TestValuesField path={`${path}.values`} className="sm:col-span-8" />
        </>
      )}
    </fieldset>
  );
}
