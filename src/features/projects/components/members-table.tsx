import { Link } from 'react-router-dom';
import type { MemberSummary } from '@shared/schemas/api';
import { Cell, HeadCell, Table } from '@/components/ui/table';
import { StatusWord, Utilisation } from '@/components/ui/utilisation';
import { ago } from '@/lib/time';

const stateWords: Record<MemberSummary['state'], string> = {
  draft: 'Draft',
  'in-check': 'In check',
  'sent-back': 'Sent back',
  'signed-off': 'Signed off',
  superseded: 'Superseded',
};

/** A project's members; the mark is the way to the member's schedule. */
export function MembersTable({ items }: { items: readonly MemberSummary[] }) {
  return (
    <Table label="Members">
      <thead>
        <tr>
          <HeadCell>Mark</HeadCell>
          <HeadCell>Title</HeadCell>
          <HeadCell className="max-md:hidden">Revision</HeadCell>
          <HeadCell>Status</HeadCell>
          <HeadCell className="max-sm:text-right">
            <span className="sm:hidden">Used</span>
            <span className="max-sm:hidden">Largest utilisation</span>
          </HeadCell>
          <HeadCell className="max-md:hidden">Last change</HeadCell>
        </tr>
      </thead>
      <tbody>
        {items.map((member) => (
          <tr key={member.id} className="hover:bg-paper relative">
            <Cell className="font-semibold whitespace-nowrap">
              <Link to={`/members/${member.id}`} className="after:absolute after:inset-0">
                {member.mark}
              </Link>
            </Cell>
            <Cell>{member.title}</Cell>
            <Cell className="text-ink2 whitespace-nowrap max-md:hidden">
              {stateWords[member.state]} · {member.revision}
            </Cell>
            <Cell>
              <StatusWord status={member.outcome} />
            </Cell>
            <Cell className="max-sm:text-right">
              {member.utilisation === null ? (
                <span className="text-ink2">none</span>
              ) : (
                <>
                  <span className="sm:hidden">
                    <Utilisation value={member.utilisation} bar={false} />
                  </span>
                  <span className="max-sm:hidden">
                    <Utilisation value={member.utilisation} />
                  </span>
                </>
              )}
            </Cell>
            <Cell className="text-small text-ink2 whitespace-nowrap max-md:hidden">
              <time dateTime={member.lastChange.at}>{ago(member.lastChange.at, new Date())}</time>
              {member.lastChange.by !== null && `, ${member.lastChange.by.name.split(' ')[0] ?? ''}`}
            </Cell>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
