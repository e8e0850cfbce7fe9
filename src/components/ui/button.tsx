import type { ComponentProps } from 'react';
import { classes } from '@/lib/classes';

type Look = 'main' | 'plain' | 'quiet';

const looks: Record<Look, string> = {
  main: 'border-spruce bg-spruce text-on-spruce hover:opacity-90',
  plain: 'border-line2 bg-sheet text-ink hover:border-ink2',
  quiet: 'border-transparent bg-transparent text-ink hover:bg-spruce-wash',
};

/** A button: `main` for the one thing a screen is for, `plain` beside it, `quiet` inside tables and panels. */
export function Button({ look = 'plain', className, ...rest }: ComponentProps<'button'> & { look?: Look }) {
  return (
    <button
      type="button"
      className={classes(
        'inline-flex min-h-9 items-center justify-center gap-2 rounded border px-3.5 font-medium whitespace-nowrap pointer-coarse:min-h-11',
        'disabled:border-line disabled:bg-transparent disabled:text-ink2 disabled:hover:opacity-100',
        looks[look],
        className,
      )}
      {...rest}
    />
  );
}
