import { useEffect, useId, useRef, useState } from 'react';
import type { ReactNode } from 'react';
import { classes } from '@/lib/classes';

/** A button and what it opens; closes on Escape, on a click elsewhere, and when the focus moves on. */
export function Popover({
  label,
  trigger,
  triggerClass,
  children,
}: {
  label: string;
  trigger: ReactNode;
  triggerClass?: string;
  children: ReactNode;
}) {
  const [open, setOpen] = useState(false);
  const id = useId();
  const root = useRef<HTMLDivElement>(null);
  const button = useRef<HTMLButtonElement>(null);

  useEffect(() => {
    if (!open) return;
    const elsewhere = (event: PointerEvent | FocusEvent) => {
      if (event.target instanceof Node && !root.current?.contains(event.target)) setOpen(false);
    };
    document.addEventListener('pointerdown', elsewhere);
    document.addEventListener('focusin', elsewhere);
    const onKey = (event: KeyboardEvent) => {
      if (event.key !== 'Escape') return;
      setOpen(false);
      button.current?.focus();
    };
    document.addEventListener('keydown', onKey);
    return () => {
      document.removeEventListener('pointerdown', elsewhere);
      document.removeEventListener('focusin', elsewhere);
      document.removeEventListener('keydown', onKey);
    };
  }, [open]);

  return (
    <div ref={root} className="relative">
      <button
        ref={button}
        type="button"
        aria-label={label}
        aria-expanded={open}
        aria-controls={id}
        className={triggerClass}
        onClick={() => setOpen(!open)}
      >
        {trigger}
      </button>
      <div
        id={id}
        hidden={!open}
        className={classes(
          'border-line2 bg-sheet absolute top-full right-0 z-20 mt-2 w-64 rounded border p-4',
          open && 'appear',
        )}
      >
        {children}
      </div>
    </div>
  );
}
