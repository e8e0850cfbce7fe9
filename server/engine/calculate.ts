import type { MemberDocument } from '@shared/schemas/member';
import type { CalculationResult, InterfaceResult, Notice } from '@shared/schemas/result';
import { analyseBeam } from './beam/combinations';
import { massPerLength } from './beam/cases';
import { envelopeOf } from './beam/envelope';
import { reactionsOf } from './beam/reactions';
import { workOutCapacity } from './capacity/capacity';
import { demandsOf } from './demand/build';
import { sectionFlow } from './flow/section-flow';
import { sidewaysTransfer } from './flow/sideways';
import { calculationLines } from './lines/lines';
import { memberNotices } from './notices';
import { placeOf } from './places';
import { scheduleInterface } from './schedule/schedule';
import { findInterfaces, refuseLoosePieces, refuseOverlaps } from './section/interfaces';
import { transformedSection } from './section/section';
import { engineVersion } from './version';

/**
 * The calculation, in its order: section and interfaces, beam, shear flow, load passed sideways, capacity,
 * required spacing, schedule, every fastener, and the lines that say how each figure came about.
 *
 * Takes a parsed document (N, mm, MPa). Throws `Refused` where it cannot be calculated.
 */
export function calculate(document: MemberDocument, found: readonly Notice[] = []): CalculationResult {
  refuseOverlaps(document.pieces);
  const section = transformedSection(document);
  const interfaces = findInterfaces(document);
  refuseLoosePieces(document, interfaces);

  const beam = analyseBeam(document, section.EI);
  const envelope = envelopeOf(beam, document.rules.zoneGrid);

  const flow = sectionFlow(section, interfaces);
  const sideways = sidewaysTransfer(section, interfaces);
  const { demands, nothing } = demandsOf(document, beam, envelope, section, flow, sideways);

  const worked = flow.interfaces.flatMap((own, j) => {
    const demand = demands[j];
    if (!own.item.connection || !demand) return [];
    const capacity = workOutCapacity(own.item.connection);
    return [
      {
        own,
        demand,
        capacity,
        schedule: scheduleInterface(document, own.item, demand, capacity.value, nothing),
      },
    ];
  });

  const { lines, capacityLines } = calculationLines({
    document,
    section,
    flow,
    sideways,
    beam,
    envelope,
    worked,
  });
  return {
    schema: 1,
    engine: engineVersion,
    section: {
      EA: section.EA,
      EI: section.EI,
      centroid: section.centroid,
      referenceModulus: section.referenceModulus,
      I: section.I,
      massPerLength: massPerLength(document),
      interfaces: flow.interfaces.map(({ item, firstMoment, flowPerShear }) => ({
        id: item.id,
        pieces: item.pieces,
        orientation: item.orientation,
        contact: item.contact,
        connected: item.connection !== null,
        firstMoment,
        flowPerShear: Math.abs(flowPerShear),
      })),
    },
    combinations: beam.combinations.map(({ combination, trains }) => ({
      id: combination.id,
      name: combination.name,
      moving: trains.length > 0,
    })),
    reactions: reactionsOf(beam),
    envelope: envelope.told,
    extremes: {
      shear: placeOf(beam, envelope.extremes.shear),
      moment: placeOf(beam, envelope.extremes.moment),
      deflection: placeOf(beam, envelope.extremes.deflection),
    },
    interfaces: worked.map(({ own, capacity, schedule }): InterfaceResult => {
      const { peak, peakCombination } = schedule;
      return {
        id: own.item.id,
        pieces: own.item.pieces,
        kind: own.item.connection?.kind ?? 'fasteners',
        rows: schedule.rows,
        capacity: capacity.value,
        capacityLines: capacityLines.get(own.item.id) ?? [],
        peakFlow: {
          ...placeOf(beam, {
            value: peak.value,
            x: peak.x,
            combination: peakCombination,
            positions: peak.positions,
          }),
          along: peak.along,
          across: peak.across,
        },
        requiredSpacing: schedule.requiredSpacing,
        zones: schedule.zones,
        pinned: schedule.pinned,
        fasteners: schedule.fasteners,
        needed: schedule.needed,
        governing: schedule.governing,
        utilisation: schedule.utilisation,
        slip: null,
        status: schedule.status,
      };
    }),
    slip: null,
    checks: [],
    lines,
    notices: [
      ...found,
      ...memberNotices(document, section, interfaces, flow, sideways, beam),
      ...worked.flatMap(({ schedule }) => schedule.notices),
    ],
  };
}
