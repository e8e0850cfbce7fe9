import type { Connection, MemberDocument } from '@shared/schemas/member';
import { strengthOf, type Strength } from './capacity';
import { forcesOf, perRow, placesOf, stretchReader } from './fasteners';
import { at } from './linear';
import { buildModel, type Model } from './model';
import type { Felt, Reading } from './probe';
import {
  combineRanges,
  eventsOf,
  extremeOf,
  gapsBetween,
  peaksOf,
  rangesAt,
  stationReader,
  type Extreme,
  type Gap,
  type Peak,
} from './scan';
import { fewest, gridBorders, type ZoneRules } from './schedule';
import {
  SAMPLED,
  type SecondInterface,
  type SecondPlace,
  type SecondResult,
  type SecondSide,
  type SecondStation,
} from './second-result';
import { firstMoment, type Interface } from './section';
import { trainRange } from './trains';

const rulesOf = (document: MemberDocument, connection: Connection): ZoneRules => {
  const own = connection.rules ?? {};
  const { rules } = document;
  return {
    spacingStep: own.spacingStep ?? rules.spacingStep,
    spacingMin: own.spacingMin ?? rules.spacingMin,
    spacingMax: own.spacingMax ?? rules.spacingMax,
    maxZones: own.maxZones ?? rules.maxZones,
    zoneGrid: own.zoneGrid ?? rules.zoneGrid,
    // of a beam shorter than that the whole is one zone
    minZoneLength: Math.min(own.minZoneLength ?? rules.minZoneLength, document.length),
    mirror: own.mirror ?? rules.mirror,
  };
};

function sectionOf(model: Model): SecondResult['section'] {
  const { axis, interfaces, pieces } = model;
  return {
    ...axis,
    I: axis.EI / at(pieces, 0).E,
    massPerLength: model.massPerLength,
    depth: model.depth,
    interfaces: interfaces.map((each, i) => ({
      id: each.id,
      orientation: each.orientation,
      contact: each.contact,
      connected: each.connection !== null,
      firstMoment: firstMoment(pieces, interfaces, each, axis.centroid),
      flowPerShear: Math.abs(at(model.flow, i)),
    })),
  };
}

function reactionsOf(model: Model): SecondResult['reactions'] {
  const bySupport = model.beam.supports.map((support, s) => {
    const ranges = (kind: 'force' | 'moment') => {
      const unit = kind === 'force' ? model.unit.reactionOf(s) : model.unit.supportMomentOf(s);
      return combineRanges(
        model,
        model.cases.map((solved) => at(solved.still.reactions, s)[kind]),
        model.trains.map((train) => trainRange(model, train, unit, [], model.beam.determinate)),
      );
    };
    return { id: support.id, force: ranges('force'), moment: ranges('moment') };
  });
  return model.combinations.flatMap((combination, c) =>
    bySupport.map(({ id, force, moment }) => ({
      combination: combination.id,
      support: id,
      max: at(force, c).max,
      min: at(force, c).min,
      momentMax: at(moment, c).max,
      momentMin: at(moment, c).min,
    })),
  );
}

function sideAt(model: Model, x: number): SecondSide {
  const ends = (quantity: 'shear' | 'moment' | 'deflection'): [number, number] => {
    const ranges = rangesAt(model, quantity, x);
    return [Math.max(...ranges.map(({ max }) => max)), Math.min(...ranges.map(({ min }) => min))];
  };
  const [shearMax, shearMin] = ends('shear');
  const [momentMax, momentMin] = ends('moment');
  const [deflectionMax, deflectionMin] = ends('deflection');
  return { shearMax, shearMin, momentMax, momentMin, deflectionMax, deflectionMin };
}

/** A station seen from both sides; at the beam's ends from within. */
function stationAt(model: Model, x: number): SecondStation {
  const margin = 3 * model.hair;
  const inside = (place: number): number => Math.min(Math.max(place, margin), model.length - margin);
  return { x, left: sideAt(model, inside(x - margin)), right: sideAt(model, inside(x + margin)) };
}

