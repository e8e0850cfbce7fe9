import { useInfiniteQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { ProjectSort } from '@shared/schemas/api';
import { Button } from '@/components/ui/button';
import { controlClass } from '@/components/ui/field-frame';
import { Panel } from '@/components/ui/panel';
import { EmptyState, LoadError, Skeleton } from '@/components/ui/states';
import { useTitle } from '@/lib/use-title';
import { projectsQuery } from '../api/projects';
import { nextSort, readSort } from '../lib/sort';
import { ProjectsTable } from './projects-table';

/** Searches as one types, a little after the last key; the address holds what is searched for. */
function Search({ q, onSearch }: { q: string; onSearch: (q: string) => void }) {
  const [text, setText] = useState(q);
  const wanted = text.trim();
  useEffect(() => {
    if (wanted === q) return;
    const timer = setTimeout(() => onSearch(wanted), 250);
    return () => clearTimeout(timer);
  }, [wanted, q, onSearch]);
  return (
    <input
      type="search"
      aria-label="Search projects by name, number, client or mark"
      placeholder="Name, number, client, mark…"
      value={text}
      onChange={(event) => setText(event.target.value)}
      className={`${controlClass(false)} sm:max-w-70`}
    />
  );
}

/** Every project one may see, as a table that can be searched and ordered; the address holds both. */
export function ProjectsPage() {
  useTitle('Projects');
  const [search, setSearch] = useSearchParams();
  const q = search.get('q') ?? '';
  const [cleared, setCleared] = useState(0);
  const sort = readSort(search.get('sort'));
  const projects = useInfiniteQuery(projectsQuery(q, sort));

  const put = (key: 'q' | 'sort', value: string) =>
    setSearch(
      (before) => {
        const after = new URLSearchParams(before);
        if (value === '') after.delete(key);
        else after.set(key, value);
        return after;
      },
      { replace: true },
    );
  const order = (key: ProjectSort) => put('sort', nextSort(sort, key));

  const items = projects.data?.pages.flatMap((page) => page.items) ?? [];
  return (
    <>
      <div className="mb-4 flex flex-wrap items-center gap-x-10 gap-y-2">
        <h1 className="text-page font-semibold">Projects</h1>
        <div className="w-full sm:w-70">
          <Search key={cleared} q={q} onSearch={(text) => put('q', text)} />
        </div>
      </div>
      <Panel label="Projects" className="py-1">
        {projects.isPending ? (
          <Skeleton label="Loading the projects" lines={5} />
        ) : projects.isError ? (
          <LoadError error={projects.error} retry={() => void projects.refetch()} />
        ) : items.length === 0 && q !== '' ? (
          <EmptyState title={`No project has “${q}” in its name, number, client or marks`}>
            <Button
              className="mt-3"
              onClick={() => {
                put('q', '');
                setCleared(cleared + 1);
              }}
            >
              Show all projects
            </Button>
          </EmptyState>
        ) : items.length === 0 ? (
          <EmptyState title="No projects yet">
            A project holds the members of one job and says who draws them up and who checks them. Projects
            that you are put on appear here.
          </EmptyState>
        ) : (
          <div
            className="settling"
            style={{ opacity: projects.isPlaceholderData ? 0.55 : 1 }}
            aria-busy={projects.isPlaceholderData}
          >
            <ProjectsTable items={items} sort={sort} onSort={order} />
            {projects.hasNextPage && (
              <div className="py-3 text-center">
                <Button disabled={projects.isFetchingNextPage} onClick={() => void projects.fetchNextPage()}>
                  {projects.isFetchingNextPage ? 'Loading…' : 'Show more'}
                </Button>
              </div>
            )}
          </div>
        )}
      </Panel>
      {items.length > 0 && (
        <p className="text-small text-ink2 mt-2.5">
          A bar is a project’s members: draft, in check, sent back, signed off, one step a member.
        </p>
      )}
    </>
  );
}
