import {
  type Capital,
  capitalFigure,
  type Figure,
  figure,
  type RecordSummary,
  recordCounts,
} from '#libs/engine/index.js';
import { workingOf } from './figure-words.js';

const COUNTS: Readonly<Record<string, string>> = {
  'record.intervals': 'intervals read',
  'record.missing': 'intervals missing between the first and the last',
  'record.maxKw': 'greatest active power of the record',
};

/** Where a set point comes from. */
const SET_POINTS = {
  typed: 'the site file',
  searched: 'the plan’s search, from the target upwards',
  target: 'the target, where nothing else is stated',
} as const;

/**
 * Workings of what is counted in a record.
 * @param record its summary
 * @returns figures in words: read, missing, greatest
 */
export function recordWorkings(record: RecordSummary): [read: Figure, missing: Figure, greatest: Figure] {
  const [read, missing, greatest] = recordCounts(record).map((count) => worded(count, COUNTS[count.id]!));
  return [read!, missing!, greatest!];
}

/**
 * Working of what a bank costs.
 * @param capital items and total
 * @param currency unit of the amounts
 * @returns a figure in words
 */
export function capitalWorking(capital: Capital, currency: string): Figure {
  return worded(capitalFigure(capital, currency), 'to build, items added up');
}

/**
 * Working of the controller’s set point: where it comes from.
 * @param powerFactor the set point
 * @param from who set it
 * @returns a figure in words
 */
export function setPointWorking(powerFactor: number, from: keyof typeof SET_POINTS): Figure {
  const head = { formula: 'λ_s', source: SET_POINTS[from] };
  const inputs = [['λ_s', powerFactor, '']] as const;
  return worded(
    figure('control.setPointPowerFactor', { value: powerFactor, unit: '' }, head, inputs),
    'power factor the controller steers to',
  );
}

function worded(one: Figure, label: string): Figure {
  return { ...one, label, working: workingOf(one) };
}
