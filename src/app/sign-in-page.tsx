import { useQuery } from '@tanstack/react-query';
import { Navigate, useNavigate, useSearchParams } from 'react-router-dom';
import { sessionQuery } from '@/features/session/api/session';
import { SignInForm } from '@/features/session/components/sign-in-form';
import { Mark } from './mark';
import { useTitle } from '@/lib/use-title';

/** Where one was going; only a path of this application, never another site. */
const destination = (wanted: string | null): string =>
  wanted !== null && /^\/(?![/\\])/.test(wanted) ? wanted : '/projects';

export function SignInPage() {
  useTitle('Sign in');
  const navigate = useNavigate();
  const [search] = useSearchParams();
  const session = useQuery(sessionQuery);
  const to = destination(search.get('to'));
  if (session.data?.person) return <Navigate replace to={to} />;
  return (
    <main className="mx-auto flex min-h-dvh max-w-96 flex-col justify-center px-4 py-8">
      <div className="mb-6 flex items-center gap-3">
        <Mark size={30} />
        <span className="text-page font-semibold">Seamwright</span>
      </div>
      <div className="border-line bg-sheet rounded border p-5">
        <h1 className="text-panel mb-4 font-semibold">Sign in</h1>
        <SignInForm onSignedIn={() => void navigate(to, { replace: true })} />
      </div>
      <p className="text-small text-ink2 mt-4">
        Fastener schedules for built-up timber beams. Results are for review by a licensed engineer.
      </p>
    </main>
  );
}
