import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import type { ReactNode } from 'react';
import type { Project } from '@shared/schemas/api';
import { Panel } from '@/components/ui/panel';
import { EmptyState, LoadError, Skeleton } from '@/components/ui/states';
import { useTitle } from '@/lib/use-title';
import { membersQuery, projectQuery } from '../api/projects';
import { MembersTable } from './members-table';
import { Due } from './projects-table';

function Fact({ name, children }: { name: string; children: ReactNode }) {
  return (
    <div>
      <dt className="text-small text-ink2">{name}</dt>
      <dd>{children}</dd>
    </div>
  );
}

function ProjectHead({ project }: { project: Project }) {
  const nobody = <span className="text-ink2">nobody yet</span>;
  return (
    <>
      <nav aria-label="Path" className="text-small text-ink2">
        <Link to="/projects" className="hover:text-ink inline-block py-1 hover:underline">
          Projects
        </Link>
        {' / '}
        {project.number}
      </nav>
      <h1 className="text-page font-semibold">{project.name}</h1>
      <dl className="mt-3 mb-5 flex flex-wrap gap-x-10 gap-y-2">
        <Fact name="Client">{project.client}</Fact>
        {project.siteAddress !== '' && <Fact name="Site">{project.siteAddress}</Fact>}
        <Fact name="Designer">{project.designer?.name ?? nobody}</Fact>
        <Fact name="Checker">{project.checker?.name ?? nobody}</Fact>
        <Fact name="Due">
          <Due day={project.due} />
        </Fact>
      </dl>
    </>
  );
}

/** One project: who it is for and who answers for it, and its members. */
export function ProjectPage() {
  const { projectId = '' } = useParams();
  const project = useQuery(projectQuery(projectId));
  const members = useQuery(membersQuery(projectId));
  useTitle(project.data?.name ?? '');

  if (project.isError) return <LoadError error={project.error} retry={() => void project.refetch()} />;
  return (
    <>
      {project.isPending ? (
        <Skeleton label="Loading the project" lines={2} />
      ) : (
        <ProjectHead project={project.data} />
      )}
      <Panel title="Members">
        {members.isPending ? (
          <Skeleton label="Loading the members" lines={5} />
        ) : members.isError ? (
          <LoadError error={members.error} retry={() => void members.refetch()} />
        ) : members.data.items.length === 0 ? (
          <EmptyState title="No members yet">
            A member is one built-up beam: its layup, its loads, its fasteners and the schedule that follows.
          </EmptyState>
        ) : (
          <MembersTable items={members.data.items} />
        )}
      </Panel>
    </>
  );
}