const placeOf = (model: Model, { value, x, combination }: Extreme): SecondPlace => ({
  value,
  x,
  combination: model.combinations[combination]?.id ?? null,
});

/** Of equals the first combination, then the smallest x. */
function worstOf(peaks: readonly Peak[]): Peak {
  let worst = at(peaks, 0);
  for (const peak of peaks) {
    const same = Math.abs(peak.value - worst.value) <= 1e-9 * worst.value;
    if (same ? peak.combination < worst.combination : peak.value > worst.value) worst = peak;
  }
  return worst;
}

interface Scanned {
  model: Model;
  gaps: readonly Gap[];
  shear: readonly Peak[];
  readStation: (x: number) => Reading;
  readStretch: (from: number, to: number) => Reading;
  /** a flow below this is nothing */
  nothing: number;
}

function peaksAt(scanned: Scanned, felt: Felt): Peak[] {
  const { model, gaps, shear, readStation, nothing } = scanned;
  const peaks = felt.crossing.some((share) => share !== 0)
    ? peaksOf(model, gaps, readStation, felt)
    : shear.map((peak) => ({
        ...peak,
        value: peak.value * Math.abs(felt.flow),
        along: peak.along * felt.flow,
      }));
  return peaks.map((peak) => (peak.value <= nothing ? { ...peak, value: 0 } : peak));
}

interface Spaced {
  requiredSpacing: number | null;
  zones: SecondInterface['zones'];
  lengthsRaised: number | null;
  noSchedule: boolean;
  utilisation: number;
}

/** Σ length/spacing. */
const lengthsOver = (zones: readonly { from: number; to: number; spacing: number }[]): number =>
  zones.reduce((sum, zone) => sum + (zone.to - zone.from) / zone.spacing, 0);

function spacedZones(
  scanned: Scanned,
  connection: Connection,
  rules: ZoneRules,
  peaks: readonly Peak[],
  limit: number,
): Spaced {
  const { model, gaps } = scanned;
  const demandIn = (from: number, to: number): number => {
    let most = 0;
    gaps.forEach((gap, g) => {
      const middle = (gap.from + gap.to) / 2;
      if (middle > from && middle < to) most = Math.max(most, at(peaks, g).value);
    });
    return most / limit;
  };
  const whole = demandIn(0, model.length);
  const pinned =
    connection.zones === undefined ? null : [...connection.zones].sort((a, b) => a.from - b.from);
  const found = pinned ?? fewest(model.length, rules, demandIn);
  const zones = (found ?? []).map((zone) => ({
    from: zone.from,
    to: zone.to,
    spacing: zone.spacing,
    perRow: perRow(zone),
    utilisation: zone.spacing * demandIn(zone.from, zone.to),
  }));
  const raised = pinned ?? fewest(model.length, rules, (from, to) => demandIn(from, to) * (1 + SAMPLED));
  const least = Math.ceil(rules.spacingMin / rules.spacingStep - 1e-9) * rules.spacingStep;
  return {
    requiredSpacing: whole === 0 ? null : 1 / whole,
    zones,
    lengthsRaised: raised === null ? null : lengthsOver(raised),
    noSchedule: found === null,
    utilisation: found === null ? least * whole : Math.max(...zones.map((zone) => zone.utilisation)),
  };
}

function statusOf(
  connection: Connection,
  spaced: Spaced | null,
  utilisation: number,
  fasteners: SecondInterface['fasteners'],
): SecondInterface['status'] {
  const over = 1 + 1e-9;
  const { bead } = connection;
  const runsMerge = bead !== undefined && (spaced?.zones ?? []).some(({ spacing }) => spacing < bead - 1e-9);
  if (utilisation > over || spaced?.noSchedule === true || runsMerge) return 'over';
  return fasteners !== null && fasteners.utilisation > over ? 'advice' : 'ok';
}

