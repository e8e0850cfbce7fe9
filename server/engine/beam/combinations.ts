import type { Combination, MemberDocument } from '@shared/schemas/member';
import { peakOf, weightedSum, type Peak, type Piecewise } from '../numeric/piecewise';
import { beamEvents, placeIndex } from './events';
import {
  combineLoads,
  gravity,
  massPerLength,
  segmentLoads,
  solveCase,
  type Fields,
  type SegmentLoads,
} from './cases';
import { Influence } from './influence';
import { shearEnvelope } from './shear-envelope';
import { BeamSystem } from './system';
import { prepareTrain, trainExtremes, type Train, type TrainExtremes } from './train';
import { refuseMechanism } from './stability';

/** A combination with its loads that stand still already summed, and its trains with their factors. */
export interface CombinedLoads {
  combination: Combination;
  /** factor of each load case, by its place in the document */
  factors: number[];
  fields: Fields;
  trains: { train: number; factor: number }[];
  /** largest and smallest V at each x over all positions; one object where nothing moves */
  shearMax: Piecewise;
  shearMin: Piecewise;
  /** the largest |V|, signed, and where */
  shearPeak: Peak;
}

/** The beam solved for every load case, with all that later steps ask of it. */
export interface Beam {
  system: BeamSystem;
  influence: Influence | null;
  length: number;
  EI: number;
  events: number[];
  nodeEvent: number[];
  segmentLoads: SegmentLoads[];
  trains: Train[];
  trainShear: { max: Piecewise; min: Piecewise }[];
  /** reactions of the trains: trainReactions[t][n], null where node n is no support */
  trainReactions: ({ force: TrainExtremes; moment: TrainExtremes | null } | null)[][];
  combinations: CombinedLoads[];
  caseIds: string[];
}

/** Where a document names no combination there is one, `all`, of every case at factor 1. */
export function combinationsOf(document: MemberDocument): Combination[] {
  if (document.combinations.length > 0) return document.combinations;
  const factors: Record<string, number> = {};
  for (const loadCase of document.loadCases) factors[loadCase.id] = 1;
  return [{ id: 'all', name: 'All load cases', factors, duration: 'long-term' }];
}

/** Step 1: the beam on its supports under every case and combination. Mechanisms are refused. */
export function analyseBeam(document: MemberDocument, EI: number): Beam {
  refuseMechanism(document);
  const system = new BeamSystem(document, EI);
  const events = beamEvents(document);
  const nodeEvent = system.nodes.map((n) => placeIndex(events, n.x));
  const selfWeight = (massPerLength(document) ?? 0) * gravity * 1e-3;
  const loads = document.loadCases.map((c) => segmentLoads(c, events, selfWeight, () => true));

  const moving = document.loadCases.flatMap((c, caseIndex) =>
    c.loads.flatMap((load, loadIndex) => (load.kind === 'moving' ? [{ load, caseIndex, loadIndex }] : [])),
  );
  const influence = moving.length > 0 ? new Influence(system) : null;
  const trains: Train[] = [];
  const trainShear: Beam['trainShear'] = [];
  const trainReactions: Beam['trainReactions'] = [];
  if (influence) {
    const forceLines = system.nodes.map((n, i) => (n.support ? influence.reaction(i) : null));
    const momentLines = system.nodes.map((n, i) =>
      n.support?.kind === 'fixed' ? influence.supportMoment(i) : null,
    );
    for (const { load, caseIndex, loadIndex } of moving) {
      const train = prepareTrain(load, caseIndex, loadIndex, influence);
      trains.push(train);
      trainShear.push({ max: shearEnvelope(train, influence, 1), min: shearEnvelope(train, influence, -1) });
      trainReactions.push(
        forceLines.map((line, n) => {
          if (!line) return null;
          const moment = momentLines[n];
          return {
            force: trainExtremes(train, line, influence),
            moment: moment ? trainExtremes(train, moment, influence) : null,
          };
        }),
      );
    }
  }

  const segments = events.length - 1;
  const combinations = combinationsOf(document).map((combination): CombinedLoads => {
    const factors = document.loadCases.map((c) => combination.factors[c.id] ?? 0);
    const fields = solveCase(system, events, nodeEvent, combineLoads(loads, factors, segments));
    const used = trains.flatMap((t, train) => {
      const factor = factors[t.caseIndex] ?? 0;
      return factor === 0 ? [] : [{ train, factor }];
    });
    const still = asPiecewise(events, fields.shear, 3);
    const edge = (largest: boolean): Piecewise =>
      weightedSum([
        { f: still, weight: 1 },
        ...used.flatMap(({ train, factor }) => {
          const shear = trainShear[train];
          return shear ? [{ f: factor > 0 === largest ? shear.max : shear.min, weight: factor }] : [];
        }),
      ]);
    const shearMax = used.length > 0 ? edge(true) : still;
    const shearMin = used.length > 0 ? edge(false) : still;
    const up = peakOf(shearMax, 1);
    const down = peakOf(shearMin, -1);
    const near = Math.abs(up.value - down.value) <= 1e-9 * Math.abs(up.value);
    const upward = near ? up.x <= down.x : up.value > down.value;
    return {
      combination,
      factors,
      fields,
      trains: used,
      shearMax,
      shearMin,
      shearPeak: upward ? up : { value: -down.value, x: down.x },
    };
  });
  return {
    system,
    influence,
    length: document.length,
    EI,
    events,
    nodeEvent,
    segmentLoads: loads,
    trains,
    trainShear,
    trainReactions,
    combinations,
    caseIds: document.loadCases.map((c) => c.id),
  };
}

/** Polynomials of lower degree on the events, written as cubics. */
export function asPiecewise(events: readonly number[], coefficients: Float64Array, count: number): Piecewise {
  const cubic = new Float64Array(4 * (events.length - 1));
  for (let i = 0; i + 1 < events.length; i++) {
    for (let d = 0; d < count; d++) cubic[4 * i + d] = coefficients[count * i + d] ?? 0;
  }
  return { breaks: events, cubic };
}
