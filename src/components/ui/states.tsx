import type { ReactNode } from 'react';
import { sayError } from '@/lib/http';
import { classes } from '@/lib/classes';
import { Button } from './button';

/** Grey bars in the place of what has not been loaded once; never shown again after that. */
export function Skeleton({ lines = 3, label }: { lines?: number; label: string }) {
  return (
    <div role="status" aria-label={label} className="grid gap-4 py-3">
      {Array.from({ length: lines }, (_, index) => (
        <div
          key={index}
          className="wait bg-line h-4 rounded"
          style={{ width: `${92 - ((index * 17) % 40)}%` }}
        />
      ))}
    </div>
  );
}

/** What a list is for while nothing is in it. */
export function EmptyState({ title, children }: { title: string; children: ReactNode }) {
  return (
    <div className="px-4 py-10 text-center">
      <p className="text-panel font-semibold">{title}</p>
      <div className="text-ink2 mx-auto mt-1 max-w-prose">{children}</div>
    </div>
  );
}

/** What went wrong with loading, and the one thing to do about it. */
export function LoadError({ error, retry }: { error: unknown; retry: () => void }) {
  return (
    <div role="alert" className="px-4 py-10 text-center">
      <p className="mb-3">{sayError(error)}</p>
      <Button onClick={retry}>Try again</Button>
    </div>
  );
}

/** A message in its place on the page; `crayon` for what is refused, `amber` for advice. */
export function Message({
  tone,
  children,
  role,
  className,
}: {
  tone: 'crayon' | 'amber' | 'plain';
  children: ReactNode;
  role?: 'alert' | 'status';
  className?: string;
}) {
  return (
    <div
      role={role}
      className={classes(
        'rounded border px-3.5 py-3',
        tone === 'crayon' && 'border-crayon bg-crayon-wash',
        tone === 'amber' && 'border-amber bg-amber-wash',
        tone === 'plain' && 'border-line2 bg-sheet',
        className,
      )}
    >
      {children}
    </div>
  );
}
