import type { Interface } from '../section/interfaces';
import type { Schedule } from '../schedule/schedule';
import { given, type LineBook, type Term } from './book';
import { shown } from './load-sums';

/** Flow at the worst place, required spacing, zones, the most heavily loaded fastener, utilisation. */
export function scheduleLines(
  book: LineBook,
  item: Interface,
  schedule: Schedule,
  phi: Term,
  R: Term,
  shear: Term | null,
  across: Term | null,
  integral: { value: number; across: number } | null,
): void {
  const { peak, rows } = schedule;
  const id = item.id;
  const write = (line: {
    label: string;
    symbol: string;
    formula: string;
    inputs: Term[];
    value: number;
    unit: string;
    source: string;
  }): Term => book.write({ ...line, interface: id });
  if (schedule.peakCombination < 0) {
    write({
      label: `Flow at ${id}: nothing passes through it, so the largest spacing allowed is enough`,
      symbol: 'q',
      formula: `${phi.symbol} * V_0`,
      inputs: [phi, given('V_0', 0, 'N')],
      value: 0,
      unit: 'N/mm',
      source: 'Shear flow VQ/I',
    });
  }
  let q: Term | null = null;
  if (schedule.peakCombination >= 0 && shear) {
    q = write({
      label: `Flow along the beam at ${id}, x = ${shown(peak.x)}`,
      symbol: 'q',
      formula: `${phi.symbol} * abs(V)`,
      inputs: [phi, shear],
      value: peak.along,
      unit: 'N/mm',
      source: 'Shear flow VQ/I',
    });
    if (across) {
      q = write({
        label: `Resultant flow at ${id}, x = ${shown(peak.x)}`,
        symbol: 'q_r',
        formula: 'sqrt(q^2 + t^2)',
        inputs: [q, across],
        value: peak.value,
        unit: 'N/mm',
        source: 'Both directions at one place, position and combination',
      });
    }
  }
  const connection = item.connection;
  if (!connection) return;
  const n = given('n', rows, '');
  if (connection.kind === 'adhesive' || (connection.kind === 'continuous' && connection.bead === undefined)) {
    if (!q) return;
    const glue = connection.kind === 'adhesive';
    write({
      label: `Utilisation of ${id}`,
      symbol: 'u',
      formula: glue ? `${q.symbol} / (b * R)` : `${q.symbol} / R`,
      inputs: glue ? [q, given('b', item.contact, 'mm'), R] : [q, R],
      value: schedule.utilisation,
      unit: '',
      source: glue ? 'Demand over capacity on the contact width' : 'Demand over capacity',
    });
    return;
  }
  let unit = R;
  if (connection.kind === 'continuous') {
    unit = write({
      label: `What one run of the bead at ${id} carries`,
      symbol: 'R_b',
      formula: 'l_b * R',
      inputs: [given('l_b', connection.bead ?? 0, 'mm'), R],
      value: schedule.unitCapacity,
      unit: 'N',
      source: 'Capacity per length times the run',
    });
  }
  if (q && schedule.requiredSpacing !== null) {
    write({
      label: `Required spacing at ${id}, x = ${shown(peak.x)}`,
      symbol: 's_req',
      formula: `n * ${unit.symbol} / ${q.symbol}`,
      inputs: [n, unit, q],
      value: schedule.requiredSpacing,
      unit: 'mm',
      source: 'Rows × capacity over flow',
    });
  }
  zoneLines(book, id, schedule, n, unit);
  const { fasteners, worstFastener } = schedule;
  if (fasteners && worstFastener && integral) {
    const inputs = [phi, given('A_V', integral.value, 'N mm'), n];
    const sideways = integral.across !== 0;
    const F = write({
      label: `Force on the most loaded fastener of ${id}, stretch ${shown(worstFastener.from)} to ${shown(worstFastener.to)} (A_V: area of the shear diagram over it)`,
      symbol: 'F_max',
      formula: sideways ? `sqrt((${phi.symbol} * A_V)^2 + T_x^2) / n` : `${phi.symbol} * abs(A_V) / n`,
      inputs: sideways ? [...inputs, given('T_x', integral.across, 'N')] : inputs,
      value: worstFastener.force,
      unit: 'N',
      source: 'Flow over the fastener’s stretch, divided by the rows',
    });
    write({
      label: `Utilisation of that fastener`,
      symbol: 'u_F',
      formula: 'F_max / R',
      inputs: [F, R],
      value: fasteners.utilisation,
      unit: '',
      source: 'Demand over capacity',
    });
  }
}

function zoneLines(book: LineBook, id: string, schedule: Schedule, n: Term, R: Term): void {
  const step = given('step', schedule.rules.spacingStep, 'mm');
  const counts: Term[] = [];
  schedule.zones.forEach((zone, i) => {
    const k = i + 1;
    const flow = schedule.zoneFlows[i] ?? 0;
    const q = given(`q_${k}`, flow, 'N/mm');
    const where = `zone ${k} of ${id}, ${shown(zone.from)} to ${shown(zone.to)}`;
    let spacing = given(`s_${k}`, zone.spacing, 'mm');
    if (!schedule.pinned && schedule.spacings) {
      // A schedule that reads the same from both ends serves the harder of each pair.
      const twin = schedule.rules.mirror ? (schedule.zoneFlows[schedule.zones.length - 1 - i] ?? 0) : 0;
      const governing = given(`q_g${k}`, Math.max(flow, twin), 'N/mm');
      const largest = given('s_max', schedule.spacings.largest, 'mm');
      spacing = book.write({
        label: `Spacing in ${where} (q_g${k}: the largest flow in it${schedule.rules.mirror ? ' or in the zone it mirrors' : ''})`,
        symbol: `s_${k}`,
        formula:
          governing.value > 0 ? `min(s_max, floor(n * ${R.symbol} / q_g${k} / step + 1e-9) * step)` : 's_max',
        inputs: governing.value > 0 ? [largest, n, R, governing, step] : [largest],
        value: zone.spacing,
        unit: 'mm',
        source: 'Required spacing down to a step, no more than the rules allow',
        interface: id,
      });
    }
    counts.push(
      book.write({
        label: `A row in ${where}`,
        symbol: `N_${k}`,
        formula: `ceil((b_${k} - a_${k}) / s_${k} - 1e-9)`,
        inputs: [given(`a_${k}`, zone.from, 'mm'), given(`b_${k}`, zone.to, 'mm'), spacing],
        value: zone.perRow,
        unit: '',
        source: 'Length over spacing, rounded up',
        interface: id,
      }),
    );
    book.write({
      label: `Utilisation of ${where}`,
      symbol: `u_${k}`,
      formula: `s_${k} * q_${k} / (n * ${R.symbol})`,
      inputs: [spacing, q, n, R],
      value: zone.utilisation,
      unit: '',
      source: 'Spacing over required spacing',
      interface: id,
    });
  });
  if (schedule.fasteners && counts.length > 0) {
    book.write({
      label: `Fasteners at ${id} in all`,
      symbol: 'N',
      formula: `n * (${counts.map((c) => c.symbol).join(' + ')})`,
      inputs: [n, ...counts],
      value: schedule.fasteners.count,
      unit: '',
      source: 'Rows × fasteners a row',
      interface: id,
    });
  }
}
