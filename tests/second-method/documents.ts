import { memberDocumentSchema, type MemberDocument, type MemberInput } from '@shared/schemas/member';
import { recalculate } from '../../server/engine/second-method/recalculate';
import type { SecondResult, SecondStation } from '../../server/engine/second-method/second-result';

/** Two boards on each other, 120 wide and 30 + 50 deep, nailed in two rows: E 9000, EI = 4.608e10 N·mm². */
export const twoBoards: Pick<MemberInput, 'schema' | 'materials' | 'pieces' | 'connections'> = {
  schema: 1,
  materials: [{ id: 'w', name: 'Wood', E: 9000, density: 430 }],
  pieces: [
    { id: 'lower', material: 'w', y: 0, z: 0, width: 120, depth: 30 },
    { id: 'upper', material: 'w', y: 0, z: 30, width: 120, depth: 50 },
  ],
  connections: [
    { pieces: ['lower', 'upper'], kind: 'fasteners', rows: 2, capacity: { basis: 'allowable', value: 700 } },
  ],
};
/** bH³/12 of the whole, times E. */
export const twoBoardsEI = (9000 * 120 * 80 ** 3) / 12;

type Loads = MemberInput['loadCases'][number]['loads'];

/** One load case on two boards. */
export const beamOf = (
  length: number,
  supports: MemberInput['supports'],
  loads: NonNullable<Loads>,
  hinges: number[] = [],
): MemberInput => ({
  ...twoBoards,
  length,
  supports,
  hinges,
  loadCases: [{ id: 'Q', action: 'imposed', loads }],
});

export const parsed = (input: MemberInput): MemberDocument => memberDocumentSchema.parse(input);

export const second = (input: MemberInput, stations: number[] = []): SecondResult =>
  recalculate(parsed(input), stations);

/** The station asked for. */
export function stationOf(result: SecondResult, x: number): SecondStation {
  const station = result.stations.find((each) => each.x === x);
  if (station === undefined) throw new Error(`no station at ${x}`);
  return station;
}

/** Reaction of a support in the only combination. */
export function reactionOf(result: SecondResult, support: string): SecondResult['reactions'][number] {
  const reaction = result.reactions.find((each) => each.support === support);
  if (reaction === undefined) throw new Error(`no reaction of ${support}`);
  return reaction;
}

/** How far a figure is off, as a part of what it should be. */
export const off = (found: number, expected: number): number =>
  Math.abs(found - expected) / Math.abs(expected);
