import type { LoadCase, MemberDocument } from '@shared/schemas/member';
import { gravity, massPerLength, segmentLoads, solveCase, type Fields } from '../beam/cases';
import type { Beam } from '../beam/combinations';
import { beamEvents, placeIndex } from '../beam/events';
import type { Position } from '../beam/extremes';
import { evaluate } from '../numeric/polynomial';

/** A load of a frozen state, already with its factor, in words for the lines. */
export type FrozenLoad =
  | {
      kind: 'spread';
      from: number;
      to: number;
      start: number;
      end: number;
      factor: number;
      of: string;
      on: string | undefined;
    }
  | {
      kind: 'point';
      x: number;
      value: number;
      factor: number;
      of: string;
      on: string | undefined;
      axle: boolean;
    }
  | { kind: 'couple'; x: number; value: number; factor: number; of: string };

/** One combination with every train standing at one position: a beam under loads that stand still. */
export interface State {
  key: string;
  combination: number;
  positions: readonly Position[];
  loads: FrozenLoad[];
  events: number[];
  fields: Fields;
}

/** Freezes a combination at the positions that govern and solves it on its own. */
export function freeze(
  document: MemberDocument,
  beam: Beam,
  combination: number,
  positions: readonly Position[],
): State | null {
  const found = beam.combinations[combination];
  if (!found) return null;
  const loads: FrozenLoad[] = [];
  const weight = ((massPerLength(document) ?? 0) * gravity) / 1000;
  document.loadCases.forEach((loadCase, c) => {
    const factor = found.factors[c] ?? 0;
    if (factor === 0) return;
    if (loadCase.selfWeight) {
      loads.push({
        kind: 'spread',
        from: 0,
        to: document.length,
        start: weight,
        end: weight,
        factor,
        of: `${loadCase.id}, self-weight`,
        on: undefined,
      });
    }
    loadCase.loads.forEach((load, i) => {
      const of = `${loadCase.id}, load ${i + 1}`;
      if (load.kind === 'uniform') {
        loads.push({
          kind: 'spread',
          from: load.from,
          to: load.to,
          start: load.value,
          end: load.value,
          factor,
          of,
          on: load.on,
        });
      } else if (load.kind === 'varying') {
        loads.push({
          kind: 'spread',
          from: load.from,
          to: load.to,
          start: load.start,
          end: load.end,
          factor,
          of,
          on: load.on,
        });
      } else if (load.kind === 'point') {
        loads.push({ kind: 'point', x: load.x, value: load.value, factor, of, on: load.on, axle: false });
      } else if (load.kind === 'couple') {
        loads.push({ kind: 'couple', x: load.x, value: load.value, factor, of });
      } else {
        const train = beam.trains.findIndex((t) => t.caseIndex === c && t.loadIndex === i);
        const p = positions.find((at) => at.train === train)?.x;
        if (p === undefined) return;
        for (const axle of load.axles) {
          let x = p + axle.offset;
          if (Math.abs(x) < 1e-9 * document.length) x = 0;
          if (Math.abs(x - document.length) < 1e-9 * document.length) x = document.length;
          if (x >= 0 && x <= document.length) {
            loads.push({
              kind: 'point',
              x,
              value: axle.value,
              factor,
              of: `${of}, axle at ${axle.offset}`,
              on: load.on,
              axle: true,
            });
          }
        }
      }
    });
  });
  const frozen: LoadCase = {
    id: 'frozen',
    name: '',
    action: 'permanent',
    selfWeight: false,
    loads: loads.map((load) => {
      if (load.kind === 'spread') {
        return {
          kind: 'varying',
          from: load.from,
          to: load.to,
          start: load.factor * load.start,
          end: load.factor * load.end,
        };
      }
      return { kind: load.kind, x: load.x, value: load.factor * load.value };
    }),
  };
  const events = beamEvents({ ...document, loadCases: [frozen] });
  const nodeEvent = beam.system.nodes.map((n) => placeIndex(events, n.x));
  const fields = solveCase(
    beam.system,
    events,
    nodeEvent,
    segmentLoads(frozen, events, 0, () => true),
  );
  const key = `${combination} ${positions.map((p) => `${p.train}@${p.x}`).join(' ')}`;
  return { key, combination, positions, loads, events, fields };
}

/** V, M or EI·w of a state at x, from the given side. */
export function stateValue(
  state: State,
  field: 'shear' | 'moment' | 'bend',
  x: number,
  side: -1 | 1,
): number {
  const { events } = state;
  let i = placeIndex(events, x);
  const atEvent = Math.abs((events[i] ?? 0) - x) <= 1e-6;
  if (!atEvent || side === -1) i--;
  i = Math.min(Math.max(i, 0), events.length - 2);
  const a = events[i] ?? 0;
  const u = Math.min(1, Math.max(0, (x - a) / ((events[i + 1] ?? 0) - a)));
  const count = field === 'shear' ? 3 : field === 'moment' ? 4 : 6;
  return evaluate(state.fields[field], u, count * i, count);
}
