import { spread } from './section-geometry';
import type { Contact } from './section-geometry';
import type { SectionScale } from './section-drawing';

const TAG = { width: 32, height: 20 };
const GAP = 4;

interface Placed {
  contact: Contact;
  /** centre of the tag */
  x: number;
  y: number;
  leader: string;
}

const centre = (contact: Contact) => ({
  y: (contact.from.y + contact.to.y) / 2,
  z: (contact.from.z + contact.to.z) / 2,
});

/** Flat interfaces get their tags in a column at the right. */
const atTheRight = (contacts: readonly Contact[], scale: SectionScale, width: number): Placed[] => {
  const x = Math.min(scale.right + 92, width - TAG.width / 2 - 1);
  const places = spread(
    contacts.map((contact) => scale.y(contact.from.z)),
    TAG.height + GAP,
    TAG.height / 2,
    scale.bottom + 6,
  );
  return contacts.map((contact, index) => {
    const z = scale.y(contact.from.z);
    const y = places[index] ?? z;
    const elbow = x - TAG.width / 2 - 14;
    return { contact, x, y, leader: `M${scale.x(contact.to.y)} ${z}H${elbow}L${x - TAG.width / 2} ${y}` };
  });
};

/** Upright ones in a row above or below, whichever is nearer. */
const inARow = (
  contacts: readonly Contact[],
  scale: SectionScale,
  width: number,
  above: boolean,
): Placed[] => {
  const y = above ? scale.top - 24 : scale.bottom + 26;
  const places = spread(
    contacts.map((contact) => scale.x(contact.from.y)),
    TAG.width + GAP,
    TAG.width / 2,
    width - TAG.width / 2,
  );
  return contacts.map((contact, index) => {
    const at = scale.x(contact.from.y);
    const x = places[index] ?? at;
    const from = scale.y(above ? contact.to.z : contact.from.z);
    const [edge, tag] = above ? [scale.top - 6, y + TAG.height / 2] : [scale.bottom + 8, y - TAG.height / 2];
    return { contact, x, y, leader: `M${at} ${from}V${edge}L${x} ${tag}` };
  });
};

/** Every interface as a thick line where its pieces meet, with a leader to its tag; dashed where nothing joins it. */
export function InterfaceTags({
  contacts,
  middle,
  scale,
  width,
  chosen,
  loose,
}: {
  contacts: readonly Contact[];
  /** mm, half-way up the section */
  middle: number;
  scale: SectionScale;
  width: number;
  chosen: string | null;
  loose: ReadonlySet<string>;
}) {
  const flat = contacts.filter((contact) => contact.orientation === 'horizontal');
  const upright = contacts.filter((contact) => contact.orientation === 'vertical');
  const above = upright.filter((contact) => centre(contact).z > middle + 1e-6);
  const below = upright.filter((contact) => !above.includes(contact));
  const placed = [
    ...atTheRight(flat, scale, width),
    ...inARow(above, scale, width, true),
    ...inARow(below, scale, width, false),
  ];
  return placed.map(({ contact, x, y, leader }) => {
    const isLoose = loose.has(contact.id);
    const isChosen = chosen === contact.id;
    return (
      <g key={contact.id}>
        <path
          d={`M${scale.x(contact.from.y)} ${scale.y(contact.from.z)}L${scale.x(contact.to.y)} ${scale.y(contact.to.z)}`}
          stroke="var(--spruce)"
          strokeWidth={isChosen ? 5 : 3}
          {...(isLoose ? { strokeDasharray: '4 4' } : {})}
        />
        <path d={leader} stroke="var(--spruce)" fill="none" />
        <rect
          x={x - TAG.width / 2}
          y={y - TAG.height / 2}
          width={TAG.width}
          height={TAG.height}
          rx={2}
          fill={isLoose ? 'var(--sheet)' : 'var(--spruce)'}
          stroke="var(--spruce)"
        />
        <text
          x={x}
          y={y}
          dy="0.36em"
          textAnchor="middle"
          fontSize={11.5}
          fontWeight={600}
          fill={isLoose ? 'var(--spruce)' : 'var(--on-spruce)'}
        >
          {contact.id}
        </text>
      </g>
    );
  });
}
