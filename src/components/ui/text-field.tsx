import { useId } from 'react';
import type { ComponentProps } from 'react';
import { FieldFrame, controlClass } from './field-frame';

/** A labelled line of text. */
export function TextField({
  label,
  error,
  hint,
  className,
  ...rest
}: Omit<ComponentProps<'input'>, 'id'> & { label: string; error?: string | undefined; hint?: string }) {
  const id = useId();
  return (
    <FieldFrame id={id} label={label} error={error} hint={hint} className={className}>
      <input
        id={id}
        aria-invalid={error !== undefined}
        aria-describedby={`${id}-note`}
        className={controlClass(error !== undefined)}
        {...rest}
      />
    </FieldFrame>
  );
}
