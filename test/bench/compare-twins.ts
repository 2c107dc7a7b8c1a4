import { buildTwin } from './c-twin.js';
import { median, timeNs } from './stopwatch.js';

/** A piece of work that exists twice: ours, and its twin in C. */
export interface TwinWork {
  title: string;
  /** name of the C file */
  twin: string;
  /** most that ours may take, as a multiple of the twin's time */
  limit: number;
  /** runs a round of ours and of the twin; each side reports the median of them. Enough of ours to be warm. */
  runs: { ours: number; twin: number };
  /** what the twin reads */
  input: Float64Array;
  ours: () => void;
  /** ours in the twin's order, after `ours` has run */
  output: () => Float64Array;
}

const ROUNDS = 5;

/** Runs both sides in turn, insists on equal results, prints the ratio of the medians. Null where there is no compiler. */
export function compareTwins(work: TwinWork): { ratio: number; met: boolean } | null {
  const twin = buildTwin(work.twin);
  if (twin === null) {
    const ns = timeNs(work.runs.ours, work.ours);
    console.log(`${work.title}: ${ms(ns)}; no C compiler here, so no ratio`);
    return null;
  }
  try {
    const [oursNs, twinNs]: [number[], number[]] = [[], []];
    for (let round = 0; round < ROUNDS; round++) {
      const { ns, output } = twin.run(work.input, work.runs.twin);
      twinNs.push(ns);
      oursNs.push(timeNs(work.runs.ours, work.ours));
      insistEqual(work.title, work.output(), output);
    }
    const ratio = median(oursNs) / median(twinNs);
    const met = ratio <= work.limit;
    const said = `${asRatio(ratio, work.limit)}: ${met ? 'met' : 'MISSED'}`;
    console.log(`${work.title}: ${ms(median(oursNs))}, C ${ms(median(twinNs))}; ${said}`);
    return { ratio, met };
  } finally {
    twin.remove();
  }
}

function asRatio(ratio: number, limit: number): string {
  if (limit >= 1) return `${ratio.toFixed(2)} × C, at most ${limit}`;
  return `${(1 / ratio).toFixed(0)} times as fast as C, at least ${Math.round(1 / limit)}`;
}

// A compiler may fuse a multiplication with an addition, which rounds once instead of twice.
const FUSED_ROUNDING = 1e-10;

/** Throws where two lists of results differ by more than a rounding. */
export function insistEqual(title: string, ours: Float64Array, twins: Float64Array): void {
  if (ours.length !== twins.length) throw new Error(`${title}: ${ours.length} results against ${twins.length}`);
  for (let i = 0; i < ours.length; i++) {
    if (Math.abs(ours[i]! - twins[i]!) <= FUSED_ROUNDING * Math.abs(twins[i]!)) continue;
    throw new Error(`${title}: result ${i} is ${ours[i]}, the twin's is ${twins[i]}`);
  }
}

/** A time as it is printed. */
export function ms(ns: number): string {
  return `${(ns / 1e6).toFixed(3)} ms`;
}
