import { type Remark, remark } from '../problem.js';
import { clockSign } from './clock-sign.js';
import { kvarSigns, voltageSigns } from './day-signs.js';
import { hourlyLoad, type MeteredColumns } from './hourly-load.js';
import { localDay } from './local-day.js';
import { stepSigns } from './step-signs.js';
import { type StillKind, type StillRun, stillRuns } from './still-runs.js';
import { offsetAtS, type ZoneTable } from './zone-table.js';

/** A run of exact zeros that is long against the record's habit. */
export interface SuspectZeros extends StillRun {
  /** which register */
  at: 'kW and kvar' | 'kW' | 'kvar';
}

/** What a record's values ask of the person who plans on them; nothing is changed by it. */
export interface RecordSigns {
  /** one remark a question */
  questions: Remark[];
  /** in time order */
  suspectZeros: SuspectZeros[];
}

const HOUR_S = 3600;

/**
 * Looks a record over for signs that a person should answer: a step in level, a phase lost or turned round, kvar of a
 * sign that does not fit, registers that stand still, a working day that moves when the clock changes.
 * @param columns as metered, before anything was filled in
 * @param zone the site's zone
 * @returns the questions, and the zeros they are about
 * @source method-record-signs
 */
export function recordSigns(columns: MeteredColumns, zone: ZoneTable): RecordSigns {
  if (columns.beginS.length === 0) return { questions: [], suspectZeros: [] };
  const runs = stillRuns(columns);
  const zeros = (kind: StillKind, at: SuspectZeros['at']) => runs[kind].map((run): SuspectZeros => ({ ...run, at }));
  const suspectZeros = [
    ...zeros('kW and kvar at 0', 'kW and kvar'),
    ...zeros('kW at 0', 'kW'),
    ...zeros('kvar at 0', 'kvar'),
  ].sort((a, b) => a.beginS - b.beginS);
  const load = hourlyLoad(columns, zone);
  const stepHours = Math.max(1, columns.intervalS / HOUR_S);
  const questions = [
    ...stepSigns(load, stepHours),
    ...voltageSigns(load),
    // longer intervals have no hour of the day
    ...(stepHours > 1 ? [] : [...kvarSigns(load), ...clockSign(load, zone)]),
    ...stillSigns(runs.kW, 'kW', zone),
    ...stillSigns(runs.kvar, 'kvar', zone),
    ...zeroSigns(suspectZeros, zone),
  ];
  return { questions, suspectZeros };
}

/**
 * Whether a remark is one of the questions a record's values ask.
 * @param found remark of a record
 * @returns true for the codes of this file's questions
 */
export function isRecordSign({ code }: Remark): boolean {
  return code.startsWith('sign.');
}

function stillSigns(runs: readonly StillRun[], register: string, zone: ZoneTable): Remark[] {
  if (runs.length === 0) return [];
  return [remark('sign.still', { register, ...longest(runs, zone) })];
}

function zeroSigns(runs: readonly SuspectZeros[], zone: ZoneTable): Remark[] {
  return (['kW and kvar', 'kW', 'kvar'] as const).flatMap((register) => {
    const found = runs.filter(({ at }) => at === register);
    if (found.length === 0) return [];
    return [remark('sign.zeros', { register, ...longest(found, zone) })];
  });
}

/** Where the longest run begins, how long it is, and of how many, where it is not the only one. */
function longest(runs: readonly StillRun[], zone: ZoneTable): Record<string, number | string> {
  const run = runs.reduce((most, other) => (other.intervals > most.intervals ? other : most));
  const localS = run.beginS + offsetAtS(zone, run.beginS);
  const values = { date: localDay(Math.floor(localS / 86_400)), hours: (run.endS - run.beginS) / HOUR_S };
  return runs.length === 1 ? values : { ...values, runs: runs.length };
}
