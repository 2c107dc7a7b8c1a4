import {
  type BankSummary,
  type NetworkLevel,
  type Outcome,
  type RecordSummary,
  type Remark,
  type RequirementSummary,
  type Result,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { formatApart, formatNumber, formatQuantity } from './format-number.js';
import { formatLength, formatMoment } from './local-stamp.js';
import { countDuties, NO_PERMISSION, VERDICT_WORDS, verdictWords } from './verdict-words.js';

/** Width of the column of headings. */
const HEADING = 13;

/**
 * A meter file's record for a terminal.
 * @param record statistics, notes in words
 * @returns lines with a final break
 */
export function recordReport(record: RecordSummary): string {
  return lines(recordLines(record));
}

/**
 * A plan or an assessment for a terminal: the decision first, the grounds after it.
 * @param outcome the result in words
 * @returns lines with a final break
 */
export function resultReport({ kind, site, result }: Outcome): string {
  const { judged, notJudged } = countDuties(result.duties);
  const what = kind === 'plan' ? 'proposed' : 'the site’s bank';
  return lines([
    `${site.name}: ${what}: ${bankWords(result.bank)}: ${VERDICT_WORDS[result.verdict]}`,
    `${judged} rows judged, ${notJudged} not judged. ${NO_PERMISSION}`,
    '',
    ...recordLines(result.record),
    ...requirementLines(result.requirement),
    ...operationLines(result),
    ...networkLines(result),
    ...dutyLines(result),
    ...remarkLines('reasons', result.reasons),
    ...remarkLines('assumptions', result.assumptions),
    ...remarkLines('cautions', result.cautions),
  ]);
}

/**
 * A scan for a terminal: the largest peak at each corner; the curves are in the JSON.
 * @param levels one entry a corner
 * @returns lines with a final break
 */
export function scanReport(levels: readonly ScannedLevel[]): string {
  const level = formatQuantity(levels[0]?.levelKvar ?? 0, 'kvar', 'answer');
  const rows = levels.map(({ corner, parallelOrderH, peakOhm }) => [
    formatQuantity(corner.faultLevelMva, 'MVA', 'given'),
    formatNumber(corner.capacitanceFactor, 'given'),
    formatNumber(corner.inductanceFactor, 'given'),
    formatQuantity(corner.dampingKw, 'kW', 'given'),
    parallelOrderH === null ? 'none' : formatNumber(parallelOrderH, 'answer'),
    formatQuantity(peakOhm, 'Ω', 'answer'),
  ]);
  const heads = ['fault level', 'capacitance', 'inductance', 'damping', 'parallel order', 'peak'];
  return lines([
    `impedance at the bus with ${level} connected, nominal and every corner`,
    '',
    ...tableLines([heads, ...rows]),
  ]);
}

/** What a scan says of one corner, apart from its curve. */
type ScannedLevel = Pick<NetworkLevel, 'levelKvar' | 'corner' | 'parallelOrderH' | 'peakOhm'>;

function recordLines(record: RecordSummary): string[] {
  const { intervals, intervalS, missing, repaired, duplicates } = record;
  const counts = `${missing} missing, ${repaired} repaired, ${duplicates} repeated`;
  const from = formatMoment(UTC_TABLE, record.beginS);
  const to = formatMoment(UTC_TABLE, record.endS);
  return [
    entry('record', `${from} to ${to} UTC`),
    entry('', `${formatNumber(intervals, 'whole')} intervals of ${formatLength(intervalS)}; ${counts}`),
    entry(
      '',
      `${energy(record)}; power factor ${factor(record.powerFactorLagging)}, net ${factor(record.powerFactorNet)}`,
    ),
    entry(
      '',
      `greatest ${formatQuantity(record.maxKw, 'kW', 'answer')}, ${formatQuantity(record.maxKva, 'kVA', 'answer')}`,
    ),
    ...remarkLines('notes', record.notes),
  ];
}

function requirementLines(requirement: RequirementSummary): string[] {
  const { targetPowerFactor, maxKvar, p99Kvar, p50Kvar, intervalsInNeed } = requirement;
  const [max, p99, p50] = [maxKvar, p99Kvar, p50Kvar].map((kvar) => formatQuantity(kvar, 'kvar'));
  return [
    entry('needed', `to ${formatNumber(targetPowerFactor, 'given')}: at most ${max}, P99 ${p99}, P50 ${p50}`),
    entry('', `in ${formatNumber(intervalsInNeed, 'whole')} intervals`),
  ];
}

function operationLines({ control, operation }: Result): string[] {
  const setPoint = formatNumber(control.setPointPowerFactor, 'given');
  const least = Math.min(...operation.months.map((month) => month.powerFactorLagging ?? 1));
  return [
    entry('control', `set point ${setPoint}, reconnection delay ${formatLength(control.reconnectDelayS)}`),
    entry(
      'in operation',
      `inside the target ${formatQuantity(operation.shareInTargetPct, '%')} of the time, least monthly factor ${factor(least)}`,
    ),
    entry('', `${energy(operation)}; ${formatNumber(operation.totalSwitchings, 'whole')} switchings`),
  ];
}

function networkLines({ network }: Result): string[] {
  const distortionPct = Math.max(0, ...network.levels.map((level) => level.voltageDistortionPct));
  const faults = [network.shortCircuitMva, network.shortCircuitMinMva].map((mva) => formatQuantity(mva, 'MVA'));
  return [
    entry('network', `fault level at the bus ${faults[0]}, at least ${faults[1]}`),
    entry('', `voltage distortion at most ${formatQuantity(distortionPct, '%')}`),
  ];
}

function dutyLines({ duties }: Result): string[] {
  if (duties.length === 0) return [];
  const rows = duties.map(({ name, group, value, limit, unit, verdict }) => {
    const apart = limit === null ? { value: formatNumber(value), limit: '–' } : formatApart(value, limit);
    return [
      group === null ? name : `${name}, group ${group + 1}`,
      apart.value,
      apart.limit,
      unit,
      verdictWords(verdict),
    ];
  });
  return ['', ...tableLines([['duty', 'value', 'limit', '', 'verdict'], ...rows])];
}

function remarkLines(heading: string, remarks: readonly Remark[]): string[] {
  return remarks.map((remark, index) => entry(index === 0 ? heading : '', remark.text));
}

function bankWords({ effectiveKvar, stages }: BankSummary): string {
  if (stages.length === 0) return 'no bank';
  const kinds = new Map<string, number>();
  for (const { ratedKvar, ratedV, reactorPct } of stages) {
    const reactor = reactorPct === 0 ? '' : `, ${formatQuantity(reactorPct, '%', 'given')} reactor`;
    const rating = `${formatQuantity(ratedKvar, 'kvar', 'given')} at ${formatQuantity(ratedV, 'V', 'given')}${reactor}`;
    kinds.set(rating, (kinds.get(rating) ?? 0) + 1);
  }
  const groups = [...kinds].map(([rating, count]) => `${count} × ${rating}`);
  return `${groups.join(' + ')} = ${formatQuantity(effectiveKvar, 'kvar', 'answer')} effective`;
}

function energy(part: { activeKwh?: number; laggingKvarh: number; leadingKvarh: number }): string {
  const active = part.activeKwh === undefined ? '' : `${formatQuantity(part.activeKwh, 'kWh', 'answer')}, `;
  const lagging = formatQuantity(part.laggingKvarh, 'kvarh', 'answer');
  return `${active}${lagging} lagging, ${formatQuantity(part.leadingKvarh, 'kvarh', 'answer')} leading`;
}

function factor(value: number | null): string {
  return value === null ? '–' : formatNumber(value);
}

function entry(heading: string, text: string): string {
  return `${heading.padEnd(HEADING)}${text}`;
}

/** Columns as wide as their widest cell, numbers and words alike to the left. */
function tableLines(rows: string[][]): string[] {
  const widths = (rows[0] ?? []).map((_, column) => Math.max(...rows.map((row) => row[column]?.length ?? 0)));
  return rows.map((row) =>
    row
      .map((cell, column) => cell.padEnd(widths[column] ?? 0))
      .join('  ')
      .trimEnd(),
  );
}

function lines(parts: string[]): string {
  return `${parts.map((part) => part.trimEnd()).join('\n')}\n`;
}
