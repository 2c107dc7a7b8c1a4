import {
  type BankOutcome,
  type BankResult,
  type BankTonight,
  type EstimateOutcome,
  isRecordSign,
  type Outcome,
  type RecordSummary,
  UTC_TABLE,
  type ZoneTable,
} from '#libs/engine/index.js';
import { deviceTable, openDevices } from './device-words.js';
import { dutyName } from './figure-words.js';
import { formatApart, formatNumber, formatQuantity, GAP } from './format-number.js';
import { formatLength, formatMoment } from './local-stamp.js';
import { moneyLines } from './money-lines.js';
import { plainName } from './plain-name.js';
import { estimateWords, proposedWords } from './proposed-words.js';
import { gradeWords, MONTH_HEADS, monthCells, type QualityStated, qualityRows } from './quality-words.js';
import { remarkConsequence, remarkSentence } from './remark-words.js';
import { spareWaysLines } from './spare-ways-lines.js';
import { HISTORY_HEADS, historyRows } from './stage-history-words.js';
import { finished, tableLines, wrapped } from './terminal-lines.js';
import { tonightSentences } from './tonight-words.js';
import { countDuties, noPermission, verdictWords } from './verdict-words.js';

const LABEL_WIDTH = 26;

/**
 * The answer of `plan` or `assess` for a terminal.
 * @param outcome the plan or judgement
 * @param tonight what to do at once with an installed bank, null for any other
 * @returns lines of plain text, ending in a line end
 */
export function resultReport(outcome: Outcome, tonight: BankTonight | null = null): string {
  const { result, site, zone } = outcome;
  const { requirement, operation } = result;
  const target = formatNumber(requirement.targetPowerFactor, 'given');
  const factor = (value: number | null) => formatQuantity(value, '');
  const lowest = operation.months.flatMap(({ powerFactorLagging: value }) => (value === null ? [] : [value]));
  const lines = [
    plainName(site.name),
    ...tonightLines(tonight),
    `${outcome.kind === 'plan' ? 'Proposed' : 'Judged'}: ${proposedWords(outcome)}`,
    `Verdict: ${verdictWords(result.verdict)}. ${noPermission()}`,
    '',
    ...recordLines(result.record, zone),
    row(
      `needed for ${target}`,
      `at most ${formatQuantity(requirement.maxKvar, 'kvar')}, 99 % of the time under ${formatQuantity(requirement.p99Kvar, 'kvar')}`,
    ),
    row(
      'lowest month',
      `${factor(lowestOf(requirement.months.map((month) => month.powerFactorLagging)))} before, ${factor(lowestOf(lowest))} after`,
    ),
    row(
      'set point',
      `${formatNumber(result.control.setPointPowerFactor, 'given')}, reconnection delay ${formatQuantity(result.control.reconnectDelayS, 's', 'given')}`,
    ),
    row('switchings', formatNumber(operation.totalSwitchings, 'whole')),
    ...networkLines(result),
    '',
    ...moneyRows(outcome),
    ...spareRows(outcome),
    ...dutyLines(outcome),
    ...deviceLines(outcome),
    ...measuredLines(outcome),
    ...reasonLines(outcome),
    ...questionLines(result.record),
  ];
  return finished(lines);
}

/**
 * The answer of `plan` or `assess` without a record, for a terminal.
 * @param outcome the estimate
 * @param tonight what to do at once with an installed bank, null for any other
 * @returns lines of plain text, ending in a line end
 */
export function estimateReport(outcome: EstimateOutcome, tonight: BankTonight | null = null): string {
  const { result, site } = outcome;
  const { control, estimate } = result;
  const left = estimate.refused.flatMap((one) => wrapped(`- ${remarkSentence(one)}`, '  '));
  return finished([
    plainName(site.name),
    'ESTIMATE, without a meter’s record',
    ...tonightLines(tonight),
    `${outcome.kind === 'plan' ? 'Proposed' : 'Judged'}, ${estimateWords(outcome)}`,
    `Verdict: ${verdictWords(result.verdict)}. ${noPermission()}`,
    '',
    ...needLines(outcome),
    row(
      'set point',
      `${formatNumber(control.setPointPowerFactor, 'given')}, reconnection delay ${formatQuantity(control.reconnectDelayS, 's', 'given')}`,
    ),
    ...networkLines(result),
    '',
    ...dutyLines(outcome),
    ...deviceLines(outcome),
    ...reasonLines(outcome),
    '',
    'Left out, since an estimate can’t support it:',
    ...left,
  ]);
}

