import { documentLimits, type MemberDocument, type Rules } from '@shared/schemas/member';
import type { InterfaceResult, Notice } from '@shared/schemas/result';
import { shearPositions } from '../beam/extremes';
import { refuse } from '../refused';
import { rulesOf } from '../input/places';
import { rowsOf } from '../flow/section-flow';
import type { FlowPeak, InterfaceDemand } from '../demand/demand';
import type { Interface } from '../section/interfaces';
import { fastenerPositions, fastenerStretches, perRow } from './fasteners';
import { allowedSpacings, bestZones, zoneGrid, type Spacings, type Zone } from './zones';

/** The schedule of one interface, and how its figures came about. */
export interface Schedule {
  rows: number;
  rules: Rules;
  /** what one spacing of one row may carry, N: R of a fastener, bead × R of a line */
  unitCapacity: number;
  peak: FlowPeak;
  /** index of the combination at the peak, −1 where the flow is nothing */
  peakCombination: number;
  requiredSpacing: number | null;
  spacings: Spacings | null;
  zones: InterfaceResult['zones'];
  /** largest flow within each zone, N/mm */
  zoneFlows: number[];
  fasteners: InterfaceResult['fasteners'];
  /** the most heavily loaded fastener: its place, stretch and combination */
  worstFastener: { index: number; from: number; to: number; combination: number; force: number } | null;
  needed: number[];
  governing: number[];
  utilisation: number;
  status: InterfaceResult['status'];
  pinned: boolean;
  notices: Notice[];
}

/** Over its limit, by more than rounding. */
const over = 1 + 1e-9;

/**
 * Steps 6 to 8 for one interface: required spacing, zones, every fastener.
 *
 * @param capacity R: N a fastener, N/mm of line, MPa of adhesive
 * @param nothing flows at or below this (N/mm) are no flow
 */
export function scheduleInterface(
  document: MemberDocument,
  item: Interface,
  demand: InterfaceDemand,
  capacity: number,
  nothing: number,
): Schedule {
  const { connection } = item;
  if (!connection) throw new Error('only joined interfaces have a schedule');
  const rows = rowsOf(connection);
  const rules = rulesOf(document, connection);
  const { beam } = demand.shared;
  const peaks = demand.peaks();
  let peakCombination = -1;
  peaks.forEach((p, c) => {
    const best = peaks[peakCombination]?.value ?? 0;
    if (p.value > nothing && p.value > best * over) peakCombination = c;
  });
  const found = peaks[peakCombination] ?? { value: 0, x: 0, shear: 0, along: 0, across: 0, positions: [] };
  const loads = beam.combinations[peakCombination];
  const peak =
    loads && found.positions.length === 0
      ? { ...found, positions: shearPositions(beam, loads, found.x, found.shear).positions }
      : found;
  const { needed, governing } = demand.atStations(nothing);
  const schedule: Schedule = {
    rows,
    rules,
    unitCapacity: capacity,
    peak,
    peakCombination,
    requiredSpacing: null,
    spacings: null,
    zones: [],
    zoneFlows: [],
    fasteners: null,
    worstFastener: null,
    needed,
    governing,
    utilisation: 0,
    status: 'ok',
    pinned: false,
    notices: [],
  };
  const spaced =
    connection.kind === 'fasteners' || (connection.kind === 'continuous' && connection.bead !== undefined);
  if (!spaced) {
    const carried = connection.kind === 'adhesive' ? item.contact * capacity : capacity;
    schedule.utilisation = peak.value / carried;
    schedule.status = schedule.utilisation > over ? 'over' : 'ok';
    return schedule;
  }
  const bead = connection.kind === 'continuous' ? (connection.bead ?? 0) : 0;
  const unitCapacity = bead > 0 ? bead * capacity : capacity;
  schedule.unitCapacity = unitCapacity;
  const carriedBySpacing = rows * unitCapacity;
  if (peakCombination >= 0) schedule.requiredSpacing = carriedBySpacing / peak.value;
  const spacings = allowedSpacings(rules);
  schedule.spacings = spacings;

  const zones = connection.zones
    ? pinnedZones(connection.zones, document.length)
    : seekZones(document, demand, rules, spacings, carriedBySpacing, nothing);
  schedule.pinned = connection.zones !== undefined;
  if (zones === null) {
    schedule.utilisation = spacings.smallest / (schedule.requiredSpacing ?? Infinity);
    schedule.status = 'over';
    schedule.fasteners =
      bead > 0 ? null : { count: 0, positions: emptyRows(rows), forces: emptyRows(rows), utilisation: 0 };
    schedule.notices.push(noSchedule(item, demand, schedule, capacity, bead));
    return schedule;
  }
  refuseCrowd(item, zones, rows);
  const edges = [zones[0]?.from ?? 0, ...zones.map((z) => z.to)];
  schedule.zoneFlows = largestInCells(demand, edges, nothing);
  schedule.zones = zones.map((zone, i) => ({
    ...zone,
    perRow: perRow(zone),
    utilisation: (zone.spacing * (schedule.zoneFlows[i] ?? 0)) / carriedBySpacing,
  }));
  schedule.utilisation = schedule.zones.reduce((most, z) => Math.max(most, z.utilisation), 0);
  if (schedule.utilisation > over) schedule.status = 'over';
  if (bead > 0) {
    const tight = zones.find((z) => z.spacing < bead * (1 - 1e-9));
    if (tight) {
      schedule.status = 'over';
      schedule.notices.push({
        code: 'pitch-below-bead',
        interface: item.id,
        message: `${item.id}: a pitch of ${round(tight.spacing)} mm is below the bead’s own ${round(bead)} mm, so the runs would overlap. Use a continuous line or shorter runs.`,
      });
    }
  } else {
    placeFasteners(schedule, zones, demand, beam.length);
  }
  adviseOnSchedule(schedule, item, zones);
  return schedule;
}

