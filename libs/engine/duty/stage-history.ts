import type { Bank, BankInput, StageGroup, StageGroupInput } from '../layout/bank.js';
import { effectiveKvar } from '../layout/stage.js';
import { type MeasuredStage, readMeasurement } from '../layout/stage-measurement.js';
import { InputProblem, type Problem } from '../problem.js';
import { dayNumber } from '../record/zone-table.js';

/** One measurement of a stage and what it says. */
export interface MeasuredPoint extends MeasuredStage {
  date: string;
  instrument: string | null;
  /** loss against the nameplate [%]; below 0 where it has more */
  lossPct: number;
  /** at nominal bus voltage, reactor included [kvar] */
  effectiveKvar: number;
}

/** A stage that has been measured, in the order of the dates. */
export interface StageHistory {
  /** entry of `bank.stages` */
  group: number;
  /** number within the group, from 1 */
  stage: number;
  commissioned: string | null;
  points: MeasuredPoint[];
  /** loss of capacitance a year, from first to last measurement, or from the nameplate at commissioning [%] */
  lossPctPerYear: number | null;
  rateFrom: 'measurements' | 'nameplate' | null;
}

/** What measurements are read with. */
export interface HistoryBasis {
  nominalV: number;
  frequencyHz: number;
  /** the day of the judgement, or null */
  asOf: string | null;
}

/** A rate over less than this says more of the instruments than of the capacitors [days]. */
const LEAST_RATE_DAYS = 180;
const YEAR_DAYS = 365.25;

/**
 * The measured stages of an installed bank: kvar at rated voltage by closed form, and the loss over time.
 * @param given the bank as the site file gives it
 * @param bank the same, settled
 * @param basis nominal voltage, frequency, day of the judgement
 * @param path of the bank in the site file
 * @returns one entry a measured stage; none where nothing was measured
 * @throws InputProblem naming every measurement that contradicts the bank, itself or what can be
 * @source method-ageing
 */
export function stageHistories(given: BankInput, bank: Bank, basis: HistoryBasis, path = 'bank'): StageHistory[] {
  const problems: Problem[] = [];
  const found = given.stages.flatMap((stage, g) => {
    const place = `${path}.stages[${g}]`;
    problems.push(...dateProblems(stage, basis.asOf, place));
    return groupHistories({ stage, group: bank.groups[g]!, g }, given, basis, { path: place, problems });
  });
  if (problems.length > 0) throw new InputProblem(problems);
  return found;
}

function groupHistories(
  { stage, group, g }: { stage: StageGroupInput; group: StageGroup; g: number },
  given: BankInput,
  basis: HistoryBasis,
  { path, problems }: { path: string; problems: Problem[] },
): StageHistory[] {
  const byStage = new Map<number, MeasuredPoint[]>();
  const { connection } = given;
  const read = { ...basis, ...(connection === undefined ? {} : { connection }) };
  for (const [k, measurement] of (stage.measurements ?? []).entries()) {
    try {
      const measured = readMeasurement(measurement, group, read, `${path}.measurements[${k}]`);
      const points = byStage.get(measurement.stage) ?? [];
      points.push(pointOf(measurement, measured, group, basis.nominalV));
      byStage.set(measurement.stage, points);
    } catch (error) {
      if (!(error instanceof InputProblem)) throw error;
      problems.push(...error.problems);
    }
  }
  return [...byStage]
    .sort(([a], [b]) => a - b)
    .map(([number, points]) => {
      points.sort((a, b) => (a.date < b.date ? -1 : 1));
      const commissioned = stage.commissioned ?? null;
      return { group: g, stage: number, commissioned, points, ...rateOf(points, commissioned) };
    });
}

function pointOf(
  { date, instrument }: { date: string; instrument?: string },
  measured: MeasuredStage,
  group: StageGroup,
  nominalV: number,
): MeasuredPoint {
  return {
    ...measured,
    date,
    instrument: instrument ?? null,
    lossPct: 100 * (1 - measured.capacitanceFactor),
    effectiveKvar: effectiveKvar(agedGroup(group, measured.capacitanceFactor), nominalV),
  };
}

/**
 * A group whose capacitance has changed: Q and p go with C, since the reactor stays.
 * @param group nameplate
 * @param factor capacitance left, as a share of the nameplate's
 * @returns the group as it measures
 * @source derived: X_C = 1/(ωC), p = X_L/X_C
 */
export function agedGroup(group: StageGroup, factor: number): StageGroup {
  return { ...group, ratedKvar: group.ratedKvar * factor, reactorPct: group.reactorPct * factor };
}

function rateOf(
  points: readonly MeasuredPoint[],
  commissioned: string | null,
): Pick<StageHistory, 'lossPctPerYear' | 'rateFrom'> {
  const last = points[points.length - 1]!;
  const first = points[0]!;
  const apart = dayOf(last.date) - dayOf(first.date);
  if (apart >= LEAST_RATE_DAYS) {
    return { lossPctPerYear: ((last.lossPct - first.lossPct) * YEAR_DAYS) / apart, rateFrom: 'measurements' };
  }
  const age = commissioned === null ? 0 : dayOf(last.date) - dayOf(commissioned);
  if (age < LEAST_RATE_DAYS) return { lossPctPerYear: null, rateFrom: null };
  return { lossPctPerYear: (last.lossPct * YEAR_DAYS) / age, rateFrom: 'nameplate' };
}

function dayOf(date: string): number {
  const [year, month, day] = date.split('-').map(Number);
  return dayNumber(year!, month!, day!);
}

function dateProblems(stage: StageGroupInput, asOf: string | null, path: string): Problem[] {
  const problems: Problem[] = [];
  const { commissioned, measurements = [], count } = stage;
  const wrong = (place: string, expected: string, found: string): void => {
    problems.push({ code: 'inconsistent', path: `${path}.${place}`, expected, found });
  };
  if (commissioned !== undefined && asOf !== null && commissioned > asOf) {
    wrong('commissioned', `a date not after the site’s, ${asOf}`, commissioned);
  }
  const seen = new Set<string>();
  for (const [k, { stage: number, date }] of measurements.entries()) {
    const place = `measurements[${k}]`;
    if (number > count) wrong(`${place}.stage`, `a stage of the group’s ${count}`, `${number}`);
    if (commissioned !== undefined && date < commissioned) {
      wrong(`${place}.date`, `a date not before it was commissioned, ${commissioned}`, date);
    }
    if (asOf !== null && date > asOf) wrong(`${place}.date`, `a date not after the site’s, ${asOf}`, date);
    if (seen.has(`${number} ${date}`)) wrong(`${place}.date`, 'one measurement of a stage a day', `${date} again`);
    seen.add(`${number} ${date}`);
  }
  return problems;
}

/**
 * Capacitance left of each stage by its last measurement.
 * @param histories the measured stages
 * @param group entry of `bank.stages`
 * @returns share of the nameplate's by number of the stage
 */
export function lastFactors(histories: readonly StageHistory[], group: number): Map<number, number> {
  return new Map(
    histories
      .filter((history) => history.group === group)
      .map(({ stage, points }) => [stage, points[points.length - 1]!.capacitanceFactor]),
  );
}
