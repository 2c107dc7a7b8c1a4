import type { BillBounds, EquipmentRow, EstimateOutcome } from '#libs/engine/index.js';
import { estimateSpan } from '#libs/present/estimate-words.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { say, words } from '#libs/present/language.js';
import { formatMonth } from '#libs/present/local-stamp.js';
import { plainName } from '#libs/present/plain-name.js';
import { NOTE, type Paper } from './paper.js';
import { type Column, drawTable } from './table.js';
import { BODY, type Style } from './typesetter.js';

const SMALL: Style = { ...BODY, size: 9 };

const BILL_COLUMNS: Column[] = words([
  { head: 'bill', share: 22 },
  { head: 'kWh', share: 15, align: 'right' },
  { head: 'kvarh', share: 15, align: 'right' },
  { head: 'power factor', share: 15, align: 'right' },
  { head: 'greatest kW', share: 15, align: 'right' },
  { head: 'kvar then', share: 14, align: 'right' },
  { head: 'lower bound', share: 15, align: 'right' },
  { head: 'upper bound', share: 15, align: 'right' },
]);

const LIST_COLUMNS: Column[] = words([
  { head: 'equipment', share: 30 },
  { head: 'number', share: 10, align: 'right' },
  { head: 'rated kW', share: 12, align: 'right' },
  { head: 'efficiency', share: 13, align: 'right' },
  { head: 'power factor', share: 14, align: 'right' },
  { head: 'load factor', share: 13, align: 'right' },
  { head: 'coincidence', share: 20, align: 'right' },
  { head: 'kW', share: 12, align: 'right' },
  { head: 'kvar', share: 12, align: 'right' },
]);

/** What stands in place of the record: bills with their bounds, the equipment list with its sums. */
export function drawEstimate(paper: Paper, outcome: EstimateOutcome): void {
  const { months, equipment } = outcome.result.estimate;
  paper.heading('5', say`Data: an estimate from ${estimateSpan(outcome)}`);
  paper.paragraph([say`There is no record of the load. Every figure of need on this paper is an estimate.`]);
  if (months.length > 0) {
    drawTable(paper, BILL_COLUMNS, months.map(billRow), { style: SMALL, padding: 2, after: 4 });
    paper.paragraph(
      [
        say`Bounds in kvar. Lower: the constant kvar that lifts the month’s power factor to the target; no smaller bank can.
          Upper: the kvar at the greatest demand, if that had the month’s power factor. Section 6 shows each with its working.`,
      ],
      { style: NOTE },
    );
  }
  if (equipment !== null) {
    drawTable(paper, LIST_COLUMNS, equipment.rows.map(equipmentRow), { style: SMALL, padding: 2, after: 4 });
    paper.paragraph([
      say`The list comes to ${formatQuantity(equipment.activeKw, 'kW')} and ${formatQuantity(equipment.reactiveKvar, 'kvar')},
        power factor ${formatQuantity(equipment.powerFactor, '')}; for the target it needs ${formatQuantity(equipment.neededKvar, 'kvar')}.`,
    ]);
  }
}

function billRow(bounds: BillBounds): string[] {
  return [
    formatMonth(bounds.month),
    formatNumber(bounds.activeKwh, 'given'),
    formatNumber(bounds.laggingKvarh, 'given'),
    formatNumber(bounds.powerFactorLagging),
    formatNumber(bounds.maxKw, 'given'),
    formatNumber(bounds.peakKvar),
    formatNumber(bounds.lowerKvar),
    formatNumber(bounds.upperKvar),
  ];
}

function equipmentRow(row: EquipmentRow): string[] {
  return [
    plainName(row.name),
    formatNumber(row.count, 'given'),
    formatNumber(row.ratedKw, 'given'),
    formatQuantity(row.efficiencyPct, '%', 'given'),
    formatNumber(row.powerFactor, 'given'),
    formatNumber(row.loadFactor, 'given'),
    formatNumber(row.coincidence, 'given'),
    formatNumber(row.activeKw),
    formatNumber(row.reactiveKvar),
  ];
}

/** In place of the load before and after: what an estimate can't support. */
export function drawLeftOut(paper: Paper, outcome: EstimateOutcome): void {
  const { refused } = outcome.result.estimate;
  paper.heading('8', say`Load before and after: left out, since there is no record`);
  drawTable(
    paper,
    [{ head: say`what this paper does not say`, share: 1 }],
    refused.map(({ text }) => [text]),
  );
}
