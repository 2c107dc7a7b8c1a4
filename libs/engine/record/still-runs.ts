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
  const { activeKw, laggingKvar, leadingKvar } = columns;
  const stateAt = (i: number) => (activeKw[i] === 0 ? 1 : 0) + (laggingKvar[i] === 0 && leadingKvar[i] === 0 ? 2 : 0);
  eachRun(columns, LEAST_HOURS['kW at 0'], {
    isSame: (i) => stateAt(i) !== 0 && stateAt(i) === stateAt(i - 1),
    take: (from, to) => runs[ZERO_KINDS[stateAt(from)]!].push(runOf(columns, from, to)),
  });
}

const ZERO_KINDS: Record<number, StillKind> = { 1: 'kW at 0', 2: 'kvar at 0', 3: 'kW and kvar at 0' };

function collectStill(columns: MeteredColumns, runs: StillRuns): void {
  const { activeKw, laggingKvar, leadingKvar } = columns;
  eachRun(columns, LEAST_HOURS.kW, {
    isSame: (i) => activeKw[i] === activeKw[i - 1],
    take: (from, to) => {
      if (activeKw[from] !== 0) runs.kW.push(runOf(columns, from, to));
    },
  });
  eachRun(columns, LEAST_HOURS.kvar, {
    isSame: (i) => laggingKvar[i] === laggingKvar[i - 1] && leadingKvar[i] === leadingKvar[i - 1],
    take: (from, to) => {
      if (laggingKvar[from] !== 0 || leadingKvar[from] !== 0) runs.kvar.push(runOf(columns, from, to));
    },
  });
}

/**
 * Takes every run of like intervals without a gap, from first to behind its last, that lasts half the least length or
 * longer: what is shorter is neither long nor a habit that makes a long one usual. Of the steps within a run of `least`
 * intervals one stands at a multiple of least − 1: the others are looked at only around a like pair.
 */
function eachRun(
  { beginS, intervalS }: MeteredColumns,
  leastHours: number,
  { isSame, take }: { isSame: (i: number) => boolean; take: (from: number, to: number) => void },
): void {
  const n = beginS.length;
  const goesOn = (i: number) => isSame(i) && beginS[i]! - beginS[i - 1]! === intervalS;
  const least = Math.max(2, Math.floor((leastHours * HOUR_S) / BEYOND_HABIT / intervalS));
  const stride = least - 1;
  for (let i = stride; i < n; i += stride) {
    if (!goesOn(i)) continue;
    let from = i - 1;
    while (from > 0 && goesOn(from)) from--;
    let to = i + 1;
    while (to < n && goesOn(to)) to++;
    if (to - from >= least) take(from, to);
    i = Math.floor(to / stride) * stride;
  }
}

function runOf({ beginS, intervalS }: MeteredColumns, from: number, to: number): StillRun {
  return { beginS: beginS[from]!, endS: beginS[to - 1]! + intervalS, intervals: to - from };
}
