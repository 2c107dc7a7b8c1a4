import type { MeasuredEntry, Reevaluation, Remedy, ResultChange, SinceWhen, Verdict } from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { countWord } from './findings.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { say, words } from './language.js';
import { formatDate, formatMonth } from './local-stamp.js';
import { codeWords, pathWords } from './path-words.js';
import { plainName } from './plain-name.js';
import { stagesOutWords } from './tonight-words.js';
import { VERDICT_WORDS, verdictWords } from './verdict-words.js';

const FIGURE_NAMES: Record<ResultChange['id'], string> = words({
  verdict: 'verdict',
  'need.maxKvar': 'greatest need',
  'need.p95Kvar': 'need passed in 5 % of the record',
  'need.meanKvar': 'mean need',
  'record.powerFactor': 'power factor as metered',
  'record.maxKw': 'greatest demand',
  'operation.lowestPowerFactor': 'lowest month with the bank',
  'operation.monthsBelow': 'months below the target',
  'operation.shareInTargetPct': 'intervals inside the target',
  'operation.switchingsPerDay': 'switchings a day',
  'money.billPerDay': 'bill a day, with the bank',
  'money.savingPerYear': 'saving a year',
  'bank.effectiveKvar': 'effective kvar of the bank',
  'network.shortCircuitMva': 'fault level at the bus',
  'network.shortCircuitMinMva': 'least fault level at the bus',
  'network.voltageDistortionPct': 'voltage distortion, worst case',
  'network.currentDistortionPct': 'current distortion, worst case',
  duty: 'duty',
});

/** Heads of the table of changed figures. */
export const CHANGE_HEADS = words(['what', 'before', 'after', 'limit', 'verdict'] as const);

/**
 * Changed figures, one row each.
 * @param reevaluation the bank judged again
 * @param currency of money's figures, empty where there is none
 * @returns cells, one a head
 */
export function changeRows({ changes }: Pick<Reevaluation, 'changes'>, currency: string): string[][] {
  return changes.map((change) => {
    const unit = change.id.startsWith('money.') ? currency : change.unit;
    const digits = change.id === 'operation.monthsBelow' ? 'given' : 'computed';
    const value = (of: number | Verdict | null): string =>
      typeof of === 'string' ? VERDICT_WORDS[of] : formatQuantity(of, unit, digits);
    const moved = change.verdictBefore !== change.verdictAfter && change.verdictBefore !== null;
    const judged = change.id !== 'duty' ? '–' : verdictWords(change.verdictAfter);
    return [
      nameOf(change),
      value(change.before),
      value(change.after),
      formatQuantity(change.limit, change.unit, 'given'),
      moved ? say`${verdictWords(change.verdictBefore)}, now ${judged}` : judged,
    ];
  });
}

function nameOf({ id, name, group }: ResultChange): string {
  if (name === null) return FIGURE_NAMES[id];
  return group === null ? engineName(name) : say`${engineName(name)}, group\u00a0${group + 1}`;
}

/** Heads of the table of remedies. */
export const REMEDY_HEADS = words([
  'what would mend it',
  'verdict',
  'lowest month',
  'switchings a day',
  'bill a day',
  'parts',
] as const);

/**
 * Ways to mend the bank, the best first.
 * @param reevaluation the bank judged again
 * @param currency of prices, empty where there is none
 * @returns cells, one a head
 */
export function remedyRows({ remedies, stages }: Reevaluation, currency: string): string[][] {
  return remedies.map((remedy) => [
    `${remedyWords(remedy, stages)}${remedy.mends ? '' : say` (not enough by itself)`}`,
    VERDICT_WORDS[remedy.verdict],
    formatQuantity(remedy.lowestPowerFactor, ''),
    formatNumber(remedy.switchingsPerDay),
    formatQuantity(remedy.billPerDay, currency),
    formatQuantity(remedy.capital, currency, 'whole'),
  ]);
}

function remedyWords(remedy: Remedy, stages: readonly MeasuredEntry[]): string {
  const setPoint = say`set point ${formatNumber(remedy.setPointPowerFactor, 'given')}`;
  const plate = [
    say`${formatQuantity(remedy.ratedKvar, 'kvar', 'given')} at ${formatQuantity(remedy.ratedV, 'V', 'given')}`,
    remedy.reactorPct === 0 ? say`plain` : formatQuantity(remedy.reactorPct, say`% reactors`, 'given'),
  ].join(', ');
  const count = `${countWord(remedy.stages)} ${remedy.stages === 1 ? say`stage` : say`stages`}`;
  switch (remedy.kind) {
    case 'setPoint':
      return say`change the set point to ${formatNumber(remedy.setPointPowerFactor, 'given')}`;
    case 'remove':
      return say`leave out ${stagesOutWords(remedy.out!, stages)}; ${setPoint}`;
    case 'replace':
      return remedy.stages === 1
        ? say`replace ${count} by a new one of ${plate}; ${setPoint}`
        : say`replace ${count} by new ones of ${plate}; ${setPoint}`;
    case 'restore':
      return say`put back ${count} of ${plate}; ${setPoint}`;
    case 'renew':
      return say`put back what is gone and replace what has aged, ${count} of ${plate}; ${setPoint}`;
    case 'add':
      return say`add ${count} of ${plate}; ${setPoint}`;
    case 'detune':
      return say`detune: all ${count} new, ${formatQuantity(remedy.reactorPct, say`% reactors`, 'given')} and capacitors for
          ${formatQuantity(remedy.ratedV, 'V', 'given')}; ${setPoint}`;
  }
}

