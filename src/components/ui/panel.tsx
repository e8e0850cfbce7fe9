import { useId } from 'react';
import type { ReactNode } from 'react';
import { classes } from '@/lib/classes';

/** A sheet on the desk: hairline border, a title, what belongs together. */
export function Panel({
  title,
  aside,
  children,
  className,
  label,
}: {
  title?: ReactNode;
  aside?: ReactNode;
  children: ReactNode;
  className?: string;
  /** names a panel without a visible title */
  label?: string;
}) {
  const id = useId();
  return (
    <section
      aria-labelledby={title === undefined ? undefined : id}
      aria-label={title === undefined ? label : undefined}
      className={classes('panel border-line bg-sheet rounded border p-3.5 sm:p-4', className)}
    >
      {title !== undefined && (
        <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-4 gap-y-1">
          <h2 id={id} className="text-panel font-semibold">
            {title}
          </h2>
          {aside !== undefined && <div className="text-small text-ink2">{aside}</div>}
        </div>
      )}
      {children}
    </section>
  );
}
