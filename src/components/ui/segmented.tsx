import { classes } from '@/lib/classes';

interface Option<T extends string> {
  value: T;
  label: string;
  /** what a screen reader says where the label is a sign */
  name?: string;
}

/** A choice of a few that are all in sight; the chosen one is inked. */
export function Segmented<T extends string>({
  label,
  value,
  options,
  onChange,
  className,
}: {
  label: string;
  value: T;
  options: readonly Option<T>[];
  onChange: (value: T) => void;
  className?: string;
}) {
  return (
    <div
      role="group"
      aria-label={label}
      className={classes(
        'inline-flex max-w-full flex-wrap overflow-hidden rounded border border-ink2',
        className,
      )}
    >
      {options.map((option) => (
        <button
          key={option.value}
          type="button"
          aria-pressed={option.value === value}
          aria-label={option.name}
          onClick={() => onChange(option.value)}
          className={classes(
            'text-small min-h-8 min-w-8 px-2.5 -outline-offset-2 pointer-coarse:min-h-11 pointer-coarse:min-w-11',
            option.value === value ? 'bg-ink text-paper font-medium' : 'bg-sheet text-ink2 hover:text-ink',
          )}
        >
          {option.label}
        </button>
      ))}
    </div>
  );
}
