import { useEffect, useState } from 'react';
import type { ReactNode } from 'react';
import { clockTime } from '@/lib/time';
import { useEditor } from '../model/editor';

const FADE_AFTER = 150;
const SAY_AFTER = 400;

/** True once `since` is `delay` milliseconds ago; false again as soon as it is null. */
function useLongerThan(since: number | null, delay: number): boolean {
  const [passed, setPassed] = useState<number | null>(null);
  useEffect(() => {
    if (since === null) return;
    const timer = setTimeout(() => setPassed(since), Math.max(0, since + delay - Date.now()));
    return () => clearTimeout(timer);
  }, [since, delay]);
  return since !== null && passed === since;
}

/** How fresh the figures on the screen are. */
export function useFreshness(): { faded: boolean; words: string | null } {
  const { save } = useEditor();
  const fade = useLongerThan(save.pendingSince, FADE_AFTER);
  const late = useLongerThan(save.pendingSince, SAY_AFTER);
  const { answer, good } = save;
  if (late) return { faded: true, words: 'recalculating' };
  if (answer.result === null && good !== null)
    return { faded: true, words: `as of ${clockTime(good.saved.at)}, before the change that is refused` };
  return { faded: fade, words: null };
}

/** Keeps figures in their place while newer ones are on their way, and shows that they are not the newest. */
export function Settling({ children }: { children: ReactNode }) {
  const { faded } = useFreshness();
  return (
    <div className="settling" style={{ opacity: faded ? 0.55 : 1 }}>
      {children}
    </div>
  );
}

/** The words that go with it, for the head of a drawing. */
export function FreshnessNote() {
  const { words } = useFreshness();
  return (
    <span role="status" className="text-small text-ink2 appear">
      {words}
    </span>
  );
}
