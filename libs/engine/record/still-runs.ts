import type { MeteredColumns } from './hourly-load.js';

/** A stretch over which a register gives one and the same value. */
export interface StillRun {
  beginS: number;
  endS: number;
  intervals: number;
}

/** What stands still: all of the meter at 0, one register at 0, or one register at another value. */
export const STILL_KINDS = ['kW and kvar at 0', 'kW at 0', 'kvar at 0', 'kW', 'kvar'] as const;

export type StillKind = (typeof STILL_KINDS)[number];

/** Runs that are long against the record's own habit, by what stands still, in time order. */
export type StillRuns = Record<StillKind, StillRun[]>;

const HOUR_S = 3600;
/** Shorter runs are nobody's question [h]: a shift at standstill for zeros, a day for a register. */
const LEAST_HOURS: Record<StillKind, number> = {
  'kW and kvar at 0': 6,
  'kW at 0': 6,
  'kvar at 0': 24,
  kW: 24,
  kvar: 24,
};
const LEAST_INTERVALS = 6;
/** A length that is reached once in four weeks, five times at least, is the site's habit; twice as long is not. */
const HABIT_WEEKS = 4;
const HABIT_TIMES = 5;
const BEYOND_HABIT = 2;

/**
 * Finds runs of unchanging values that are long against the record's own habit: longer than a least length (six hours
 * of zeros, a day of kvar at 0 or of another value) and than twice the length that such runs reach once in four weeks.
 * A gap in the record ends a run.
 * @param columns as metered
 * @returns the runs of each kind
 * @source method-record-signs
 */
export function stillRuns(columns: MeteredColumns): StillRuns {
  const { beginS, intervalS } = columns;
  const runs: StillRuns = { 'kW and kvar at 0': [], 'kW at 0': [], 'kvar at 0': [], kW: [], kvar: [] };
  const weeks = beginS.length === 0 ? 0 : (beginS[beginS.length - 1]! - beginS[0]!) / (7 * 24 * HOUR_S);
  const times = Math.max(HABIT_TIMES, Math.ceil(weeks / HABIT_WEEKS));
  collectZeros(columns, runs);
  collectStill(columns, runs);
  for (const kind of STILL_KINDS) {
    const lengths = runs[kind].map(({ intervals }) => intervals).sort((a, b) => b - a);
    const habit = lengths[times - 1] ?? 0;
    const least = Math.max(LEAST_INTERVALS, (LEAST_HOURS[kind] * HOUR_S) / intervalS, BEYOND_HABIT * habit + 1);
    runs[kind] = runs[kind].filter(({ intervals }) => intervals >= least);
  }
  return runs;
}

function collectZeros(columns: MeteredColumns, runs: StillRuns): void {
  const { activeKw, laggingKvar, leadingKvar, beginS, intervalS } = columns;
  const n = beginS.length;
  let from = 0;
  let standing = 0;
  for (let i = 0; i < n; i++) {
    const state = (activeKw[i] === 0 ? 1 : 0) + (laggingKvar[i] === 0 && leadingKvar[i] === 0 ? 2 : 0);
    if (state === standing && (standing === 0 || beginS[i]! - beginS[i - 1]! === intervalS)) continue;
    pushZeros(runs, columns, { standing, from, to: i });
    from = i;
    standing = state;
  }
  pushZeros(runs, columns, { standing, from, to: n });
}

const ZERO_KINDS = [null, 'kW at 0', 'kvar at 0', 'kW and kvar at 0'] as const;

function pushZeros(
  runs: StillRuns,
  columns: MeteredColumns,
  run: { standing: number; from: number; to: number },
): void {
  const kind = ZERO_KINDS[run.standing];
  if (kind != null) pushRun(runs[kind], columns, run.from, run.to);
}

function collectStill(columns: MeteredColumns, runs: StillRuns): void {
  const { activeKw, laggingKvar, leadingKvar, beginS, intervalS } = columns;
  const n = beginS.length;
  const endKw = (from: number, to: number) => {
    if (to - from > 1 && activeKw[from] !== 0) pushRun(runs.kW, columns, from, to);
  };
  const endKvar = (from: number, to: number) => {
    if (to - from > 1 && (laggingKvar[from] !== 0 || leadingKvar[from] !== 0)) pushRun(runs.kvar, columns, from, to);
  };
  let kwFrom = 0;
  let kvarFrom = 0;
  for (let i = 1; i < n; i++) {
    const isBroken = beginS[i]! - beginS[i - 1]! !== intervalS;
    if (isBroken || activeKw[i] !== activeKw[i - 1]) {
      endKw(kwFrom, i);
      kwFrom = i;
    }
    if (isBroken || laggingKvar[i] !== laggingKvar[i - 1] || leadingKvar[i] !== leadingKvar[i - 1]) {
      endKvar(kvarFrom, i);
      kvarFrom = i;
    }
  }
  endKw(kwFrom, n);
  endKvar(kvarFrom, n);
}

/** Runs under an hour, or of a single interval, are no run. */
function pushRun(list: StillRun[], { beginS, intervalS }: MeteredColumns, from: number, to: number): void {
  const intervals = to - from;
  if (intervals < 2 || intervals * intervalS < HOUR_S) return;
  list.push({ beginS: beginS[from]!, endS: beginS[to - 1]! + intervalS, intervals });
}
