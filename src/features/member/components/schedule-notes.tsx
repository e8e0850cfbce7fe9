import { formatWithUnit } from '@shared/units';
import { Message } from '@/components/ui/states';
import { Panel } from '@/components/ui/panel';
import { useUnits } from '@/lib/units';
import { toBring } from '../model/to-bring';
import type { Joint, Worked } from '../model/worked';

/** Counts for the van, joint by joint. */
export function ToBring({ worked, joint }: { worked: Worked; joint: Joint | null }) {
  const units = useUnits();
  const items = toBring(worked, units);
  const found = joint !== null && joint.outcome.zones.length > 0 && !joint.outcome.pinned ? joint : null;
  return (
    <section aria-label="To bring">
      <h2 className="text-panel mb-1.5 font-semibold">To bring</h2>
      {items.length === 0 ? (
        <p className="text-ink2">Nothing yet: there is no schedule to count.</p>
      ) : (
        <ul className="space-y-1">
          {items.map(({ what, joints }) => (
            <li key={`${what} ${joints.join()}`}>
              {what}, <span className="text-ink2">{joints.join(', ')}</span>
            </li>
          ))}
        </ul>
      )}
      {found !== null && (
        <p className="text-small text-ink2 mt-2">
          Fewest possible for {found.outcome.id} within {found.rules.maxZones}{' '}
          {found.rules.maxZones === 1 ? 'zone' : 'zones'}, steps of{' '}
          {formatWithUnit(found.rules.spacingStep, 'size', units)}.
        </p>
      )}
    </section>
  );
}

/** A message whose first sentence says what is the matter, and the rest what to do. */
function FirstSentence({ text }: { text: string }) {
  const end = text.indexOf('. ') + 1;
  return (
    <p>
      <strong className="text-crayon font-semibold">{end > 0 ? text.slice(0, end) : text}</strong>
      {end > 0 && text.slice(end)}
    </p>
  );
}

const isOver = (code: string): boolean => code === 'no-schedule' || code === 'pitch-below-bead';

/** What the calculation wants one to know; where no schedule exists, what would help and by how much. */
export function Notices({ worked }: { worked: Worked }) {
  const { notices } = worked.result;
  if (notices.length === 0) return null;
  const grave = notices.filter((notice) => isOver(notice.code));
  const others = notices.filter((notice) => !isOver(notice.code));
  return (
    <>
      {grave.map((notice) => (
        <Message key={`${notice.code} ${notice.interface ?? ''}`} tone="crayon">
          <FirstSentence text={notice.message} />
        </Message>
      ))}
      {others.length > 0 && (
        <Panel title="Notices">
          <ul className="space-y-1.5">
            {others.map((notice) => (
              <li key={`${notice.code} ${notice.interface ?? ''} ${notice.message}`} className="flex gap-2.5">
                <span aria-hidden className="bg-amber mt-1.75 size-1.5 shrink-0 rounded-full" />
                {notice.message}
              </li>
            ))}
          </ul>
        </Panel>
      )}
    </>
  );
}

/** What no calculation can know, said where its result is read. */
export function Cautions() {
  return (
    <section aria-label="Cautions" className="text-small text-ink2 border-line border-t pt-4">
      <h2 className="mb-1 font-semibold">Before anybody builds from this</h2>
      <ul className="grid list-disc gap-x-10 gap-y-1 pl-4 md:grid-cols-2">
        <li>
          These results are for review by a licensed engineer. The local code governs, whatever stands here.
        </li>
        <li>
          Wood that is wet, split or treated, and any load that was not entered, lie outside of this
          calculation.
        </li>
        <li>
          A platform that people stand on needs guard rails or fall arrest, whatever this calculation says of
          its strength.
        </li>
        <li>Temporary works need an approval of their own.</li>
        <li>
          Nails are counted for load across their shank only. Never hang a load from a nail that could pull
          straight out, above all not from end grain.
        </li>
        <li>This is a draft: nobody has signed it off.</li>
      </ul>
    </section>
  );
}
