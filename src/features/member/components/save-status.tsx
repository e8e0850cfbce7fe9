import { Link, useLocation } from 'react-router-dom';
import { savedWhen } from '@/lib/time';
import { Button } from '@/components/ui/button';
import { useEditor } from '../model/editor';

/** Whether what stands on the screen is on the server, in a few words beside the title. */
export function SaveStatus() {
  const { save, retry, readOnly } = useEditor();
  const location = useLocation();
  const { state, answer } = save;
  const saved = <>Saved {savedWhen(answer.saved.at, new Date())}</>;
  return (
    <p role="status" className="text-small text-ink2 flex flex-wrap items-center gap-x-2">
      {readOnly && <span>You may read this member, not change it. </span>}
      {state.kind === 'saved' && <span>{saved}</span>}
      {(state.kind === 'waiting' || state.kind === 'saving') && <span>saving…</span>}
      {state.kind === 'retrying' && (
        <>
          <span className="text-amber font-medium">not saved, trying again</span>
          <Button look="quiet" className="text-small min-h-8 px-2 underline" onClick={retry}>
            Now
          </Button>
        </>
      )}
      {state.kind === 'conflict' && <span className="text-crayon font-medium">not saved</span>}
      {state.kind === 'stopped' && (
        <span className="text-crayon">
          <span className="font-medium">not saved: </span>
          {state.message}{' '}
          {state.reason === 'signed-out' && (
            <Link
              className="underline underline-offset-2"
              to={`/sign-in?to=${encodeURIComponent(location.pathname)}`}
            >
              Sign in again
            </Link>
          )}
        </span>
      )}
    </p>
  );
}
