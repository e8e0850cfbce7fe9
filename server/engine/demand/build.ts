import type { MemberDocument } from '@shared/schemas/member';
import type { Beam } from '../beam/combinations';
import type { Envelope } from '../beam/envelope';
import type { SectionFlow } from '../flow/section-flow';
import type { Sideways } from '../flow/sideways';
import { weightedSum } from '../numeric/piecewise';
import type { Section } from '../section/section';
import { InterfaceDemand } from './demand';
import { SharedDemand } from './shared';
import { stackLoads } from './sideways-load';

/**
 * Steps 3 and 4 brought together: what every interface has to carry, by its place in the list of interfaces.
 * `nothing` is the flow (N/mm) up to which there is none: 1e-9 of V over the depth.
 */
export function demandsOf(
  document: MemberDocument,
  beam: Beam,
  envelope: Envelope,
  section: Section,
  flow: SectionFlow,
  sideways: Sideways,
): { demands: (InterfaceDemand | null)[]; nothing: number } {
  const shared = new SharedDemand(beam, section.depth, envelope.stations, envelope.told);
  const loads = stackLoads(document, beam, sideways, section.depth);
  const demands = flow.interfaces.map(({ item, flowPerShear }, j) => {
    if (!item.connection) return null;
    const across = sideways.across[j] ?? [];
    const still = loads.still.map((byStack) => {
      const parts = byStack.flatMap((f, s) => {
        const weight = across[s] ?? 0;
        return f && weight !== 0 ? [{ f, weight }] : [];
      });
      return parts.length > 0 ? weightedSum(parts) : null;
    });
    const moving = loads.trainStack.map((s) => (s === null ? 0 : (across[s] ?? 0)));
    return new InterfaceDemand(shared, Math.abs(flowPerShear), still, moving);
  });
  return { demands, nothing: (1e-9 * Math.abs(envelope.extremes.shear.value)) / section.depth };
}