/** More fasteners than anybody drives into one interface: a slip of the keyboard, and more than can be told. */
function refuseCrowd(item: Interface, zones: readonly Zone[], rows: number): void {
  const count = zones.reduce((sum, zone) => sum + perRow(zone), 0) * rows;
  if (count <= documentLimits.fasteners) return;
  const pinned = item.connection?.zones !== undefined;
  const tightest = zones.reduce((a, b) => (b.spacing < a.spacing ? b : a));
  const given = item.connection?.zones?.findIndex((z) => z.spacing === tightest.spacing) ?? -1;
  refuse(
    'invalid-document',
    pinned ? `connections.${item.connectionIndex}.zones.${Math.max(given, 0)}.spacing` : 'rules.spacingMin',
    `${item.id} would take ${count} ${item.connection?.kind === 'continuous' ? 'beads' : 'fasteners'}; at most ${documentLimits.fasteners} are calculated. Use a wider spacing, fewer rows or a larger smallest spacing.`,
  );
}

function emptyRows(rows: number): number[][] {
  return Array.from({ length: rows }, () => []);
}

/** The largest flow within each cell, N/mm; flows that are nothing are 0. */
function largestInCells(demand: InterfaceDemand, grid: readonly number[], nothing: number): number[] {
  return Array.from(demand.cells(grid), (q) => (q > nothing ? q : 0));
}

function pinnedZones(zones: readonly Zone[], length: number): Zone[] {
  const sorted = zones.map((z) => ({ ...z })).sort((a, b) => a.from - b.from);
  sorted.forEach((zone, i) => {
    const next = sorted[i + 1];
    if (i === 0) zone.from = 0;
    if (next) zone.to = next.from;
    else zone.to = length;
  });
  return sorted;
}

function seekZones(
  document: MemberDocument,
  demand: InterfaceDemand,
  rules: Rules,
  spacings: Spacings,
  carried: number,
  nothing: number,
): Zone[] | null {
  const grid = zoneGrid(document.length, rules);
  const flows = largestInCells(demand, grid, nothing);
  return bestZones(
    grid,
    Float64Array.from(flows, (q) => q / carried),
    spacings,
    rules,
  );
}

