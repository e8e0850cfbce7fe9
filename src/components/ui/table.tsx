import type { ComponentProps, ReactNode } from 'react';
import { classes } from '@/lib/classes';

/** A table on hairlines. It scrolls by itself where the screen is too narrow, never the page. */
export function Table({
  label,
  children,
  className,
}: {
  label: string;
  children: ReactNode;
  className?: string;
}) {
  return (
    <div className="relative -mx-1 overflow-x-auto px-1">
      <table aria-label={label} className={classes('w-full border-collapse', className)}>
        {children}
      </table>
    </div>
  );
}

const headClass = 'border-line2 text-small text-ink2 border-b text-left font-medium';

/** A column's head: small, in secondary ink. */
export function HeadCell({ className, ...rest }: ComponentProps<'th'>) {
  return <th scope="col" className={classes(headClass, 'px-2.5 py-2.5', className)} {...rest} />;
}

/** A cell; figures are given `text-right`. */
export function Cell({ className, ...rest }: ComponentProps<'td'>) {
  return <td className={classes('border-line border-b px-2.5 py-2.5', className)} {...rest} />;
}

/** The head of a column that the table may be ordered by. */
export function SortHead({
  children,
  direction,
  onSort,
  className,
}: {
  children: ReactNode;
  direction: 'ascending' | 'descending' | null;
  onSort: () => void;
  className?: string;
}) {
  return (
    <th scope="col" aria-sort={direction ?? undefined} className={classes(headClass, className)}>
      <button
        type="button"
        onClick={onSort}
        className="hover:text-ink min-h-9 px-2.5 text-left font-medium whitespace-nowrap -outline-offset-2 pointer-coarse:min-h-11"
      >
        {children}
        <span aria-hidden className="ml-1 inline-block w-2">
          {direction === 'ascending' ? '↑' : direction === 'descending' ? '↓' : ''}
        </span>
      </button>
    </th>
  );
}
