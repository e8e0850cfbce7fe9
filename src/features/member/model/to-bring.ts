import { formatNumber, formatQuantity, formatWithUnit } from '@shared/units';
import type { UnitSystem } from '@shared/units';
import { isSpaced, jointOf } from './worked';
import type { Joint, Worked } from './worked';

/** One thing to bring, and for which joints. */
export interface Item {
  what: string;
  joints: string[];
}

const words: Record<string, [string, string]> = {
  nail: ['nail', 'nails'],
  screw: ['screw', 'screws'],
  bolt: ['bolt', 'bolts'],
  lag: ['lag screw', 'lag screws'],
};

const sizeOf = ({ connection }: Joint, units: UnitSystem): string => {
  const { diameter, length } = connection.fastener ?? {};
  const sizes = [diameter, length].flatMap((size) =>
    size === undefined ? [] : [formatQuantity(size, 'size', units)],
  );
  return sizes.length === 0 ? '' : ` ${sizes.join(' × ')}`;
};

const kindOf = (joint: Joint): [string, string] =>
  words[joint.connection.fastener?.type ?? ''] ?? ['fastener', 'fasteners'];

const countText = (count: number, joint: Joint, units: UnitSystem): string => {
  const [one, many] = kindOf(joint);
  return `${formatNumber(count)} ${count === 1 ? one : many}${sizeOf(joint, units)}`;
};

/** What the schedules of all joints ask for, like fasteners counted together. */
export function toBring(worked: Worked, units: UnitSystem): Item[] {
  const counted = new Map<string, { joint: Joint; count: number; joints: string[] }>();
  const others: Item[] = [];
  for (const { id } of worked.result.interfaces) {
    const joint = jointOf(worked, id);
    if (joint === null) continue;
    const { outcome, connection } = joint;
    if (outcome.kind === 'fasteners') {
      const key = JSON.stringify([kindOf(joint), sizeOf(joint, units)]);
      const entry = counted.get(key) ?? { joint, count: 0, joints: [] };
      entry.count += outcome.fasteners?.count ?? 0;
      entry.joints.push(id);
      counted.set(key, entry);
    } else if (outcome.kind === 'adhesive') {
      const area = `${formatWithUnit(joint.section.contact, 'size', units)} × ${formatWithUnit(worked.document.length, 'length', units)}`;
      others.push({ what: `glue for ${area}`, joints: [id] });
    } else if (isSpaced(joint)) {
      const runs = outcome.zones.reduce((sum, zone) => sum + zone.perRow, 0);
      others.push({
        what: `${formatNumber(runs)} runs of ${formatWithUnit(connection.bead ?? 0, 'size', units)}`,
        joints: [id],
      });
    } else {
      others.push({
        what: `an unbroken line of ${formatWithUnit(worked.document.length, 'length', units)}`,
        joints: [id],
      });
    }
  }
  return [
    ...[...counted.values()]
      .filter(({ count }) => count > 0)
      .map(({ joint, count, joints }) => ({ what: countText(count, joint, units), joints })),
    ...others,
  ];
}
