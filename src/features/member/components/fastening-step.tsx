import { formatWithUnit } from '@shared/units';
import { SectionDrawing } from '@/components/drawing/section-drawing';
import { findContacts } from '@/components/drawing/section-geometry';
import type { Contact } from '@/components/drawing/section-geometry';
import { Button } from '@/components/ui/button';
import { Panel } from '@/components/ui/panel';
import { useUnits } from '@/lib/units';
import { connectionsOf, newConnection, piecesOf, withConnections } from '../model/draft-document';
import type { DraftConnection } from '../model/draft-document';
import { useEditor } from '../model/editor';
import { ConnectionCard } from './connection-card';
import { MemberRules } from './rules-fields';
import { FreshnessNote, Settling } from './settling';

const joins = (connection: DraftConnection, contact: Contact): boolean => {
  const [a, b] = connection.pieces;
  const [c, d] = contact.pieces;
  return (a === c && b === d) || (a === d && b === c);
};

function SectionPanel({ contacts, joined }: { contacts: readonly Contact[]; joined: ReadonlySet<string> }) {
  const units = useUnits();
  const { document, save } = useEditor();
  const result = save.answer.result;
  const section = save.good?.result?.section;
  const pieces = piecesOf(document);
  const loose = new Set(contacts.filter((contact) => !joined.has(contact.id)).map((contact) => contact.id));
  return (
    <Panel title="Section" aside={<FreshnessNote />} className="lg:sticky lg:top-4">
      {pieces.length === 0 ? (
        <p className="text-ink2 py-6">The document has no piece that can be drawn.</p>
      ) : (
        <SectionDrawing pieces={pieces} centroid={result?.section.centroid ?? null} loose={loose} />
      )}
      {section !== undefined && (
        <Settling>
          <p className="text-small text-ink2 mt-3">
            EI = {formatWithUnit(section.EI, 'rigidity', units)} · E ={' '}
            {formatWithUnit(section.referenceModulus, 'stress', units)}
            {section.massPerLength !== null && ` · ${formatWithUnit(section.massPerLength, 'mass', units)}`}
          </p>
        </Settling>
      )}
    </Panel>
  );
}

function Unjoined({ contacts }: { contacts: readonly Contact[] }) {
  const units = useUnits();
  const { document, replace, readOnly } = useEditor();
  if (contacts.length === 0) return null;
  return (
    <Panel title={contacts.length === 1 ? 'Nothing joins this' : 'Nothing joins these'}>
      <p className="text-ink2">An interface without a connection carries no shear flow.</p>
      <ul>
        {contacts.map((contact) => (
          <li
            key={contact.id}
            className="border-line flex flex-wrap items-center gap-x-4 gap-y-1 border-b py-2 last:border-0 last:pb-0"
          >
            <span>
              <strong className="font-semibold">{contact.id}</strong>{' '}
              <span className="text-ink2">
                {contact.pieces.join(' – ')}, contact{' '}
                {formatWithUnit(
                  Math.hypot(contact.to.y - contact.from.y, contact.to.z - contact.from.z),
                  'size',
                  units,
                )}
              </span>
            </span>
            {!readOnly && (
              <Button
                className="text-small ml-auto min-h-8"
                onClick={() =>
                  replace(
                    withConnections(document, (list) => [...list, newConnection(document, contact.pieces)]),
                  )
                }
              >
                Add connection
                <span className="sr-only">to {contact.id}</span>
              </Button>
            )}
          </li>
        ))}
      </ul>
    </Panel>
  );
}

/** What joins each interface, and the rules a schedule keeps. */
export function FasteningStep() {
  const { document } = useEditor();
  const contacts = findContacts(piecesOf(document));
  const connections = connectionsOf(document);
  const cards = contacts.flatMap((contact) =>
    connections
      .filter((connection) => joins(connection, contact))
      .map((connection) => ({ contact, connection })),
  );
  const joined = new Set(cards.map((card) => card.contact.id));
  const astray = connections.filter(
    (connection) => !cards.some((card) => card.connection.index === connection.index),
  );
  return (
    <div className="grid items-start gap-5 lg:grid-cols-[minmax(0,5fr)_minmax(0,7fr)]">
      <SectionPanel contacts={contacts} joined={joined} />
      <div className="grid min-w-0 gap-5">
        {cards.map(({ contact, connection }) => (
          <ConnectionCard
            key={`${contact.id} ${connection.index}`}
            contact={contact}
            index={connection.index}
            pieces={contact.pieces}
          />
        ))}
        {astray.map((connection) => (
          <ConnectionCard
            key={`astray ${connection.index}`}
            contact={null}
            index={connection.index}
            pieces={connection.pieces}
          />
        ))}
        <Unjoined contacts={contacts.filter((contact) => !joined.has(contact.id))} />
        <Panel title="Rules of the member" aside="for every joint that has none of its own">
          <MemberRules />
        </Panel>
      </div>
    </div>
  );
}
