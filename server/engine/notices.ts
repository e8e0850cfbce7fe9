import type { MemberDocument } from '@shared/schemas/member';
import type { Notice } from '@shared/schemas/result';
import type { Beam } from './beam/combinations';
import type { SectionFlow } from './flow/section-flow';
import type { Sideways } from './flow/sideways';
import type { Interface } from './section/interfaces';
import { isSymmetric, type Section } from './section/section';

/** What the person who signs should know beside the figures. Each has a code that stays. */
export function memberNotices(
  document: MemberDocument,
  section: Section,
  interfaces: readonly Interface[],
  flow: SectionFlow,
  sideways: Sideways,
  beam: Beam,
): Notice[] {
  return [
    ...sectionNotices(document, section, sideways),
    ...slipNotices(document, flow, beam),
    ...loadNotices(document, sideways),
    ...connectionNotices(section, interfaces),
  ];
}

function sectionNotices(document: MemberDocument, section: Section, sideways: Sideways): Notice[] {
  const notices: Notice[] = [];
  if (!isSymmetric(section)) {
    notices.push({
      code: 'asymmetric-section',
      message:
        'The section is not symmetric about a vertical line: the calculation holds only if the beam is kept from moving and twisting sideways along its length.',
    });
  }
  if (sideways.stacks > 1) {
    const lowest = section.bottom;
    // Flanges between webs carry next to nothing by themselves; a ply does.
    const raised = document.pieces.filter((_, i) => {
      const stack = sideways.stackOf[i] ?? 0;
      if ((sideways.shares[stack] ?? 0) < 0.05) return false;
      return document.pieces.every((q, k) => sideways.stackOf[k] !== stack || q.z > lowest + 1e-6);
    });
    if (raised.length > 0) {
      notices.push({
        code: 'bearing-on-some-plies',
        message: `Not every ply reaches down to the supports (${raised.map((p) => p.id).join(', ')}): a support under some plies only is a side load by the reaction, which this calculation does not hold.`,
      });
    }
  }
  if (!document.supports.some((s) => s.kind === 'pin' || s.kind === 'fixed')) {
    notices.push({
      code: 'free-lengthwise',
      message: 'No support is a pin or fixed: nothing holds the beam lengthwise.',
    });
  }
  return notices;
}

function slipNotices(document: MemberDocument, flow: SectionFlow, beam: Beam): Notice[] {
  const notices: Notice[] = [];
  const joined = flow.interfaces.filter((i) => i.item.connection && i.flowPerShear !== 0);
  const kinds = new Set(joined.map((i) => i.item.connection?.kind));
  if (document.rules.composite !== 'rigid') {
    notices.push({
      code: 'slip-not-available',
      message: `The rules ask for an analysis with slip (${document.rules.composite}); this version calculates the joints as rigid only.`,
    });
  }
  if (kinds.has('fasteners')) {
    notices.push({
      code: 'rigid-joints',
      message:
        'The joints are taken as rigid. Real fasteners slip, so deflection and stresses in the pieces are larger than shown; a nailed beam of two boards may sink twice as far.',
    });
  }
  if (joined.length === 0) return notices;
  const reasons: string[] = [];
  if (kinds.size > 1) reasons.push('joints of unlike stiffness');
  if (flow.interfaces.some((i) => i.item.connection && i.side === null))
    reasons.push('joints that close a loop');
  if (document.loadCases.some((c) => c.loads.some((l) => l.kind === 'couple'))) reasons.push('a couple');
  if (document.supports.some((s) => s.kind === 'fixed')) reasons.push('a fixed support');
  const reactions = document.supports.reduce((sum, s) => sum + (s.kind === 'fixed' ? 2 : 1), 0);
  if (reactions - 2 - beam.system.nodes.filter((n) => n.hinge).length > 0)
    reasons.push('supports that share the load by stiffness');
  if (reasons.length > 0 && kinds.has('fasteners')) {
    notices.push({
      code: 'slip-matters',
      message: `This member has ${reasons.join(', ')}: with joints that slip, the flow may be larger in places than V·Q/I. Have it looked at with an analysis of the slip.`,
    });
  }
  if (flow.interfaces.some((i) => i.item.connection && i.side === null) && !flow.ownModuli) {
    notices.push({
      code: 'equal-moduli',
      message:
        'In the closed loop the flow is shared as if all joints were equally stiff, as not every connection has a slip modulus.',
    });
  }
  return notices;
}

