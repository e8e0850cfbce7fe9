import type { MemberDocument } from '@shared/schemas/member';
import type { CalculationLine } from '@shared/schemas/result';
import type { Beam } from '../beam/combinations';
import type { Envelope } from '../beam/envelope';
import type { WorkedCapacity } from '../capacity/capacity';
import type { InterfaceDemand } from '../demand/demand';
import type { InterfaceFlow, SectionFlow } from '../flow/section-flow';
import type { Sideways } from '../flow/sideways';
import type { Schedule } from '../schedule/schedule';
import type { Section } from '../section/section';

/** Everything that has been worked out, for the lines to tell. */
export interface Worked {
  document: MemberDocument;
  section: Section;
  flow: SectionFlow;
  sideways: Sideways;
  beam: Beam;
  envelope: Envelope;
  worked: { own: InterfaceFlow; demand: InterfaceDemand; capacity: WorkedCapacity; schedule: Schedule }[];
}

export function calculationLines(_worked: Worked): {
  lines: CalculationLine[];
  capacityLines: Map<string, CalculationLine[]>;
} {
  return { lines: [], capacityLines: new Map() };
}
