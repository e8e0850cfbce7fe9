import { useQuery } from '@tanstack/react-query';
import { Suspense, useEffect } from 'react';
import { Link, Navigate, NavLink, Outlet, useLocation } from 'react-router-dom';
import type { Person } from '@shared/schemas/api';
import { LoadError, Skeleton } from '@/components/ui/states';
import { sessionQuery } from '@/features/session/api/session';
import { PersonMenu, UnitsSwitch } from '@/features/session/components/person-menu';
import { classes } from '@/lib/classes';
import { UnitsProvider } from '@/lib/units';
import { Mark } from './mark';
import { applyTheme } from './theme';

function TopBar({ person }: { person: Person }) {
  return (
    <header className="no-print border-line2 bg-sheet border-b">
      <div className="mx-auto flex h-12 max-w-360 items-center gap-4 px-3 pointer-coarse:h-14 sm:gap-8 sm:px-6">
        <Link to="/projects" className="flex min-h-8 items-center gap-2.5 font-semibold">
          <Mark />
          <span className="max-[359px]:sr-only">Seamwright</span>
        </Link>
        <nav aria-label="Main" className="h-full">
          <NavLink
            to="/projects"
            className={({ isActive }) =>
              classes(
                'flex h-[calc(100%+1px)] items-center border-b-2 px-0.5',
                isActive ? 'border-ink text-ink' : 'text-ink2 hover:text-ink border-transparent',
              )
            }
          >
            Projects
          </NavLink>
        </nav>
        <div className="ml-auto flex items-center gap-4">
          <UnitsSwitch person={person} className="max-sm:hidden" />
          <PersonMenu person={person} />
        </div>
      </div>
    </header>
  );
}

/** What stands there while the first screen is on its way. */
export function Starting() {
  return (
    <main className="mx-auto max-w-360 p-6">
      <Skeleton label="Loading" />
    </main>
  );
}

/** Everything behind the sign-in: the top bar and the screen; sends strangers to sign in and back to here. */
export function Shell() {
  const session = useQuery(sessionQuery);
  const location = useLocation();
  const person = session.data?.person;

  useEffect(() => {
    if (person) applyTheme(person.theme);
  }, [person]);

  if (session.isPending) return <Starting />;
  if (session.isError)
    return (
      <main className="p-6">
        <LoadError error={session.error} retry={() => void session.refetch()} />
      </main>
    );
  if (!person) {
    const to = `${location.pathname}${location.search}`;
    return <Navigate replace to={to === '/' ? '/sign-in' : `/sign-in?to=${encodeURIComponent(to)}`} />;
  }
  return (
    <UnitsProvider value={person.units}>
      <a
        href="#main"
        className="bg-sheet text-spruce sr-only z-30 rounded px-3 py-2 focus:not-sr-only focus:absolute focus:top-2 focus:left-2"
      >
        Skip to the content
      </a>
      <TopBar person={person} />
      <main id="main" className="mx-auto max-w-360 px-2.5 pt-4 pb-12 sm:px-6">
        <Suspense fallback={<Skeleton label="Loading" lines={5} />}>
          <Outlet />
        </Suspense>
      </main>
    </UnitsProvider>
  );
}
