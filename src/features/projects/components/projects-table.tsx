import { Link } from 'react-router-dom';
import type { Project, ProjectSort } from '@shared/schemas/api';
import { Cell, SortHead, Table } from '@/components/ui/table';
import { ago, dueDay } from '@/lib/time';
import { directionOf } from '../lib/sort';
import { MemberCountsBar, countsInWords } from './member-counts';

const columns = [
  { key: 'number', title: 'No.', className: '' },
  { key: 'name', title: 'Project', className: '' },
  { key: 'client', title: 'Client', className: 'max-xl:hidden' },
  { key: 'members', title: 'Members', className: '' },
  { key: 'designer', title: 'Designer', className: 'max-lg:hidden' },
  { key: 'checker', title: 'Checker', className: 'max-lg:hidden' },
  { key: 'due', title: 'Due', className: 'max-sm:hidden' },
  { key: 'change', title: 'Last change', className: 'max-md:hidden' },
] as const;

const who = (person: { name: string } | null) =>
  person?.name ?? <span className="text-ink2">nobody yet</span>;

export function Due({ day }: { day: string | null }) {
  if (day === null) return <span className="text-ink2">none</span>;
  const { text, late } = dueDay(day, new Date());
  return <span className={late > 0 ? 'text-amber' : ''}>{text}</span>;
}

function LastChange({ change }: { change: Project['lastChange'] }) {
  if (change === null) return null;
  const by = change.by?.name.split(' ')[0];
  return (
    <span className="text-small text-ink2 whitespace-nowrap">
      <time dateTime={change.at}>{ago(change.at, new Date())}</time>
      {by !== undefined && `, ${by}`}
    </span>
  );
}

/** The table of projects; the name is the way into one. */
export function ProjectsTable({
  items,
  sort,
  onSort,
}: {
  items: readonly Project[];
  sort: ProjectSort;
  onSort: (key: ProjectSort) => void;
}) {
  return (
    <Table label="Projects">
      <thead>
        <tr>
          {columns.map(({ key, title, className }) => (
            <SortHead
              key={key}
              direction={directionOf(sort, key)}
              onSort={() => onSort(key)}
              className={className}
            >
              {title}
            </SortHead>
          ))}
        </tr>
      </thead>
      <tbody>
        {items.map((project) => (
          <tr key={project.id} className="hover:bg-paper relative">
            <Cell className="text-ink2 whitespace-nowrap">{project.number}</Cell>
            <Cell className="font-semibold">
              <Link to={`/projects/${project.id}`} className="after:absolute after:inset-0">
                {project.name}
              </Link>
              <span className="text-small text-ink2 block font-normal sm:hidden">
                due <Due day={project.due} />
              </span>
            </Cell>
            <Cell className="max-xl:hidden">{project.client}</Cell>
            <Cell>
              <span className="flex flex-wrap items-center gap-x-4 gap-y-1">
                <MemberCountsBar members={project.members} />
                <span className="text-small text-ink2">{countsInWords(project.members)}</span>
              </span>
            </Cell>
            <Cell className="max-lg:hidden">{who(project.designer)}</Cell>
            <Cell className="max-lg:hidden">{who(project.checker)}</Cell>
            <Cell className="whitespace-nowrap max-sm:hidden">
              <Due day={project.due} />
            </Cell>
            <Cell className="max-md:hidden">
              <LastChange change={project.lastChange} />
            </Cell>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