function interfaceOf(scanned: Scanned, each: Interface, connection: Connection): SecondInterface {
  const { model, gaps } = scanned;
  const place = model.interfaces.indexOf(each);
  const felt: Felt = {
    flow: at(model.flow, place),
    crossing: model.sideways.across.map((row) => at(row, place)),
  };
  const strength: Strength = strengthOf(connection, each.contact);
  const peaks = peaksAt(scanned, felt);
  const worst = worstOf(peaks);
  const spaced = strength.spaced
    ? spacedZones(scanned, connection, rulesOf(model.document, connection), peaks, strength.limit)
    : null;
  const zones = spaced?.zones ?? [];
  const places = placesOf(zones);
  const forces =
    connection.kind === 'fasteners'
      ? worst.value === 0
        ? places.map(() => 0)
        : forcesOf(model, scanned.readStretch, places, felt, strength.rows)
      : null;
  const fasteners =
    forces === null
      ? null
      : {
          count: places.length * strength.rows,
          positions: places,
          forces,
          utilisation: Math.max(0, ...forces) / strength.R,
        };
  const utilisation = spaced?.utilisation ?? worst.value / strength.limit;
  return {
    id: each.id,
    rows: strength.rows,
    capacity: strength.R,
    peakFlow: placeOf(model, worst),
    requiredSpacing: spaced?.requiredSpacing ?? null,
    zones,
    cost: zones.length === 0 ? null : strength.rows * lengthsOver(zones),
    costRaised:
      spaced === null || spaced.lengthsRaised === null ? null : strength.rows * spaced.lengthsRaised,
    demand: gaps.map((gap, g) => ({ ...gap, flow: at(peaks, g).value })),
    fasteners,
    utilisation,
    status: statusOf(connection, spaced, utilisation, fasteners),
  };
}

/** Where zones of any connection may end, found or given. */
function bordersOf(document: MemberDocument): number[] {
  return document.connections.flatMap((connection) => [
    ...gridBorders(document.length, rulesOf(document, connection)),
    ...(connection.zones ?? []).flatMap(({ from, to }) => [from, to]),
  ]);
}

/** Even stations, for who asks for none. */
const evenStations = (length: number): number[] => Array.from({ length: 101 }, (_, i) => (length * i) / 100);

/**
 * Calculates a member a second time by other means: finite elements, strips, constrained least squares and scanning.
 *
 * @param document a document that the first method accepts, parsed
 * @param stations where V, M and w are wanted, mm
 * @throws RangeError where the document is one that is refused
 */
export function recalculate(
  document: MemberDocument,
  stations: readonly number[] = evenStations(document.length),
): SecondResult {
  const model = buildModel(document);
  const events = eventsOf(model, bordersOf(document));
  const gaps = gapsBetween(model, events);
  const readStation = stationReader(model);
  const shear = peaksOf(model, gaps, readStation, { flow: 1, crossing: [] });
  const largest = worstOf(shear);
  const moment = extremeOf(model, gaps, 'moment');
  const scanned: Scanned = {
    model,
    gaps,
    shear,
    readStation,
    readStretch: stretchReader(model, events),
    // V itself is nothing where only couples act
    nothing: (1e-9 * Math.max(largest.value, (1e-3 * Math.abs(moment.value)) / model.length)) / model.depth,
  };
  const moves = model.trains.some((train) =>
    model.combinations.some(({ factors }) => at(factors, train.loadCase) !== 0),
  );
  const onPly = model.trains.some(({ stack }) => stack !== null);
  return {
    accuracy: moves && (!model.beam.determinate || onPly) ? 'sampled' : 'exact',
    section: sectionOf(model),
    reactions: reactionsOf(model),
    stations: [...new Set(stations)].map((x) => stationAt(model, x)),
    extremes: {
      shear: placeOf(model, { ...largest, value: largest.along }),
      moment: placeOf(model, moment),
      deflection: placeOf(model, extremeOf(model, gaps, 'deflection')),
    },
    interfaces: model.interfaces.flatMap((each) =>
      each.connection === null ? [] : [interfaceOf(scanned, each, at(document.connections, each.connection))],
    ),
  };
}
