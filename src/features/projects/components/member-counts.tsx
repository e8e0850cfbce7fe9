import type { MemberState, Project } from '@shared/schemas/api';

const states: readonly { state: MemberState; word: string; fill: string }[] = [
  { state: 'draft', word: 'draft', fill: 'var(--line)' },
  { state: 'in-check', word: 'in check', fill: 'var(--timber)' },
  { state: 'sent-back', word: 'sent back', fill: 'var(--crayon-wash)' },
  { state: 'signed-off', word: 'signed', fill: 'var(--spruce)' },
  { state: 'superseded', word: 'superseded', fill: 'var(--paper)' },
];

const STEP = 12;
const LONGEST = 168;

const countsOf = (members: Project['members']) =>
  states.flatMap(({ state, word, fill }) => {
    const count = members[state] ?? 0;
    return count === 0 ? [] : [{ state, word, fill, count }];
  });

/** How many members a project has. */
export function totalMembers(members: Project['members']): number {
  return countsOf(members).reduce((sum, { count }) => sum + count, 0);
}

/** "2 draft · 3 in check · 4 signed". */
export function countsInWords(members: Project['members']): string {
  const counts = countsOf(members);
  return counts.length === 0 ? 'none yet' : counts.map(({ count, word }) => `${count} ${word}`).join(' · ');
}

/** A project's members as a bar: one step a member, one fill a state. */
export function MemberCountsBar({ members }: { members: Project['members'] }) {
  const total = totalMembers(members);
  if (total === 0) return null;
  const step = Math.min(STEP, LONGEST / total);
  const parts = countsOf(members).map((part, index, all) => ({
    ...part,
    from: all.slice(0, index).reduce((sum, { count }) => sum + count, 0) * step,
    width: part.count * step,
  }));
  return (
    <svg aria-hidden width={Math.ceil(total * step) + 1} height={11} className="shrink-0">
      {parts.map(({ state, fill, from, width }) => (
        <rect
          key={state}
          x={from + 0.5}
          y={0.5}
          width={width - 1}
          height={10}
          fill={fill}
          stroke="var(--line2)"
        />
      ))}
    </svg>
  );
}