function tonightLines(tonight: BankTonight | null): string[] {
  return (tonight === null ? [] : tonightSentences(tonight)).flatMap((sentence) => wrapped(`! ${sentence}`, '  '));
}

function needLines({ result }: EstimateOutcome): string[] {
  const { requirement, estimate, money } = result;
  const { lowerKvar, upperKvar, listKvar } = requirement;
  const factors = requirement.months.map((month) => month.powerFactorLagging);
  const target = formatNumber(requirement.targetPowerFactor, 'given');
  const bounds = lowerKvar === null || upperKvar === null;
  return [
    row('estimated from', estimate.basis),
    ...(bounds
      ? []
      : [
          row(
            'bills',
            `${formatNumber(factors.length, 'whole')}, lowest month ${formatQuantity(lowestOf(factors), '')}`,
          ),
          row(
            `needed for ${target}`,
            `between ${formatQuantity(lowerKvar, 'kvar')} and ${formatQuantity(upperKvar, 'kvar')} (bounds, estimated)`,
          ),
        ]),
    ...(listKvar === null || estimate.equipment === null
      ? []
      : [
          row(
            'equipment list',
            `${formatQuantity(estimate.equipment.activeKw, 'kW')}, ${formatQuantity(estimate.equipment.reactiveKvar, 'kvar')}, ` +
              `power factor ${formatQuantity(estimate.equipment.powerFactor, '')}; needs ${formatQuantity(listKvar, 'kvar')} for ${target} (estimated)`,
          ),
        ]),
    ...(money === null
      ? []
      : [
          row(
            'bills by the tariff',
            `${formatNumber(money.bills.before.total)} before, ${formatNumber(money.bills.after.total)} after (estimated)`,
          ),
        ]),
  ];
}

/**
 * What a meter file holds, for a terminal.
 * @param summary of the record
 * @param quality of the file
 * @param zone the clock of its stamps; UTC where none is known
 * @returns lines of plain text, ending in a line end
 */
export function recordReport(summary: RecordSummary, quality: QualityStated, zone: ZoneTable = UTC_TABLE): string {
  const notes = summary.notes.filter((note) => !isRecordSign(note));
  return finished([
    ...recordLines(summary, zone),
    '',
    ...qualityRows(quality, zone).flatMap(([label, text]) => wrapped(row(label, text), ' '.repeat(LABEL_WIDTH))),
    '',
    ...tableLines([...MONTH_HEADS], quality.months.map(monthCells)),
    '',
    ...questionLines(summary),
    ...notes.flatMap((note) => wrapped(`note: ${remarkSentence(note)}`, '  ')),
  ]);
}

/** What the record's values ask of a person. */
function questionLines({ notes }: RecordSummary): string[] {
  return notes
    .filter(isRecordSign)
    .flatMap((note) => wrapped(`? ${remarkSentence(note)} ${remarkConsequence(note)}`, '  '));
}

function networkLines({ network, duties }: BankResult): string[] {
  const count = countDuties(duties);
  return [
    row(
      'fault level at the bus',
      `${formatQuantity(network.shortCircuitMva, 'MVA')}, ${formatQuantity(network.shortCircuitMinMva, 'MVA')} at the least`,
    ),
    row(
      'rows judged',
      `${count.judged}: ${count.clear} within limits, ${count.watch} near a limit, ${count.avoid} over; ${count.notJudged} not judged`,
    ),
  ];
}

