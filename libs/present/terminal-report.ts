import { type Outcome, type RecordSummary, type ScannedLevel, UTC_TABLE, type ZoneTable } from '#libs/engine/index.js';
import { deviceTable, openDevices } from './device-words.js';
import { dutyName } from './figure-words.js';
import { formatApart, formatNumber, formatQuantity, GAP } from './format-number.js';
import { formatLength, formatMoment } from './local-stamp.js';
import { moneyLines } from './money-lines.js';
import { plainName } from './plain-name.js';
import { proposedWords } from './proposed-words.js';
import { remarkConsequence, remarkSentence } from './remark-words.js';
import { spareWaysLines } from './spare-ways-lines.js';
import { countDuties, NO_PERMISSION, verdictWords } from './verdict-words.js';

const LABEL_WIDTH = 26;
const LINE_WIDTH = 96;

/**
 * The answer of `plan` or `assess` for a terminal.
 * @param outcome the plan or judgement
 * @returns lines of plain text, ending in a line end
 */
export function resultReport(outcome: Outcome): string {
  const { result, site, zone } = outcome;
  const { requirement, operation, network } = result;
  const target = formatNumber(requirement.targetPowerFactor, 'given');
  const count = countDuties(result.duties);
  const factor = (value: number | null) => formatQuantity(value, '');
  const lowest = operation.months.flatMap(({ powerFactorLagging: value }) => (value === null ? [] : [value]));
  const lines = [
    plainName(site.name),
    `Proposed: ${proposedWords(outcome)}`,
    `Verdict: ${verdictWords(result.verdict)}. ${NO_PERMISSION}`,
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
    row(
      'fault level at the bus',
      `${formatQuantity(network.shortCircuitMva, 'MVA')}, ${formatQuantity(network.shortCircuitMinMva, 'MVA')} at the least`,
    ),
    row(
      'rows judged',
      `${count.judged}: ${count.clear} within limits, ${count.watch} near a limit, ${count.avoid} over; ${count.notJudged} not judged`,
    ),
    '',
    ...moneyRows(outcome),
    ...spareRows(outcome),
    ...dutyLines(outcome),
    ...deviceLines(outcome),
    ...reasonLines(outcome),
  ];
  return finished(lines);
}

/**
 * What a meter file holds, for a terminal.
 * @param summary of the record
 * @param zone the clock of its stamps; UTC where none is known
 * @returns lines of plain text, ending in a line end
 */
export function recordReport(summary: RecordSummary, zone: ZoneTable = UTC_TABLE): string {
  const notes = summary.notes.flatMap((note) => wrapped(`note: ${remarkSentence(note)}`, '  '));
  return finished([...recordLines(summary, zone), ...notes]);
}

/**
 * The scan of one level in every corner, for a terminal.
 * @param levels one entry a corner, nominal first
 * @returns a table of plain text, ending in a line end
 */
export function scanReport(levels: readonly ScannedLevel[]): string {
  const first = levels[0];
  if (first === undefined) return '';
  const severalBuses = levels.some(({ bus }) => bus !== first.bus);
  const severalStandings = levels.some(({ corner }) => corner.standing !== undefined);
  const head = [
    ...(severalBuses ? ['bus'] : []),
    'fault level',
    'capacitance',
    'inductance',
    'damping',
    'peak at order',
    'peak',
    ...(severalStandings ? ['standing'] : []),
  ];
  const rows = levels.map(({ bus, corner, parallelOrderH, peakOhm }) => [
    ...(severalBuses ? [plainName(bus)] : []),
    formatQuantity(corner.faultLevelMva, 'MVA', 'given'),
    `× ${formatNumber(corner.capacitanceFactor, 'given')}`,
    `× ${formatNumber(corner.inductanceFactor, 'given')}`,
    formatQuantity(corner.dampingKw, 'kW'),
    formatQuantity(parallelOrderH, ''),
    formatQuantity(peakOhm, 'Ω'),
    ...(severalStandings ? [plainName(corner.standing ?? 'normal')] : []),
  ]);
  const widths = head.map((text, at) => Math.max(text.length, ...rows.map((cells) => cells[at]!.length)));
  const line = (cells: readonly string[]) => cells.map((cell, at) => cell.padStart(widths[at]!)).join('  ');
  return finished([
    `Impedance at ${severalBuses ? 'each bus' : 'the bus'} with ${formatQuantity(first.levelKvar, 'kvar')} connected; the first row is the nominal case.`,
    line(head),
    ...rows.map(line),
  ]);
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
  ];
}

function moneyRows(outcome: Outcome): string[] {
  const lines = moneyLines(outcome);
  return lines.length === 0 ? [] : [...lines.map(({ label, text }) => row(label, text)), ''];
}

function spareRows(outcome: Outcome): string[] {
  const lines = spareWaysLines(outcome);
  return lines.length === 0 ? [] : [...lines.map((text, k) => row(k === 0 ? 'room for more stages' : '', text)), ''];
}

function dutyLines({ result }: Outcome): string[] {
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
function deviceLines(outcome: Outcome): string[] {
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

function reasonLines({ result }: Outcome): string[] {
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

function wrapped(text: string, indent: string): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    if (line !== '' && line.length + 1 + word.length > LINE_WIDTH) {
      lines.push(line);
      line = `${indent}${word}`;
    } else line = line === '' ? word : `${line} ${word}`;
  }
  return [...lines, line];
}

function finished(lines: readonly string[]): string {
  return `${lines.join('\n').trimEnd()}\n`;
}