function placeFasteners(
  schedule: Schedule,
  zones: readonly Zone[],
  demand: InterfaceDemand,
  length: number,
): void {
  const { rows, unitCapacity } = schedule;
  const positions = fastenerPositions(zones);
  const combinations = demand.shared.beam.combinations.length;
  let worst: Schedule['worstFastener'] = null;
  const forces = fastenerStretches(positions, length).map(({ from, to }, index) => {
    let largest = 0;
    if (schedule.peakCombination < 0) return 0;
    for (let c = 0; c < combinations; c++) {
      const force = demand.stretchForce(c, from, to) / rows;
      if (force > largest * over) {
        largest = force;
        if (force > (worst?.force ?? 0) * over) worst = { index, from, to, combination: c, force };
      }
    }
    return largest;
  });
  schedule.worstFastener = worst;
  schedule.fasteners = {
    count: rows * positions.length,
    positions: Array.from({ length: rows }, () => [...positions]),
    forces: Array.from({ length: rows }, () => [...forces]),
    utilisation: forces.reduce((most, f) => Math.max(most, f), 0) / unitCapacity,
  };
}

function adviseOnSchedule(schedule: Schedule, item: Interface, zones: readonly Zone[]): void {
  const { fasteners, worstFastener, spacings, unitCapacity } = schedule;
  const advise = (code: string, message: string): void => {
    if (schedule.status === 'ok') schedule.status = 'advice';
    schedule.notices.push({ code, interface: item.id, message });
  };
  // Where a zone is over already, its fasteners are over as well: that is no further news.
  if (fasteners && worstFastener && schedule.utilisation <= over && fasteners.utilisation > over) {
    const x = fasteners.positions[0]?.[worstFastener.index] ?? 0;
    advise(
      'single-fastener',
      `${item.id}: the fastener at x = ${round(x)} mm takes ${round(worstFastener.force)} N, ${round((fasteners.utilisation - 1) * 100)} % over its ${round(unitCapacity)} N, although its zone is within the required spacing. Add one beside it, or move the zone’s border.`,
    );
  }
  if (schedule.pinned && spacings) {
    const least = schedule.rules.spacingMin;
    const outside = zones.find(
      (z) => z.spacing < least * (1 - 1e-9) || z.spacing > schedule.rules.spacingMax * (1 + 1e-9),
    );
    if (outside) {
      advise(
        'pinned-outside-rules',
        `${item.id}: the pinned spacing of ${round(outside.spacing)} mm is outside the rules, ${round(least)} to ${round(schedule.rules.spacingMax)} mm.`,
      );
    }
  }
}

function noSchedule(
  item: Interface,
  demand: InterfaceDemand,
  s: Schedule,
  capacity: number,
  bead: number,
): Notice {
  const { spacings, rules } = s;
  const smallest = spacings?.smallest ?? rules.spacingMin;
  if (spacings && spacings.largest < spacings.smallest) {
    return {
      code: 'no-schedule',
      interface: item.id,
      message: `${item.id}: no multiple of the step of ${round(rules.spacingStep)} mm lies between ${round(rules.spacingMin)} and ${round(rules.spacingMax)} mm. Change the step or the limits.`,
    };
  }
  const required = s.requiredSpacing ?? Infinity;
  const short = smallest / required;
  const help = [
    `a capacity of ${round(towards(capacity * short, 'up'))} instead of ${round(capacity)} ${bead > 0 ? 'N/mm' : 'N a fastener'}`,
  ];
  if (bead === 0) help.unshift(`${Math.ceil(s.rows * short - 1e-9)} rows instead of ${s.rows}`);
  if (!demand.isCrossed) {
    help.push(
      `a layup with a shear flow of ${round(towards((demand.flowPerShear / short) * 1000, 'down'))} instead of ${round(demand.flowPerShear * 1000)} N/m for each newton of shear`,
    );
  }
  const list =
    help.length > 1 ? `${help.slice(0, -1).join('; ')}; or ${help[help.length - 1] ?? ''}` : (help[0] ?? '');
  return {
    code: 'no-schedule',
    interface: item.id,
    message: `${item.id}: no schedule is possible. At x = ${round(s.peak.x)} mm the spacing would have to be ${round(required)} mm or less, and the smallest allowed is ${round(smallest)} mm. What would help: ${list}.`,
  };
}

/** Four figures, on the side that helps: what is said to be enough must be enough. */
function towards(value: number, side: 'up' | 'down'): number {
  if (!(value > 0) || !Number.isFinite(value)) return value;
  const unit = 10 ** (Math.floor(Math.log10(value)) - 3);
  return (side === 'up' ? Math.ceil(value / unit - 1e-9) : Math.floor(value / unit + 1e-9)) * unit;
}

/** Four figures for a sentence. */
function round(value: number): string {
  return String(Number(value.toPrecision(4)));
}
