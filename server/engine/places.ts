import type { Place } from '@shared/schemas/result';
import type { Beam } from './beam/combinations';
import type { Position } from './beam/extremes';

/** Names the combination and the load cases behind a value. */
export function placeOf(
  beam: Beam,
  found: { value: number; x: number; combination: number; positions: readonly Position[] },
): Place {
  const loads = beam.combinations[found.combination];
  return {
    value: found.value,
    x: found.x,
    combination: loads?.combination.id ?? null,
    positions: found.positions.flatMap(({ train, x }) => {
      const t = beam.trains[train];
      const loadCase = beam.caseIds[t?.caseIndex ?? -1];
      return t && loadCase !== undefined ? [{ loadCase, load: t.loadIndex, x }] : [];
    }),
  };
}
