import { describe, expect, it } from 'vitest';
import type { MemberDocument } from '@shared/schemas/member';
import type { Place } from '@shared/schemas/result';
import { calculateMember } from '../../server/engine/calculate-member';
import { recalculate } from '../../server/engine/second-method/recalculate';
import { randomMember } from '../support/random-members';

/*
 * The first method says where each train stands when an extreme is reached. Here the trains are put there as loads at rest, and the
 * second method calculates that member: the extreme has to come out again.
 */

type Positions = Place['positions'];

/** The document in one combination, with every train at its place; axles beyond the beam's ends are left out. */
function standing(document: MemberDocument, combination: string, positions: Positions): MemberDocument {
  const loadCases = document.loadCases.map((loadCase) => ({
    ...loadCase,
    loads: loadCase.loads.flatMap((load, l): typeof loadCase.loads => {
      if (load.kind !== 'moving') return [load];
      const place = positions.find((each) => each.loadCase === loadCase.id && each.load === l);
      if (place === undefined) return [];
      const on = load.on === undefined ? {} : { on: load.on };
      return load.axles
        .map(({ offset, value }) => ({ kind: 'point' as const, x: place.x + offset, value, ...on }))
        .filter(({ x }) => x >= 0 && x <= document.length);
    }),
  }));
  return {
    ...document,
    loadCases,
    combinations: document.combinations.filter(({ id }) => id === combination),
  };
}

/** A little this way or that: an extreme beside a jump is reached only in the limit. */
const HAIR = 1e-4;

/** The same places, each train shifted a hair or not, in every way. */
function shifted(positions: Positions): Positions[] {
  return positions.reduce<Positions[]>(
    (ways, place) =>
      ways.flatMap((way) => [0, -HAIR, HAIR].map((by) => [...way, { ...place, x: place.x + by }])),
    [[]],
  );
}

const moves = (document: MemberDocument): boolean =>
  document.loadCases.some(({ loads }) => loads.some(({ kind }) => kind === 'moving'));

const members = Array.from({ length: 110 }, (_, seed) => 5000 + seed).flatMap((seed) => {
  const outcome = calculateMember(randomMember(seed));
  return outcome.ok && moves(outcome.document) ? [{ seed, ...outcome }] : [];
});

describe('where trains stand', () => {
  it('is tried on enough members', () => {
    expect(members.length).toBeGreaterThan(25);
  });

  it('the extremes of V, M and w come out again, and so do the flows', () => {
    const told: string[] = [];
    for (const { seed, document, result } of members) {
      const again = (place: Place, read: (second: ReturnType<typeof recalculate>) => number): void => {
        if (place.combination === null || place.value === 0) return;
        let nearest = Infinity;
        for (const positions of shifted(place.positions)) {
          const second = recalculate(standing(document, place.combination, positions), [place.x]);
          nearest = Math.min(nearest, Math.abs(read(second) / Math.abs(place.value) - 1));
          if (nearest < 2e-6) return;
        }
        told.push(`${seed}: ${JSON.stringify(place)} is off by ${nearest}`);
      };
      again(result.extremes.shear, ({ extremes }) => Math.abs(extremes.shear.value));
      again(result.extremes.moment, ({ extremes }) => Math.abs(extremes.moment.value));
      again(result.extremes.deflection, ({ extremes }) => Math.abs(extremes.deflection.value));
      for (const { id, peakFlow } of result.interfaces) {
        again(peakFlow, ({ interfaces }) => interfaces.find((each) => each.id === id)?.peakFlow.value ?? NaN);
      }
    }
    expect(told).toEqual([]);
  });
});
