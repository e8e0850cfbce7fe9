import type { Combination, LoadCase, MemberDocument } from '@shared/schemas/member';
import { buildBeam, type Beam } from './beam';
import { at } from './linear';
import { flowsPerShear, sideways, type Sideways } from './flows';
import {
  axisOf,
  depthOf,
  findInterfaces,
  shapesOf,
  type Axis,
  type Interface,
  type PieceShape,
} from './section';
import { solveStill, type StillLoads, type StillResponse } from './still';
import { prepareUnitLoad, type UnitLoad } from './unit-load';

/** A member made ready for scanning: section, beam, load cases solved, trains and combinations. */

/** Standard acceleration of gravity, m/s². */
const GRAVITY = 9.80665;

export interface Train {
  loadCase: number;
  load: number;
  from: number;
  to: number;
  axles: readonly { offset: number; value: number }[];
  /** the stack it runs on, where that makes load cross an interface; else null */
  stack: number | null;
}

export interface SolvedCase {
  id: string;
  still: StillResponse;
  /** by stack: the loads at rest put on its pieces */
  onStack: readonly StillLoads[];
}

export interface SecondCombination {
  id: string;
  /** by load case; 0 where the combination names none */
  factors: readonly number[];
}

export interface Model {
  document: MemberDocument;
  length: number;
  pieces: readonly PieceShape[];
  axis: Axis;
  depth: number;
  massPerLength: number | null;
  interfaces: readonly Interface[];
  /** by interface: q for V = 1, signed */
  flow: readonly number[];
  sideways: Sideways;
  beam: Beam;
  unit: UnitLoad;
  cases: readonly SolvedCase[];
  trains: readonly Train[];
  combinations: readonly SecondCombination[];
  /** what stands beside a place stands this far from it (mm): below the accuracy asked for, above that of a number */
  hair: number;
}

const noLoads = (): StillLoads => ({ points: [], couples: [], spread: [] });

/** Loads at rest of a case, all or only those for which `take` holds. */
function stillLoads(loadCase: LoadCase, take: (on: string | undefined) => boolean): StillLoads {
  const loads = noLoads();
  for (const load of loadCase.loads) {
    if (!take(load.on)) continue;
    if (load.kind === 'point') loads.points.push({ x: load.x, value: load.value });
    else if (load.kind === 'couple') loads.couples.push({ x: load.x, value: load.value });
    else if (load.kind === 'uniform')
      loads.spread.push({ from: load.from, to: load.to, start: load.value, end: load.value });
    else if (load.kind === 'varying')
      loads.spread.push({ from: load.from, to: load.to, start: load.start, end: load.end });
  }
  return loads;
}

/** kg/m of the section; null where a density is missing. */
function massOf(pieces: readonly PieceShape[]): number | null {
  let mass = 0;
  for (const piece of pieces) {
    if (piece.density === null) return null;
    mass += piece.width * piece.depth * piece.density * 1e-6;
  }
  return mass;
}

function combinationsOf(document: MemberDocument): SecondCombination[] {
  if (document.combinations.length === 0) return [{ id: 'all', factors: document.loadCases.map(() => 1) }];
  return document.combinations.map((combination: Combination) => ({
    id: combination.id,
    factors: document.loadCases.map(({ id }) => combination.factors[id] ?? 0),
  }));
}

/**
 * Builds the model of a parsed document.
 *
 * @throws RangeError where the document is one that the first method refuses (a mechanism, a missing material)
 */
export function buildModel(document: MemberDocument): Model {
  const pieces = shapesOf(document);
  const axis = axisOf(pieces);
  const interfaces = findInterfaces(document, pieces);
  const across = sideways(pieces, interfaces);
  const beam = buildBeam(document, axis.EI);
  const massPerLength = massOf(pieces);
  const stackOfPiece = (id: string | undefined): number | null => {
    const piece = pieces.findIndex((each) => each.id === id);
    return piece < 0 ? null : at(across.stackOf, piece);
  };
  const crosses = (stack: number | null): boolean =>
    stack !== null && at(across.across, stack).some((value) => value !== 0);
  const cases = document.loadCases.map((loadCase): SolvedCase => {
    const loads = stillLoads(loadCase, () => true);
    if (loadCase.selfWeight) {
      // kg/m × m/s² is N/m
      const weight = ((massPerLength ?? 0) * GRAVITY) / 1000;
      loads.spread.push({ from: 0, to: document.length, start: weight, end: weight });
    }
    return {
      id: loadCase.id,
      still: solveStill(beam, loads),
      onStack: Array.from({ length: across.stacks }, (_, stack) =>
        stillLoads(loadCase, (on) => on !== undefined && stackOfPiece(on) === stack),
      ),
    };
  });
  const trains = document.loadCases.flatMap((loadCase, c) =>
    loadCase.loads.flatMap((load, l): Train[] => {
      if (load.kind !== 'moving') return [];
      const stack = stackOfPiece(load.on);
      return [
        {
          loadCase: c,
          load: l,
          from: load.from,
          to: load.to,
          axles: load.axles,
          stack: crosses(stack) ? stack : null,
        },
      ];
    }),
  );
  return {
    document,
    length: document.length,
    pieces,
    axis,
    depth: depthOf(pieces),
    massPerLength,
    interfaces,
    flow: flowsPerShear(document, pieces, interfaces, axis),
    sideways: across,
    beam,
    unit: prepareUnitLoad(beam),
    cases,
    trains,
    combinations: combinationsOf(document),
    hair: document.length * 1e-10,
  };
}
