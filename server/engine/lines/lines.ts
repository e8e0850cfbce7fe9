import type { MemberDocument } from '@shared/schemas/member';
import type { CalculationLine } from '@shared/schemas/result';
import type { Beam } from '../beam/combinations';
import type { Envelope } from '../beam/envelope';
import { shearPositions, type Extreme } from '../beam/extremes';
import type { WorkedCapacity } from '../capacity/capacity';
import type { InterfaceDemand } from '../demand/demand';
import type { InterfaceFlow, SectionFlow } from '../flow/section-flow';
import { stackOfLoad, type Sideways } from '../flow/sideways';
import type { Schedule } from '../schedule/schedule';
import type { Section } from '../section/section';
import { acrossLine } from './across-lines';
import { momentLine, reactionLines, shearLine, type StateTerms } from './beam-lines';
import { LineBook, type Term } from './book';
import { capacityLines } from './capacity-lines';
import { deflectionLine } from './deflection-lines';
import { flowLines, sidewaysLines } from './flow-lines';
import { shown } from './load-sums';
import { scheduleLines } from './schedule-lines';
import { sectionLines, type SectionTerms } from './section-lines';
import { freeze, type State } from './state';

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

/**
 * The calculation as numbered lines: section, the beam in the states that govern, shear flow, load passed
 * sideways, and each interface from its capacity to its schedule. Every line is a formula over its inputs.
 */
export function calculationLines(w: Worked): {
  lines: CalculationLine[];
  capacityLines: Map<string, CalculationLine[]>;
} {
  const book = new LineBook();
  const section = sectionLines(book, w.document, w.section);
  const beam = new BeamChapter(book, w);
  beam.extremes(section);
  const phis = flowLines(book, w.section, w.flow, section);
  if (w.worked.some(({ demand }) => demand.isCrossed)) sidewaysLines(book, w.section, w.sideways);
  const capacities = new Map<string, CalculationLine[]>();
  for (const item of w.worked) {
    const { id, connection } = item.own.item;
    const phi = phis.get(id);
    if (!connection || !phi) continue;
    const { schedule } = item;
    book.open(`Fastening ${id}`);
    const first = book.lines.length;
    const R = capacityLines(book, id, connection.kind, connection.capacity, item.capacity);
    capacities.set(id, book.lines.slice(first));
    let shear: Term | null = null;
    let across: Term | null = null;
    if (schedule.peakCombination >= 0) {
      ({ shear, across } = beam.peakOf(item));
    }
    scheduleLines(book, item.own.item, schedule, phi, R, shear, across, worstIntegral(item));
  }
  return { lines: book.lines, capacityLines: capacities };
}

/** The frozen states and their reactions, each written once. */
class BeamChapter {
  private readonly states = new Map<string, StateTerms>();
  private readonly shears = new Map<string, Term>();

  constructor(
    private readonly book: LineBook,
    private readonly w: Worked,
  ) {}

  extremes(section: SectionTerms): void {
    const { shear, moment, deflection } = this.w.envelope.extremes;
    if (shear.combination < 0 && moment.combination < 0 && deflection.combination < 0) return;
    this.book.open('Beam');
    if (shear.combination >= 0) this.shear(shear.combination, shear, shear.value, 'Largest shear');
    if (moment.combination >= 0) {
      const terms = this.state(moment);
      if (terms)
        momentLine(
          this.book,
          terms,
          moment.x,
          moment.side,
          `Largest moment, x = ${shown(moment.x)}, ${terms.name}`,
        );
    }
    if (deflection.combination >= 0) {
      const terms = this.state(deflection);
      if (terms) {
        const label = `Largest deflection, x = ${shown(deflection.x)}, ${terms.name}`;
        deflectionLine(this.book, this.w.beam, terms, deflection.x, section.EI, label);
      }
    }
  }

  /** Shear, and flow passed sideways, at the worst place of an interface. */
  peakOf(item: Worked['worked'][number]): { shear: Term | null; across: Term | null } {
    const { w } = this;
    const { schedule, own, demand } = item;
    const { peak, peakCombination } = schedule;
    const loads = w.beam.combinations[peakCombination];
    if (!loads) return { shear: null, across: null };
    const { positions } = peak;
    const { side } = shearPositions(w.beam, loads, peak.x, peak.shear);
    const shear = this.shear(peakCombination, { positions, x: peak.x, side }, peak.shear, 'Shear');
    let across: Term | null = null;
    if (demand.isCrossed && peak.across > 0) {
      const terms = this.state({ combination: peakCombination, positions });
      const j = w.flow.interfaces.indexOf(own);
      if (terms) {
        const { depth } = w.section;
        across = acrossLine(
          this.book,
          own.item.id,
          terms.state,
          w.sideways,
          w.sideways.across[j] ?? [],
          (on) => stackOfLoad(w.document, w.sideways, on),
          { x: peak.x, side, depth, length: w.document.length },
          peak.across,
        );
      }
    }
    return { shear, across };
  }

  private shear(
    combination: number,
    { positions, x, side }: Pick<Extreme, 'positions' | 'x' | 'side'>,
    value: number,
    what: string,
  ): Term | null {
    const terms = this.state({ combination, positions });
    if (!terms) return null;
    const key = `${terms.state.key} | ${x} ${side}`;
    const known = this.shears.get(key);
    if (known) return known;
    const term = shearLine(this.book, terms, x, side, value, `${what}, x = ${shown(x)}, ${terms.name}`);
    this.shears.set(key, term);
    return term;
  }

  private state(of: { combination: number; positions: Extreme['positions'] }): StateTerms | null {
    const { beam, document } = this.w;
    const state: State | null = freeze(document, beam, of.combination, of.positions);
    if (!state) return null;
    const known = this.states.get(state.key);
    if (known) return known;
    const id = beam.combinations[of.combination]?.combination.id ?? '';
    const at = of.positions.map((p) => shown(p.x)).join(', ');
    const name = at === '' ? id : `${id} with the moving load at ${at}`;
    const terms = reactionLines(this.book, beam, state, name, document.length);
    this.states.set(state.key, terms);
    return terms;
  }
}

/** ∫V and the sideways load over the stretch of the most loaded fastener, in its combination. */
function worstIntegral({
  schedule,
  demand,
  own,
}: Worked['worked'][number]): { value: number; across: number } | null {
  const { worstFastener, rows } = schedule;
  if (!worstFastener) return null;
  const { from, to, combination, force } = worstFastener;
  const phi = Math.abs(own.flowPerShear);
  const total = force * rows;
  const { along, across } = demand.stretchParts(combination, from, to);
  // The largest of all positions: its two parts give back the force.
  return phi === 0 ? { value: 0, across: total } : { value: along, across };
}
