import { type Remark, remark } from '../problem.js';
import type { LoadRecord } from './load-record.js';

/** How far a record can be planned on. */
export const RECORD_GRADES = ['full', 'usable', 'limited', 'insufficient'] as const;

export type RecordGrade = (typeof RECORD_GRADES)[number];

/** A grade and what it was given for. */
export interface GradedRecord {
  grade: RecordGrade;
  /** the rule that decided, with what was found and what the next better grade asks for */
  gradeRule: Remark;
}

/** Least days of measured intervals and greatest share of the grid that was not measured [%], best grade first. */
const RULES = [
  { grade: 'full', leastDays: 361, mostMissingPct: 1 },
  { grade: 'usable', leastDays: 85, mostMissingPct: 5 },
  { grade: 'limited', leastDays: 11, mostMissingPct: 20 },
] as const;

const DAY_S = 86_400;

/**
 * Grades a record by the days it measures and the share of its grid it does not; what was repaired is not measured.
 * Full takes a year but four days, usable a quarter, limited eleven days, so that it holds more than one working week.
 * @param record the record
 * @returns the grade and the rule that gave it
 * @source method-record-signs
 */
export function gradeRecord(record: Pick<LoadRecord, 'beginS' | 'intervalS' | 'repaired' | 'missing'>): GradedRecord {
  const { beginS, intervalS, repaired, missing } = record;
  const days = ((beginS.length - repaired) * intervalS) / DAY_S;
  const missingPct = (100 * (missing + repaired)) / (beginS.length + missing);
  const at = RULES.findIndex((rule) => days >= rule.leastDays && missingPct <= rule.mostMissingPct);
  const grade = at < 0 ? 'insufficient' : RULES[at]!.grade;
  return { grade, gradeRule: ruleOf(at < 0 ? RULES.length : at, days, missingPct) };
}

function ruleOf(at: number, days: number, missingPct: number): Remark {
  if (at === 0) {
    const { leastDays, mostMissingPct } = RULES[0];
    return remark('grade.full', { days, missingPct, leastDays, mostMissingPct });
  }
  const { grade, leastDays, mostMissingPct } = RULES[at - 1]!;
  if (days >= leastDays) return remark('grade.missing', { days, missingPct, grade, mostMissingPct });
  if (missingPct <= mostMissingPct) return remark('grade.days', { days, missingPct, grade, leastDays });
  return remark('grade.daysAndMissing', { days, missingPct, grade, leastDays, mostMissingPct });
}
