import type { CalculationResult } from '@shared/schemas/result';
import type { Beam } from './combinations';

/** Largest and smallest reaction and moment of every support under every combination. */
export function reactionsOf(beam: Beam): CalculationResult['reactions'] {
  return beam.combinations.flatMap(({ combination, fields, trains }) =>
    beam.system.nodes.flatMap((node, n) => {
      if (!node.support) return [];
      let max = fields.reaction[n] ?? 0;
      let min = max;
      let momentMax = fields.supportMoment[n] ?? 0;
      let momentMin = momentMax;
      for (const { train, factor } of trains) {
        const own = beam.trainReactions[train]?.[n];
        if (!own) continue;
        const up = factor > 0;
        max += factor * (up ? own.force.max : own.force.min);
        min += factor * (up ? own.force.min : own.force.max);
        if (!own.moment) continue;
        momentMax += factor * (up ? own.moment.max : own.moment.min);
        momentMin += factor * (up ? own.moment.min : own.moment.max);
      }
      return [{ combination: combination.id, support: node.support.id, max, min, momentMax, momentMin }];
    }),
  );
}
