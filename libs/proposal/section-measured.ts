import type { BankOutcome } from '#libs/engine/index.js';
import { formatNumber, formatQuantity, formatRange } from '#libs/present/format-number.js';
import { plainName } from '#libs/present/plain-name.js';
import { NOTE, type Paper } from './paper.js';
import { type Column, drawTable } from './table.js';

const COLUMNS: Column[] = [
  { head: 'order', share: 10, align: 'right' },
  { head: 'quantity', share: 16 },
  { head: 'measured', share: 16, align: 'right' },
  { head: 'computed', share: 16, align: 'right' },
  { head: 'over all corners', share: 24, align: 'right' },
  { head: 'difference', share: 14, align: 'right' },
  { head: 'stands', share: 16 },
];

/** A measurement beside the model with the same kvar connected. */
export function drawMeasured(paper: Paper, outcome: BankOutcome): void {
  const { measured } = outcome.result;
  if (measured === null || measured.rows.length === 0) return;
  const off = measured.rows.filter(({ standing }) => standing !== 'within').length;
  const isFit = outcome.site.facts.measured?.use === 'fit';
  const within =
    off === 0 ? 'every reading lies within the model’s corners' : `${off} readings lie outside the model’s corners`;
  const words = isFit ? 'the loads’ currents are fitted to it' : within;
  paper.heading('9.7', `Measured at ${plainName(measured.bus)}: ${words}`, { level: 3 });
  const rows = measured.rows.map((row) => [
    formatNumber(row.orderH, 'given'),
    row.quantity,
    formatQuantity(row.measured, row.unit, 'given'),
    formatQuantity(row.computed, row.unit),
    formatRange({ low: row.low, high: row.high }, row.unit, 'computed'),
    row.differencePct === null ? '–' : formatQuantity(row.differencePct, '%'),
    row.standing,
  ]);
  drawTable(paper, COLUMNS, rows, { after: 4 });
  paper.paragraph(
    [
      `With ${formatQuantity(measured.levelKvar, 'kvar')} connected. A reading is never added to the model’s sources; it ` +
        'stands outside where it passes the corners by more than a tenth.' +
        (isFit ? ' The loads’ currents were scaled to meet it, so that agreement is no check of the model.' : ''),
    ],
    { style: NOTE },
  );
}