const SERIES_WORDS: Record<SinceWhen['changes'][number]['series'], string> = words({
  activeKw: 'The load’s mean kW a day',
  needKvar: 'The kvar needed at the bus, mean of a day,',
  shortKvar: 'The kvar at the meter beyond the target, mean of a day,',
});

/**
 * Since when the bank no longer does what it should.
 * @param reevaluation the bank judged again
 * @returns sentences; none where nothing changed
 */
export function sinceSentences({ since }: Reevaluation): string[] {
  if (since === null) return [];
  const by = since.monthsBy === 'metered' ? say`as metered` : say`with the bank simulated`;
  const months =
    since.firstMonthOut === null
      ? say`The last month meets the target, ${by}.`
      : say`Below the target since ${formatMonth(since.firstMonthOut)}, ${by}.`;
  const changes = since.changes.map(({ series, unit, date, before, after, explained }) => {
    const course = say`from ${formatQuantity(before, unit)} to ${formatQuantity(after, unit)}`;
    const share = say`it explains ${formatQuantity(100 * explained, '%', 'whole')} of what the weekdays leave`;
    return date === null
      ? say`${SERIES_WORDS[series]} drifted ${course} over the record, with no day to name; ${share}.`
      : say`${SERIES_WORDS[series]} went ${course} on ${formatDate(date)}; ${share}.`;
  });
  return [
    months,
    ...(changes.length === 0 ? [say`No day stands out on which load, need or shortfall changed.`] : changes),
  ];
}

/** Heads of the table of both records. */
export const LIKE_HEADS = words(['on like terms', 'before', 'after'] as const);

/**
 * Both records on like terms.
 * @param reevaluation the bank judged again
 * @returns cells, one a head; none where the record is the same
 */
export function likeRows({ records }: Reevaluation): string[][] {
  if (records === null) return [];
  const { sameHours, sameMonths } = records;
  const row = (name: string, values: readonly (number | null)[], unit: string): string[] => [
    name,
    ...values.map((value) => formatQuantity(value, unit)),
  ];
  const of = (key: 'days' | 'activeKwhPerDay' | 'laggingKvarhPerDay' | 'leadingKvarhPerDay' | 'maxKw') =>
    records.records.map((terms) => terms[key]);
  return [
    row(say`length of the record`, of('days'), say`days`),
    row(say`energy a day`, of('activeKwhPerDay'), 'kWh'),
    row(say`lagging a day`, of('laggingKvarhPerDay'), 'kvarh'),
    row(say`leading a day`, of('leadingKvarhPerDay'), 'kvarh'),
    row(
      say`power factor`,
      records.records.map(({ powerFactorLagging }) => powerFactorLagging),
      '',
    ),
    row(say`greatest demand`, of('maxKw'), 'kW'),
    ...(sameHours === null
      ? []
      : [
          row(
            say`mean over the ${formatNumber(sameHours.hours, 'whole')} hours of the week both have`,
            sameHours.activeKw,
            'kW',
          ),
          row(say`and reactive, net`, sameHours.reactiveKvar, 'kvar'),
        ]),
    ...sameMonths.map(({ month, powerFactorLagging }) =>
      row(say`power factor in ${MONTHS[month - 1] ?? ''}`, powerFactorLagging, ''),
    ),
  ];
}

const MONTHS = words([
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
]);

/** Heads of the table of changed inputs. */
export const INPUT_HEADS = words(['field', 'before', 'after'] as const);

/** Fields that hold what somebody wrote, which is never a code. */
const GIVEN = /(^|\.)(name|bus|bankBus|from|to|timeZone|currency|expression|instrument|hours|date|month)(\[|$)/;

/**
 * Fields of the site that changed, in words.
 * @param reevaluation the bank judged again
 * @returns cells, one a head
 */
export function inputRows({ inputs }: Reevaluation): string[][] {
  return inputs.map(({ path, before, after }) => {
    const isGiven = GIVEN.test(path);
    return [pathWords(path), inputWords(before, isGiven), inputWords(after, isGiven)];
  });
}

function inputWords(value: string | number | boolean | null, isGiven: boolean): string {
  if (value === null) return '–';
  if (typeof value === 'boolean') return codeWords(value ? 'yes' : 'no');
  if (typeof value === 'number') return formatNumber(value, 'given');
  return plainName(isGiven ? value : codeWords(value));
}

/**
 * What a re-evaluation found, in one sentence.
 * @param reevaluation the bank judged again
 * @returns for a headline
 */
export function reevaluationFinding({ verdict, changes, inputs, newRecord, remedies }: Reevaluation): string {
  if (inputs.length === 0 && !newRecord) return say`nothing changed`;
  const moved =
    verdict.before === verdict.after
      ? say`still ${VERDICT_WORDS[verdict.after]}`
      : say`from ${VERDICT_WORDS[verdict.before]} to ${VERDICT_WORDS[verdict.after]}`;
  return say`${moved}; ${formatNumber(changes.length, 'whole')} ${changes.length === 1 ? say`figure` : say`figures`} changed, ${waysWords(remedies)}`;
}

function waysWords(remedies: readonly Remedy[]): string {
  const mend = remedies.filter(({ mends }) => mends).length;
  if (remedies.length === 0) return say`nothing to mend`;
  if (mend === 0) return say`no single way mends it whole`;
  return mend === 1 ? say`one way to mend it` : say`${countWord(mend)} ways to mend it`;
}
