/** Timing as ratios inside one run, so that a figure means the same on a slow machine as on a fast one. */

export interface Ratio {
  /** median time of a run of each, in milliseconds */
  measured: number;
  yardstick: number;
  /** measured ÷ yardstick */
  ratio: number;
}

const SAMPLE = 12; // ms; shorter samples drown in the timer's and the collector's noise
const WARM_UP = 400; // ms for each side, so that both are compiled before the first sample counts

function median(values: number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = Math.floor(sorted.length / 2);
  const upper = sorted[middle] ?? Number.NaN;
  return sorted.length % 2 === 1 ? upper : (upper + (sorted[middle - 1] ?? Number.NaN)) / 2;
}

/** Milliseconds for one run of `work`, as the mean over `times` runs. */
function time(work: () => unknown, times: number): number {
  const start = performance.now();
  for (let i = 0; i < times; i += 1) work();
  return (performance.now() - start) / times;
}

/** Runs `work` until it is warm, and tells how many runs fill a sample. */
function warmUp(work: () => unknown): number {
  const start = performance.now();
  let last = 0;
  let runs = 0;
  do {
    last = time(work, 1);
    runs += 1;
  } while (performance.now() - start < WARM_UP || runs < 3);
  return Math.max(1, Math.ceil(SAMPLE / Math.max(last, 1e-4)));
}

/**
 * Times two pieces of work against each other: both warmed up, then a sample of one and a sample of the other in
 * turn, so that whatever slows the machine for a while slows both. The medians are compared.
 */
export function compare(measured: () => unknown, yardstick: () => unknown, rounds: number): Ratio {
  const timesMeasured = warmUp(measured);
  const timesYardstick = warmUp(yardstick);
  const samplesMeasured: number[] = [];
  const samplesYardstick: number[] = [];
  for (let round = 0; round < rounds; round += 1) {
    samplesMeasured.push(time(measured, timesMeasured));
    samplesYardstick.push(time(yardstick, timesYardstick));
  }
  const a = median(samplesMeasured);
  const b = median(samplesYardstick);
  return { measured: a, yardstick: b, ratio: a / b };
}
