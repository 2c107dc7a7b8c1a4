import { isRecordSign, monthCoverage, type Outcome } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { say } from '#libs/present/language.js';
import { formatLength, formatMoment } from '#libs/present/local-stamp.js';
import { plainName } from '#libs/present/plain-name.js';
import { gradeWords, MONTH_HEADS, monthCells, REPAIRED_HEAD } from '#libs/present/quality-words.js';
import { remarkConsequence } from '#libs/present/remark-words.js';
import type { Paper } from './paper.js';
import { drawTable } from './table.js';

/** What the record holds, what is missing from it, and everything its reader decided. */
export function drawDataQuality(paper: Paper, outcome: Outcome): void {
  const { record } = outcome.result;
  const missing = record.missing === 0 ? say`none missing` : say`${formatNumber(record.missing, 'whole')} missing`;
  paper.heading('5', say`Data quality: ${formatNumber(record.intervals, 'whole')} intervals, ${missing}`);
  const columns = [
    { head: say`of the record`, share: 40 },
    { head: say`value`, share: 26, align: 'right' as const },
    { head: '', share: 40 },
  ];
  paper.paragraph([say`The record is ${gradeWords(record.grade)}. ${record.gradeRule.text}`]);
  drawTable(paper, columns, recordRows(outcome));
  drawCoverage(paper, outcome);
  const asked = record.notes.filter(isRecordSign);
  if (asked.length > 0) {
    const rows = asked.map((note) => [note.text, remarkConsequence(note)]);
    drawTable(
      paper,
      [
        { head: say`what its values ask`, share: 1 },
        { head: say`to be answered before issue`, share: 1 },
      ],
      rows,
    );
  }
  const notes = record.notes.filter((note) => !isRecordSign(note));
  if (notes.length === 0) {
    paper.paragraph([say`The file was read as it stands: nothing was repaired, reordered or left out.`]);
    return;
  }
  drawTable(
    paper,
    [{ head: say`what its reader decided`, share: 1 }],
    notes.map(({ text }) => [text]),
  );
}

/** What a repair filled is counted in the table above; by the month it counts as valid. */
function drawCoverage(paper: Paper, { record, zone }: Outcome): void {
  const heads = MONTH_HEADS.filter((_, at) => at !== REPAIRED_HEAD);
  const columns = heads.map((head, at) => ({
    head,
    share: 1,
    align: at === 0 ? ('left' as const) : ('right' as const),
  }));
  drawTable(paper, columns, monthCoverage(record, zone).map(monthCells));
}

function recordRows({ result, zone }: Outcome): string[][] {
  const { record, requirement } = result;
  const whole = (value: number) => formatNumber(value, 'whole');
  return [
    [say`begins`, formatMoment(zone, record.beginS), plainName(zone.zone)],
    [say`ends`, formatMoment(zone, record.endS), ''],
    [say`length of an interval`, formatQuantity(record.intervalS, 's', 'given'), formatLength(record.intervalS)],
    [say`valid intervals`, whole(record.intervals), ''],
    [say`missing intervals`, whole(record.missing), say`left out, not filled; missing is not zero`],
    [say`repaired intervals`, whole(record.repaired), say`only where a repair was asked for`],
    [say`repeats dropped`, whole(record.duplicates), say`identical rows`],
    [say`energy`, formatQuantity(record.activeKwh, 'kWh'), say`imported`],
    [say`lagging`, formatQuantity(record.laggingKvarh, 'kvarh'), ''],
    [say`leading`, formatQuantity(record.leadingKvarh, 'kvarh'), say`never taken off the lagging`],
    [say`power factor, lagging only`, formatQuantity(record.powerFactorLagging, ''), ''],
    [say`power factor, net`, formatQuantity(record.powerFactorNet, ''), ''],
    [say`greatest demand`, formatQuantity(record.maxKw, 'kW'), ''],
    [say`greatest apparent power`, formatQuantity(record.maxKva, 'kVA'), ''],
    [say`intervals in need`, whole(requirement.intervalsInNeed), say`of ${whole(record.intervals)}`],
    [say`mean need`, formatQuantity(requirement.meanKvar, 'kvar'), ''],
    [say`need: half the time under`, formatQuantity(requirement.p50Kvar, 'kvar'), ''],
    [say`need: 95 % of the time under`, formatQuantity(requirement.p95Kvar, 'kvar'), ''],
    [say`need: 99 % of the time under`, formatQuantity(requirement.p99Kvar, 'kvar'), ''],
    [say`need: at most`, formatQuantity(requirement.maxKvar, 'kvar'), ''],
  ];
}
