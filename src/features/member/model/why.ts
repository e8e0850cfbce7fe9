import { formatExact, formatFigures, formatQuantity, formatWithUnit, unitOf } from '@shared/units';
import type { Quantity, UnitSystem } from '@shared/units';
import { zoneAt } from './cursor';
import { carriedASpacing, closestSpacing, isSpaced } from './worked';
import type { Joint, Worked } from './worked';

/** How a spacing (or a glue line's use) came about, in steps that one can follow with a pocket calculator. */
export interface Why {
  title: string;
  lines: string[];
}

/** A combination as it is named on the screen. */
export function combinationName({ id, name }: { id: string; name: string }): string {
  return name === '' || name === id ? id : `${id} ${name}`;
}

/** Where and by what a stretch of an interface is governed. */
interface Governed {
  x: number;
  /** N/mm, along the beam and across it together */
  flow: number;
  /** N/mm; null where the two are not known apart */
  parts: { along: number; across: number } | null;
  combination: string;
}

const atPeak = ({ result }: Worked, { outcome }: Joint, units: UnitSystem): Governed => {
  const { peakFlow } = outcome;
  const combination = result.combinations.find((one) => one.id === peakFlow.combination);
  const standing = peakFlow.positions.map(
    ({ loadCase, x }) => `${loadCase} at ${formatQuantity(x, 'length', units)}`,
  );
  return {
    x: peakFlow.x,
    flow: peakFlow.value,
    parts: { along: peakFlow.along, across: peakFlow.across },
    combination:
      (combination ? combinationName(combination) : 'Nothing') +
      (standing.length > 0 ? `, ${standing.join(', ')},` : ''),
  };
};

/** The hungriest station of a stretch; its flow is the exact one of the zone, not the station's. */
const inZone = (worked: Worked, joint: Joint, zone: number, units: UnitSystem): Governed => {
  const { outcome } = joint;
  const { from, to, spacing, utilisation } = outcome.zones[zone] ?? {
    from: 0,
    to: 0,
    spacing: 1,
    utilisation: 0,
  };
  const holdsPeak = zoneAt(outcome.zones, outcome.peakFlow.x) === zone;
  const flow = (utilisation * outcome.rows * carriedASpacing(joint)) / spacing;
  if (holdsPeak && Math.abs(flow - outcome.peakFlow.value) <= 1e-6 * flow)
    return atPeak(worked, joint, units);
  const { envelope, combinations } = worked.result;
  let best = -1;
  envelope.x.forEach((x, index) => {
    if (x < from - 1e-6 || x > to + 1e-6) return;
    const [value, most] = [outcome.needed[index] ?? 0, outcome.needed[best] ?? -1];
    // on a border the value of the zone's own side is not above the zone's largest
    if (value > most && value <= flow * (1 + 1e-6)) best = index;
  });
  const combination = combinations[outcome.governing[best] ?? -1];
  const shear = Math.max(Math.abs(envelope.shearMax[best] ?? 0), Math.abs(envelope.shearMin[best] ?? 0));
  const along = shear * joint.section.flowPerShear;
  const lengthwise = Math.abs(along - (outcome.needed[best] ?? 0)) <= 1e-6 * flow;
  return {
    x: envelope.x[best] ?? from,
    flow,
    parts: lengthwise ? { along: flow, across: 0 } : null,
    combination: combination ? combinationName(combination) : 'Nothing',
  };
};

const flowLines = ({ flow, parts }: Governed, joint: Joint, say: Say): string[] => {
  const { firstMoment, flowPerShear } = joint.section;
  const q = say(flow, 'flow');
  if (parts === null) return ['shear along and load passed sideways act together', `q = ${q}`];
  if (flowPerShear === 0 || parts.along <= 1e-9 * flow)
    return ['V asks nothing of this joint; load passed sideways does', `q = t = ${q}`];
  const shear = `V = ${say(parts.along / flowPerShear, 'force')}`;
  const rule = firstMoment === null ? `q = V · ${formatFigures(flowPerShear * 1000)} /m` : 'q = V·Q/I';
  if (parts.across <= 1e-9 * flow) return [shear, `${rule} = ${q}`];
  return [shear, `${rule} = ${say(parts.along, 'flow')}, with ${say(parts.across, 'flow')} sideways ${q}`];
};

type Say = (value: number, quantity: Quantity) => string;

const fastenerWord = (joint: Joint): string => {
  const type = joint.connection.fastener?.type;
  return type === undefined ? 'a fastener' : type === 'lag' ? 'a lag screw' : `a ${type}`;
};