function recordLines(record: RecordSummary, zone: ZoneTable): string[] {
  const left = [
    `${formatNumber(record.missing, 'whole')} missing`,
    `${formatNumber(record.repaired, 'whole')} repaired`,
  ];
  return [
    row(
      'record',
      `${formatMoment(zone, record.beginS)} to ${formatMoment(zone, record.endS)}, ${plainName(zone.zone)}`,
    ),
    row(
      'intervals',
      `${formatNumber(record.intervals, 'whole')} of ${formatLength(record.intervalS)}, ${left.join(', ')}, ${formatNumber(record.duplicates, 'whole')} repeated`,
    ),
    row(
      'energy',
      `${formatNumber(record.activeKwh)}${GAP}kWh, ${formatNumber(record.laggingKvarh)}${GAP}kvarh lagging, ${formatNumber(record.leadingKvarh)}${GAP}kvarh leading`,
    ),
    row(
      'power factor',
      `${formatQuantity(record.powerFactorLagging, '')} lagging only, ${formatQuantity(record.powerFactorNet, '')} net`,
    ),
    row('greatest demand', `${formatQuantity(record.maxKw, 'kW')}, ${formatQuantity(record.maxKva, 'kVA')}`),
    ...wrapped(
      row('the record is', `${gradeWords(record.grade)}. ${remarkSentence(record.gradeRule)}`),
      ' '.repeat(LABEL_WIDTH),
    ),
  ];
}

function moneyRows(outcome: Outcome): string[] {
  const lines = moneyLines(outcome);
  return lines.length === 0 ? [] : [...lines.map(({ label, text }) => row(label, text)), ''];
}

function spareRows(outcome: BankOutcome): string[] {
  const lines = spareWaysLines(outcome);
  return lines.length === 0 ? [] : [...lines.map((text, k) => row(k === 0 ? 'room for more stages' : '', text)), ''];
}

function dutyLines({ result }: BankOutcome): string[] {
  if (result.duties.length === 0) return [];
  const rows = result.duties.map((duty) => {
    const apart = duty.limit === null ? null : formatApart(duty.value, duty.limit);
    const value = apart === null ? formatNumber(duty.value) : apart.value;
    const limit = apart === null ? '–' : `${apart.limit}${GAP}${duty.unit}`;
    return [dutyName(duty), `${value}${GAP}${duty.unit}`, limit, verdictWords(duty.verdict)];
  });
  const widths = [0, 1, 2].map((at) => Math.max(...rows.map((cells) => cells[at]!.length)));
  const lines = rows.map(
    ([name, value, limit, verdict]) =>
      `${name!.padEnd(widths[0]!)}  ${value!.padStart(widths[1]!)} of ${limit!.padStart(widths[2]!)}  ${verdict}`,
  );
  return [...lines, ''];
}

/** Devices that were entered or fall short; what is open is counted. */
function deviceLines(outcome: BankOutcome): string[] {
  const { devices } = outcome.result;
  if (devices.length === 0) return [];
  const short = deviceTable(outcome).filter((_, at) => devices[at]!.state === 'short');
  const lines = short.map(({ device, need, fitted }) => `${device}: ${fitted}, needs ${need}`);
  const fits = devices.filter(({ state }) => state === 'fits').length;
  return [
    row('devices', `${devices.length}: ${fits} fit, ${short.length} fall short, ${openDevices(devices)} not entered`),
    ...lines.flatMap((line) => wrapped(`  ${line}`, '    ')),
    '',
  ];
}

function measuredLines({ result }: BankOutcome): string[] {
  const { measured } = result.ageing;
  return measured.length === 0 ? [] : [...tableLines([...HISTORY_HEADS], historyRows(measured)), ''];
}

function reasonLines({ result }: BankOutcome): string[] {
  return result.reasons.flatMap((reason) => {
    const consequence = remarkConsequence(reason);
    return wrapped(`- ${remarkSentence(reason)}${consequence === '' ? '' : ` ${consequence}`}`, '  ');
  });
}

function lowestOf(values: readonly (number | null)[]): number | null {
  const known = values.filter((value) => value !== null);
  return known.length === 0 ? null : Math.min(...known);
}

function row(label: string, text: string): string {
  return `${label.padEnd(LABEL_WIDTH)}${text}`;
}
