import type { CalculationResult, InterfaceResult } from '@shared/schemas/result';
import { at } from './linear';
import { SAMPLED, type SecondInterface, type SecondResult, type SecondSide } from './second-result';

/** Both methods side by side, figure by figure. */

export interface Comparison {
  figure: string;
  first: number;
  second: number;
  /** relative to the larger of the two, or to the size that such figures have in this member */
  difference: number;
  tolerance: number;
  same: boolean;
}

/** Where both are exact they agree to this. */
export const EXACT = 1e-6;
/** Figures this far below the size of their kind are compared with that size. */
const SMALL = 1e-3;

interface Comparer {
  sampled: boolean;
  figures: Comparison[];
  /** two figures; `size`: the largest of their kind in this member */
  figure: (name: string, first: number, second: number, size: number, tolerance?: number) => void;
  /** a demand, which sampling can only miss: the first may be larger, never smaller */
  demand: (name: string, first: number, second: number, size: number) => void;
  /** one side of an envelope, against the size of its kind; `up` 1 for the largest, −1 for the least */
  envelope: (name: string, first: number, second: number, size: number, up: 1 | -1) => void;
  /** figures that agree or do not, such as counts */
  whole: (name: string, first: number, second: number) => void;
}

function comparer(sampled: boolean): Comparer {
  const figures: Comparison[] = [];
  const push = (
    figure: string,
    first: number,
    second: number,
    size: number,
    tolerance: number,
    oneSided: boolean,
  ): void => {
    const scale = Math.max(Math.abs(first), Math.abs(second), SMALL * size);
    const difference = scale === 0 ? 0 : Math.abs(first - second) / scale;
    const below = oneSided && Math.abs(first) < Math.abs(second);
    const allowed = below ? EXACT : tolerance;
    figures.push({ figure, first, second, difference, tolerance: allowed, same: difference <= allowed });
  };
  return {
    sampled,
    figures,
    figure: (name, first, second, size, tolerance = EXACT) =>
      push(name, first, second, size, tolerance, false),
    demand: (name, first, second, size) =>
      push(name, first, second, size, sampled ? SAMPLED : EXACT, sampled),
    envelope: (figure, first, second, size, up) => {
      const difference = first === second ? 0 : Math.abs(first - second) / size;
      const tolerance = sampled && up * (first - second) > 0 ? SAMPLED : EXACT;
      figures.push({ figure, first, second, difference, tolerance, same: difference <= tolerance });
    },
    whole: (name, first, second) => push(name, first, second, 1, 0, false),
  };
}

/** A required spacing far beyond this (mm) is as good as none. */
const LONG = 1000;

/** null stands for "none": equal only to itself. */
const orNone = (value: number | null): number => value ?? -1;

function compareSections(
  to: Comparer,
  first: CalculationResult['section'],
  second: SecondResult['section'],
): void {
  to.figure('section.EA', first.EA, second.EA, 0);
  to.figure('section.EI', first.EI, second.EI, 0);
  to.figure('section.centroid', first.centroid, second.centroid, second.depth / SMALL);
  to.figure('section.I', first.I, second.I, 0);
  to.figure('section.massPerLength', orNone(first.massPerLength), orNone(second.massPerLength), 0);
  to.whole('section.interfaces', first.interfaces.length, second.interfaces.length);
  second.interfaces.forEach((other, i) => {
    const own = first.interfaces[i];
    if (own === undefined) return;
    const name = `section.interfaces.${other.id}`;
    const alike = own.id === other.id && own.orientation === other.orientation;
    to.whole(`${name}.orientation`, alike && own.connected === other.connected ? 1 : 0, 1);
    to.figure(`${name}.contact`, own.contact, other.contact, 0);
    to.figure(
      `${name}.firstMoment`,
      orNone(own.firstMoment),
      orNone(other.firstMoment),
      second.I / second.depth,
    );
    to.figure(`${name}.flowPerShear`, own.flowPerShear, other.flowPerShear, 1 / second.depth);
  });
}

