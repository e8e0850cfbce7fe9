import type { MemberInput } from '@shared/schemas/member';
import { randomFrom } from './random';
import { randomConnection, randomRules } from './random-connections';
import { layupKinds, randomLayup } from './random-layups';
import { randomBeam, randomCases, randomCombinations } from './random-loads';

/**
 * A member drawn at random, the same for the same seed: stacks, tees, I-sections, boxes, rings and plies of unlike woods, on
 * all kinds of supports, under all kinds of loads; about a third of them with trains.
 */
export function randomMember(seed: number): MemberInput {
  const random = randomFrom(seed * 2_654_435_761);
  const beam = randomBeam(random);
  const kind = random.pick(...layupKinds);
  const { materials, pieces, joints } = randomLayup(random, kind);
  const everySlip = random.chance(0.5);
  const connections = joints
    .filter(({ needed }) => needed || random.chance(0.8))
    .map((joint) => randomConnection(random, joint, beam.length, everySlip));
  // put on one piece, a load crosses where plies stand side by side; elsewhere it must change nothing
  const plies = kind === 'plies' || kind === 'ring' || random.chance(0.2) ? pieces.map(({ id }) => id) : [];
  const loadCases = randomCases(random, beam, plies);
  const combinations = randomCombinations(
    random,
    loadCases.map(({ id }) => id),
  );
  return {
    schema: 1,
    title: `Member ${seed}`,
    ...beam,
    materials,
    pieces,
    connections,
    loadCases,
    combinations,
    rules: randomRules(random),
  };
}
