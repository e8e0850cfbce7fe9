import type { MemberInput } from '@shared/schemas/member';
import type { Joint } from './random-layups';
import type { Random } from './random';

type ConnectionInput = NonNullable<MemberInput['connections']>[number];
type RulesInput = NonNullable<MemberInput['rules']>;
type CapacityInput = ConnectionInput['capacity'];

function fastenerCapacity(random: Random): CapacityInput {
  switch (random.pick('ultimate', 'allowable', 'test')) {
    case 'ultimate':
      return {
        basis: 'ultimate',
        value: random.whole(900, 9000),
        factorOfSafety: random.decimal(1, 3, 1),
      };
    case 'allowable':
      return { basis: 'allowable', value: random.whole(350, 4000) };
    case 'test': {
      const mean = random.whole(1500, 9000);
      return {
        basis: 'test',
        values: Array.from({ length: random.whole(5, 12) }, () =>
          Math.round(mean * random.between(0.8, 1.2)),
        ),
        factorOfSafety: random.decimal(1, 2.5, 2),
      };
    }
  }
}

/** Zones that cover the beam. */
function pinnedZones(random: Random, length: number): NonNullable<ConnectionInput['zones']> {
  const count = random.whole(1, 4);
  const places = Array.from({ length: count - 1 }, (_, i) =>
    Math.round((length * (i + random.between(0.7, 1.3))) / count),
  );
  const borders = [0, ...places, length];
  const zones = borders
    .slice(1)
    .map((to, i) => ({ from: borders[i] ?? 0, to, spacing: random.whole(45, 290) }));
  return random.chance(0.3) ? zones.reverse() : zones;
}

/** Glue, lines with or without beads, mostly fasteners. */
export function randomConnection(
  random: Random,
  joint: Joint,
  length: number,
  everySlip: boolean,
): ConnectionInput {
  const slip = everySlip || random.chance(0.1) ? { slipModulus: random.whole(300, 4000) } : {};
  const pieces = random.chance(0.2) ? ([joint.pieces[1], joint.pieces[0]] as [string, string]) : joint.pieces;
  const kind = random.pick('adhesive', 'line', 'bead', 'fasteners', 'fasteners', 'fasteners', 'fasteners');
  if (kind === 'adhesive') {
    return { pieces, kind, capacity: { basis: 'allowable', value: random.decimal(0.2, 2, 2) }, ...slip };
  }
  if (kind === 'line') {
    const capacity: CapacityInput = { basis: 'ultimate', value: random.whole(40, 300), factorOfSafety: 2 };
    return { pieces, kind: 'continuous', capacity, ...slip };
  }
  const zones = random.chance(0.15) ? { zones: pinnedZones(random, length) } : {};
  const rules = random.chance(0.2)
    ? { rules: { spacingMax: random.pick(150, 200, 250), maxZones: random.whole(1, 5) } }
    : {};
  if (kind === 'bead') {
    const capacity: CapacityInput = { basis: 'allowable', value: random.whole(60, 400) };
    return { pieces, kind: 'continuous', capacity, bead: random.whole(20, 60), ...slip, ...rules, ...zones };
  }
  return {
    pieces,
    kind,
    rows: random.whole(1, 4),
    capacity: fastenerCapacity(random),
    ...slip,
    ...rules,
    ...zones,
  };
}

/** Rules, some of which people would not choose: steps that do not divide, grids that do not fit, long zones. */
export function randomRules(random: Random): RulesInput {
  if (random.chance(0.3)) return {};
  return {
    spacingStep: random.pick(1, 2.5, 5, 6.35, 10),
    spacingMin: random.pick(20, 40, 47),
    spacingMax: random.pick(200, 250, 300, 317),
    maxZones: random.whole(1, 7),
    zoneGrid: random.pick(50, 100, 130, 200),
    minZoneLength: random.pick(0, 200, 300, 600, 20_000),
    mirror: random.chance(0.35),
  };
}
