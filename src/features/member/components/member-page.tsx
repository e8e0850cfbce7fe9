import { useQuery } from '@tanstack/react-query';
import { useEffect } from 'react';
import { Link, NavLink, Outlet, useParams } from 'react-router-dom';
import type { Member } from '@shared/schemas/api';
import { Button } from '@/components/ui/button';
import { LoadError, Skeleton } from '@/components/ui/states';
import { classes } from '@/lib/classes';
import { inField } from '@/lib/keys';
import { useTitle } from '@/lib/use-title';
import { memberQuery } from '../api/member';
import { EditorProvider, useEditor, useMemberEditor } from '../model/editor';
import { Conflict } from './conflict';
import { Refusal } from './refusal';
import { SaveStatus } from './save-status';

const stateWords: Record<Member['state'], string> = {
  draft: 'Draft',
  'in-check': 'In check',
  'sent-back': 'Sent back',
  'signed-off': 'Signed off',
  superseded: 'Superseded',
};

function MemberHead() {
  const { member, canUndo, undo, readOnly } = useEditor();
  return (
    <div className="mb-3 flex flex-wrap items-end justify-between gap-x-6 gap-y-2">
      <div className="min-w-0">
        <nav aria-label="Path" className="text-small text-ink2">
          <Link to="/projects" className="hover:text-ink inline-block py-1 hover:underline">
            Projects
          </Link>
          {' / '}
          <Link
            to={`/projects/${member.projectId}`}
            className="hover:text-ink inline-block py-1 hover:underline"
          >
            {member.project.number} {member.project.name}
          </Link>
        </nav>
        <div className="flex flex-wrap items-center gap-x-5 gap-y-1">
          <h1 className="text-page font-semibold">
            {member.mark} · {member.title}
          </h1>
          <span className="border-line2 bg-sheet text-small text-ink2 rounded border px-2 py-0.5 whitespace-nowrap">
            {stateWords[member.state]} · revision {member.revision}
          </span>
          <SaveStatus />
        </div>
      </div>
      <div className="no-print flex gap-2.5">
        {!readOnly && (
          <Button
            disabled={!canUndo}
            onClick={undo}
            title="Take back the last change (Ctrl+Z outside a field)"
          >
            Undo
          </Button>
        )}
        <Button onClick={() => window.print()}>Print</Button>
      </div>
    </div>
  );
}

type Say = { tone: 'crayon' | 'amber'; text: string } | null;

/** What a step has to say, for the dot beside its name. */
const useStepSays = (): { fastening: Say; schedule: Say } => {
  const { answer } = useEditor().save;
  if (answer.result === null)
    return { fastening: { tone: 'crayon', text: 'something to mend' }, schedule: null };
  const statuses = answer.result.interfaces.map((one) => one.status);
  if (statuses.includes('over')) return { fastening: null, schedule: { tone: 'crayon', text: 'over' } };
  // that joints are taken as rigid holds for every member, and is no news
  const news = answer.result.notices.filter((notice) => notice.code !== 'rigid-joints');
  const advice = statuses.includes('advice') || news.length > 0;
  return { fastening: null, schedule: advice ? { tone: 'amber', text: 'has notices' } : null };
};

function StepStrip() {
  const says = useStepSays();
  const steps = [
    { to: 'fastening', name: 'Fastening', say: says.fastening },
    { to: 'schedule', name: 'Schedule', say: says.schedule },
  ];
  return (
    <nav aria-label="Steps" className="no-print border-line2 mb-4 border-b">
      <ol className="flex gap-6">
        {steps.map(({ to, name, say }, index) => (
          <li key={to}>
            <NavLink
              to={to}
              className={({ isActive }) =>
                classes(
                  '-mb-px flex min-h-10 items-center gap-2.5 border-b-3 pr-3 pointer-coarse:min-h-11',
                  isActive ? 'border-spruce font-semibold' : 'text-ink2 hover:text-ink border-transparent',
                )
              }
            >
              <span className="text-small text-ink2 font-normal">{index + 1}</span>
              {name}
              {say !== null && (
                <>
                  <span
                    aria-hidden
                    className={classes(
                      'size-1.5 rounded-full',
                      say.tone === 'crayon' ? 'bg-crayon' : 'bg-amber',
                    )}
                  />
                  <span className="sr-only">{say.text}</span>
                </>
              )}
            </NavLink>
          </li>
        ))}
      </ol>
    </nav>
  );
}

function UndoByKey() {
  const { undo, readOnly } = useEditor();
  useEffect(() => {
    if (readOnly) return;
    const onKey = (event: KeyboardEvent) => {
      if (!(event.ctrlKey || event.metaKey) || event.shiftKey || event.key.toLowerCase() !== 'z') return;
      if (inField(event.target)) return;
      event.preventDefault();
      undo();
    };
    document.addEventListener('keydown', onKey);
    return () => document.removeEventListener('keydown', onKey);
  }, [undo, readOnly]);
  return null;
}

function LoadedMember({ member }: { member: Member }) {
  const editor = useMemberEditor(member);
  useTitle(`${member.mark} ${member.title}`);
  return (
    <EditorProvider value={editor}>
      <UndoByKey />
      <MemberHead />
      <StepStrip />
      <Conflict />
      <Refusal />
      <Outlet />
    </EditorProvider>
  );
}

/** One member: its head, its steps, and whichever of these is open. */
export function MemberPage() {
  const { memberId = '' } = useParams();
  const member = useQuery(memberQuery(memberId));
  if (member.isPending) return <Skeleton label="Loading the member" lines={6} />;
  if (member.isError) return <LoadError error={member.error} retry={() => void member.refetch()} />;
  return <LoadedMember key={member.data.id} member={member.data} />;
}