function compareReactions(to: Comparer, first: CalculationResult['reactions'], second: SecondResult): void {
  const size = (key: 'max' | 'momentMax', least: 'min' | 'momentMin'): number =>
    Math.max(0, ...second.reactions.flatMap((each) => [Math.abs(each[key]), Math.abs(each[least])]));
  const forces = Math.max(size('max', 'min'), shearSize(second));
  const moments = Math.max(size('momentMax', 'momentMin'), Math.abs(second.extremes.moment.value));
  to.whole('reactions', first.length, second.reactions.length);
  for (const other of second.reactions) {
    const own = first.find(
      (each) => each.combination === other.combination && each.support === other.support,
    );
    const name = `reactions.${other.combination}.${other.support}`;
    to.whole(name, own === undefined ? 0 : 1, 1);
    if (own === undefined) continue;
    to.envelope(`${name}.max`, own.max, other.max, forces, 1);
    to.envelope(`${name}.min`, own.min, other.min, forces, -1);
    to.envelope(`${name}.momentMax`, own.momentMax, other.momentMax, moments, 1);
    to.envelope(`${name}.momentMin`, own.momentMin, other.momentMin, moments, -1);
  }
}

/** What shear is measured by: its largest, or where there is only moment, moment over depths of the beam. */
const shearSize = (second: SecondResult): number =>
  Math.max(
    Math.abs(second.extremes.shear.value),
    (SMALL * Math.abs(second.extremes.moment.value)) / second.section.depth,
  );

/** The worst station of each curve: one figure a curve. */
function compareEnvelopes(to: Comparer, first: CalculationResult['envelope'], second: SecondResult): void {
  const { x } = first;
  const stations = new Map(second.stations.map((station) => [station.x, station]));
  const sidesOf = (i: number): SecondSide | null => {
    const station = stations.get(at(x, i));
    if (station === undefined) return null;
    // listed twice: left, then right; the last of the beam is seen from within, which is its left
    return x[i + 1] === x[i] || i === x.length - 1 ? station.left : station.right;
  };
  const missing = x.filter((_, i) => sidesOf(i) === null).length;
  to.whole('envelope.stations not compared', missing, 0);
  const curves = [
    ['shearMax', 1],
    ['shearMin', -1],
    ['momentMax', 1],
    ['momentMin', -1],
    ['deflectionMax', 1],
    ['deflectionMin', -1],
  ] as const;
  const extremes = second.extremes;
  for (const [curve, up] of curves) {
    const kind = curve.startsWith('shear') ? 'shear' : curve.startsWith('moment') ? 'moment' : 'deflection';
    const size = kind === 'shear' ? shearSize(second) : Math.abs(extremes[kind].value);
    const inner = comparer(second.accuracy === 'sampled');
    x.forEach((place, i) => {
      const side = sidesOf(i);
      if (side === null) return;
      inner.envelope(`envelope.${curve}@${place}`, at(first[curve], i), side[curve], size, up);
    });
    const worst = inner.figures.reduce<Comparison | null>(
      (most, each) =>
        most === null || each.difference / each.tolerance > most.difference / most.tolerance ? each : most,
      null,
    );
    if (worst !== null) to.figures.push(worst);
  }
}

function compareExtremes(to: Comparer, first: CalculationResult['extremes'], second: SecondResult): void {
  for (const kind of ['shear', 'moment', 'deflection'] as const) {
    const other = Math.abs(second.extremes[kind].value);
    const size = kind === 'shear' ? shearSize(second) / SMALL : other;
    to.demand(`extremes.${kind}`, Math.abs(first[kind].value), other, size);
  }
}

/** Largest flow of the second method within a stretch. */
function flowIn(other: SecondInterface, from: number, to: number): number {
  let most = 0;
  for (const gap of other.demand) {
    const middle = (gap.from + gap.to) / 2;
    if (middle > from && middle < to) most = Math.max(most, gap.flow);
  }
  return most;
}

/** Whether both found the very same zones; where two schedules tie, or a train is sampled, they may differ. */
export function sameZones(first: InterfaceResult, second: SecondInterface): boolean {
  return (
    first.zones.length === second.zones.length &&
    first.zones.every((zone, i) => {
      const other = at(second.zones, i);
      return (
        Math.abs(zone.from - other.from) < 1e-6 &&
        Math.abs(zone.to - other.to) < 1e-6 &&
        Math.abs(zone.spacing - other.spacing) < 1e-9
      );
    })
  );
}

/**
 * The least cost is one, though several schedules may have it. Under a sampled train it lies between that for the demand found
 * and that for a demand raised by what sampling may miss, which can be steps of the spacing apart. −1: no schedule.
 */
function compareCosts(to: Comparer, name: string, first: InterfaceResult, second: SecondInterface): void {
  const own =
    first.zones.length === 0
      ? Infinity
      : second.rows * first.zones.reduce((sum, zone) => sum + (zone.to - zone.from) / zone.spacing, 0);
  const least = second.cost ?? Infinity;
  const most = to.sampled ? (second.costRaised ?? Infinity) : least;
  const nearest = Math.min(Math.max(own, least), most);
  const shown = (cost: number): number => (cost === Infinity ? -1 : cost);
  to.figure(name, shown(own), shown(nearest), 0);
}

