import { formatNumber } from '@shared/units';
import { classes } from '@/lib/classes';

const WIDTH = 96;
const HEIGHT = 8;

/** A length filled against a full length. Over 1 it is crayon and its end is cut by a slash. */
function UtilisationBar({ value }: { value: number }) {
  const over = value > 1 + 1e-9;
  const filled = Math.min(1, Math.max(0, value)) * WIDTH;
  return (
    <svg
      aria-hidden
      viewBox={`0 0 ${WIDTH + 8} ${HEIGHT + 6}`}
      className="h-3.5 w-26 shrink-0"
      preserveAspectRatio="xMinYMid meet"
    >
      <rect x={0.5} y={3.5} width={WIDTH} height={HEIGHT - 1} fill="none" stroke="var(--line2)" />
      <rect
        x={1}
        y={4}
        width={Math.max(0, filled - 1)}
        height={HEIGHT - 2}
        fill={over ? 'var(--crayon)' : 'var(--ink2)'}
      />
      {over && (
        <>
          <path d={`M${WIDTH - 10} 14L${WIDTH - 4} 0`} stroke="var(--sheet)" strokeWidth={5} />
          <path d={`M${WIDTH - 10} 14L${WIDTH - 4} 0`} stroke="var(--crayon)" strokeWidth={1.6} />
        </>
      )}
    </svg>
  );
}

/** 0.997 must not read as 1.00, nor 1.0004. */
const decimalsFor = (value: number): number => {
  if (Math.abs(value - 1) < 1e-9) return 2;
  for (const decimals of [2, 3]) if (Number(value.toFixed(decimals)) !== 1) return decimals;
  return 4;
};

/** Demand over capacity: the number, then its bar. */
export function Utilisation({ value, bar = true }: { value: number; bar?: boolean }) {
  const over = value > 1 + 1e-9;
  const text = formatNumber(value, decimalsFor(value));
  return (
    <span className="inline-flex items-center gap-2">
      <span className={classes('min-w-11 text-right', over && 'text-crayon font-semibold')}>{text}</span>
      {bar && <UtilisationBar value={value} />}
    </span>
  );
}

/** One of the words ok, over, advice, refused; only what is over or refused is in crayon. */
export function StatusWord({ status }: { status: 'ok' | 'over' | 'advice' | 'refused' }) {
  return (
    <span
      className={classes(
        (status === 'over' || status === 'refused') && 'text-crayon font-semibold',
        status === 'advice' && 'text-amber font-medium',
      )}
    >
      {status}
    </span>
  );
}