function loadNotices(document: MemberDocument, sideways: Sideways): Notice[] {
  const notices: Notice[] = [];
  const trains = document.loadCases.flatMap((c) => c.loads.flatMap((l) => (l.kind === 'moving' ? [l] : [])));
  document.loadCases.forEach((loadCase) => {
    loadCase.loads.forEach((train) => {
      if (train.kind !== 'moving') return;
      const order = [...train.axles].sort((a, b) => a.offset - b.offset);
      const signature = (axles: readonly { offset: number; value: number }[]): string => {
        const start = axles[0]?.offset ?? 0;
        return axles.map((a) => `${(a.offset - start).toFixed(3)}:${a.value.toFixed(3)}`).join(' ');
      };
      const last = order[order.length - 1]?.offset ?? 0;
      const turned = signature(order.map((a) => ({ offset: last - a.offset, value: a.value })).reverse());
      if (
        signature(order) === turned ||
        trains.some((other) => signature([...other.axles].sort((a, b) => a.offset - b.offset)) === turned)
      )
        return;
      notices.push({
        code: 'one-way-train',
        message: `The train of ${train.axles.length} axles in ${loadCase.id} runs one way round only. If it can also come the other way round, enter it a second time with its axles turned, in a load case of its own.`,
      });
    });
  });
  const factored = document.combinations.filter((c) => Object.values(c.factors).some((f) => f > 1));
  const safe = document.connections.filter(
    ({ capacity }) => capacity.basis !== 'nds' && capacity.basis !== 'ec5',
  );
  const [first] = factored;
  if (first && safe.length > 0) {
    notices.push({
      code: 'factored-loads',
      message: `Combination ${first.id} has a factor over 1, while the capacities are allowable values or hold a factor of safety: these go with loads that are not factored. The result is on the safe side, but mixes two methods.`,
    });
  }
  const heavy = document.loadCases.some((c) =>
    c.loads.some((l) => (l.kind === 'point' || l.kind === 'moving') && l.on !== undefined),
  );
  if (sideways.stacks > 1 && heavy) {
    notices.push({
      code: 'splitting',
      message:
        'A concentrated load that is put on one ply pulls across the grain at the fasteners that pass it on: it may split a ply fastened low. Keep those fasteners high in the ply, or check the splitting (EN 1995-1-1, 8.1.4).',
    });
  }
  return notices;
}

function connectionNotices(section: Section, interfaces: readonly Interface[]): Notice[] {
  const notices: Notice[] = [];
  for (const { id, a, b, orientation, connection } of interfaces) {
    if (!connection) continue;
    const unused: string[] = [];
    if (connection.kind !== 'fasteners' && connection.rows !== undefined) unused.push('rows');
    if (connection.kind !== 'fasteners' && connection.fastener !== undefined) unused.push('fastener');
    if (connection.kind !== 'continuous' && connection.bead !== undefined) unused.push('bead');
    const spaced = connection.kind === 'fasteners' || connection.bead !== undefined;
    if (!spaced && connection.zones !== undefined) unused.push('zones');
    if (unused.length > 0) {
      notices.push({
        code: 'unused-field',
        interface: id,
        message: `${id}: ${unused.join(', ')} ${unused.length > 1 ? 'are' : 'is'} not used for a connection of this kind.`,
      });
    }
    const length = connection.fastener?.length;
    const first = section.pieces[a]?.piece;
    const second = section.pieces[b]?.piece;
    if (
      connection.kind === 'fasteners' &&
      connection.fastener?.type !== 'bolt' &&
      length !== undefined &&
      first &&
      second
    ) {
      const through = orientation === 'horizontal' ? first.depth + second.depth : first.width + second.width;
      if (length > through + 1e-6) {
        notices.push({
          code: 'fastener-through',
          interface: id,
          message: `${id}: the fastener is ${length} mm long and the two pieces together ${through} mm thick, so it goes out the far side or into a third piece. One fastener through three pieces is counted at one interface only.`,
        });
      }
    }
  }
  return notices;
}