/** Utilisation of a schedule: of the very zones that the first chose, by the flows of the second. */
function utilisationOf(first: InterfaceResult, second: SecondInterface): number {
  if (first.zones.length === 0 || second.requiredSpacing === null) return second.utilisation;
  const limit = second.requiredSpacing * second.peakFlow.value;
  return Math.max(
    ...first.zones.map(({ from, to, spacing }) => (spacing * flowIn(second, from, to)) / limit),
  );
}

function compareZones(to: Comparer, name: string, first: InterfaceResult, second: SecondInterface): void {
  const flow = second.peakFlow.value;
  // spacing × flow ÷ utilisation is what the connection may carry, the same for every zone
  const limit = second.requiredSpacing === null ? 0 : second.requiredSpacing * flow;
  first.zones.forEach((zone, i) => {
    const within = flow === 0 ? 0 : (zone.spacing * flowIn(second, zone.from, zone.to)) / limit;
    to.demand(`${name}.zones.${i}.utilisation`, zone.utilisation, within, 1);
    to.whole(
      `${name}.zones.${i}.perRow`,
      zone.perRow,
      Math.ceil((zone.to - zone.from) / zone.spacing - 1e-9),
    );
  });
  if (!first.pinned) compareCosts(to, `${name}.cost`, first, second);
  if (!sameZones(first, second)) return;
  const { fasteners } = first;
  const other = second.fasteners;
  to.whole(`${name}.fasteners`, fasteners === null ? 0 : 1, other === null ? 0 : 1);
  if (fasteners === null || other === null) return;
  to.whole(`${name}.fasteners.count`, fasteners.count, other.count);
  to.demand(`${name}.fasteners.utilisation`, fasteners.utilisation, other.utilisation, 1);
  fasteners.positions.forEach((row, r) => {
    const inner = comparer(false);
    const innerForces = comparer(to.sampled);
    row.forEach((place, i) => {
      inner.figure(`${name}.positions.${r}.${i}`, place, other.positions[i] ?? NaN, 0);
      const own = fasteners.forces[r]?.[i] ?? NaN;
      innerForces.demand(`${name}.forces.${r}.${i}`, own, other.forces[i] ?? NaN, second.capacity);
    });
    for (const { figures } of [inner, innerForces]) {
      const worst = figures.reduce<Comparison | null>(
        (most, each) => (most === null || !(each.difference <= most.difference) ? each : most),
        null,
      );
      if (worst !== null) to.figures.push(worst);
    }
  });
}

function compareInterface(
  to: Comparer,
  first: InterfaceResult,
  second: SecondInterface,
  largestFlow: number,
): void {
  const name = `interfaces.${second.id}`;
  to.figure(`${name}.capacity`, first.capacity, second.capacity, 0);
  to.demand(`${name}.peakFlow`, first.peakFlow.value, second.peakFlow.value, largestFlow);
  to.demand(`${name}.utilisation`, first.utilisation, utilisationOf(first, second), 1);
  to.demand(
    `${name}.requiredSpacing`,
    first.requiredSpacing === null ? 0 : 1 / first.requiredSpacing,
    second.requiredSpacing === null ? 0 : 1 / second.requiredSpacing,
    1 / LONG,
  );
  to.whole(`${name}.over`, first.status === 'over' ? 1 : 0, second.status === 'over' ? 1 : 0);
  compareZones(to, name, first, second);
}

/**
 * Compares the two methods figure by figure. Curves and lists of forces give one figure each, that which differs most.
 *
 * @param second of the same document, at the stations of the first's envelope
 */
export function compare(first: CalculationResult, second: SecondResult): Comparison[] {
  const to = comparer(second.accuracy === 'sampled');
  compareSections(to, first.section, second.section);
  compareReactions(to, first.reactions, second);
  compareEnvelopes(to, first.envelope, second);
  compareExtremes(to, first.extremes, second);
  to.whole('interfaces', first.interfaces.length, second.interfaces.length);
  const largestFlow = Math.max(
    shearSize(second) / second.section.depth,
    ...second.interfaces.map((each) => each.peakFlow.value),
  );
  second.interfaces.forEach((other, i) => {
    const own = first.interfaces[i];
    if (own !== undefined && own.id === other.id) compareInterface(to, own, other, largestFlow);
    else to.whole(`interfaces.${other.id}`, 0, 1);
  });
  return to.figures;
}