const capacityLine = (joint: Joint, say: Say, units: UnitSystem): string => {
  const { outcome, connection } = joint;
  const { capacity } = connection;
  const quantity = outcome.kind === 'fasteners' ? 'force' : outcome.kind === 'adhesive' ? 'stress' : 'flow';
  const each = outcome.kind === 'fasteners' ? ` ${fastenerWord(joint)}` : '';
  const R = `${say(outcome.capacity, quantity)}${each}`;
  switch (capacity.basis) {
    case 'ultimate':
      return `R = ${formatQuantity(capacity.value, quantity, units)} / ${formatExact(capacity.factorOfSafety)} = ${R}`;
    case 'test':
      return `R = lower 5 % of ${capacity.values.length} tests / ${formatExact(capacity.factorOfSafety)} = ${R}`;
    case 'allowable':
      return `R = ${R}, allowable`;
    case 'nds':
    case 'ec5':
      return `R = ${R}`;
  }
};

const spacingLine = (flow: number, joint: Joint, say: Say, units: UnitSystem): string => {
  const { outcome } = joint;
  if (flow <= 0) return 'nothing is needed here';
  const each = carriedASpacing(joint);
  const rows = outcome.rows === 1 ? '' : `${outcome.rows} · `;
  return `s ≤ ${rows}${formatQuantity(each, 'force', units)} / ${formatQuantity(flow, 'flow', units)} = ${say((outcome.rows * each) / flow, 'size')}`;
};

const lastLine = (spacing: number, needed: number, joint: Joint, say: Say): string => {
  const { outcome, rules } = joint;
  if (outcome.pinned) return `pinned by hand: ${say(spacing, 'size')}`;
  const down = (most: number) => Math.floor(most / rules.spacingStep + 1e-9) * rules.spacingStep;
  const same = (a: number, b: number) => Math.abs(a - b) < 1e-6 * rules.spacingStep;
  if (same(spacing, down(rules.spacingMax)) && needed >= spacing)
    return `no more than the largest allowed: ${say(spacing, 'size')}`;
  if (same(spacing, down(needed)))
    return `down to a step of ${say(rules.spacingStep, 'size')}: ${say(spacing, 'size')}`;
  return `as its zone at the other end needs: ${say(spacing, 'size')}`;
};

/** Why the zone at x has its spacing; of a joint without zones, why it holds or does not. */
export function whyAt(worked: Worked, joint: Joint, x: number, units: UnitSystem): Why {
  const say: Say = (value, quantity) => formatWithUnit(value, quantity, units);
  const { outcome } = joint;
  const where = (governed: Governed) =>
    `${governed.combination} governs at x\u00a0=\u00a0${formatQuantity(governed.x, 'length', units)}`;

  if (outcome.zones.length > 0) {
    const index = zoneAt(outcome.zones, x);
    const zone = outcome.zones[index];
    const governed = inZone(worked, joint, index, units);
    const spacing = zone?.spacing ?? 0;
    const needed = governed.flow > 0 ? (outcome.rows * carriedASpacing(joint)) / governed.flow : Infinity;
    return {
      title: `Why at ${formatQuantity(spacing, 'size', units)} in zone ${index + 1}`,
      lines: [
        governed.flow > 0 ? where(governed) : 'No combination asks anything here',
        ...flowLines(governed, joint, say),
        capacityLine(joint, say, units),
        spacingLine(governed.flow, joint, say, units),
        lastLine(spacing, needed, joint, say),
      ],
    };
  }

  const governed = atPeak(worked, joint, units);
  const common = [where(governed), ...flowLines(governed, joint, say), capacityLine(joint, say, units)];
  if (isSpaced(joint))
    return {
      title: 'Why there is no schedule',
      lines: [
        ...common,
        spacingLine(governed.flow, joint, say, units),
        `the rules allow no closer than ${say(closestSpacing(joint), 'size')}`,
      ],
    };
  if (outcome.kind === 'adhesive')
    return {
      title: 'Why the glue line is used so far',
      lines: [
        ...common,
        `τ = ${formatQuantity(governed.flow, 'flow', units)} ${unitOf('flow', units)} / ${say(joint.section.contact, 'size')} = ${say(governed.flow / joint.section.contact, 'stress')}`,
        `τ / R = ${formatFigures(outcome.utilisation)}`,
      ],
    };
  return {
    title: 'Why the line is used so far',
    lines: [...common, `q / R = ${formatFigures(outcome.utilisation)}`],
  };
}
