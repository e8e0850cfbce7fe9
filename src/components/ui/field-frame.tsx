import type { ReactNode } from 'react';
import { classes } from '@/lib/classes';

/** The look of anything one types or chooses in. */
export function controlClass(invalid: boolean): string {
  return classes(
    'bg-sheet min-h-9 w-full rounded border px-2.5 pointer-coarse:min-h-11 pointer-coarse:text-[16px]',
    '[&[readonly]]:border-line [&[readonly]]:bg-paper disabled:border-line disabled:bg-paper disabled:text-ink disabled:opacity-100',
    invalid ? 'border-crayon text-crayon outline-crayon border-[1.5px]' : 'border-ink2',
  );
}

/** Label above, the control, and under it either what is wrong and what to do, or a hint. */
export function FieldFrame({
  id,
  label,
  error,
  hint,
  children,
  className,
}: {
  id: string;
  label: string;
  error?: string | undefined;
  hint?: ReactNode;
  children: ReactNode;
  className?: string | undefined;
}) {
  return (
    <div className={classes('min-w-0', className)}>
      <label htmlFor={id} className="text-small text-ink2 mb-1 block font-medium">
        {label}
      </label>
      {children}
      <p
        id={`${id}-note`}
        className={classes('text-small mt-1 empty:mt-0', error ? 'text-crayon' : 'text-ink2')}
      >
        {error ?? hint}
      </p>
    </div>
  );
}
