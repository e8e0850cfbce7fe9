import { Link, useRouteError } from 'react-router-dom';
import { sayError } from '@/lib/http';
import { useTitle } from '@/lib/use-title';

/** An address that leads nowhere. */
export function NotFound() {
  useTitle('Not found');
  return (
    <div className="px-4 py-16 text-center">
      <h1 className="text-page font-semibold">Nothing is here</h1>
      <p className="text-ink2 mt-1 mb-4">
        The address is wrong, or what was here is gone or not yours to see.
      </p>
      <Link to="/projects" className="text-spruce font-medium underline underline-offset-2">
        To the projects
      </Link>
    </div>
  );
}

/** The last net: a screen that broke says so and offers the way on. */
export function BrokenPage() {
  const error = useRouteError();
  return (
    <main role="alert" className="px-4 py-16 text-center">
      <h1 className="text-page font-semibold">This page broke</h1>
      <p className="text-ink2 mt-1 mb-4">{sayError(error)}</p>
      <a href="/projects" className="text-spruce font-medium underline underline-offset-2">
        To the projects
      </a>
    </main>
  );
}
