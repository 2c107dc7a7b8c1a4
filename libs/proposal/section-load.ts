import type { Outcome } from '#libs/engine/index.js';
import { durationCurve } from '#libs/present/duration-curve.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { say } from '#libs/present/language.js';
import { phasors } from '#libs/present/phasors.js';
import { powerFactorByMonth } from '#libs/present/power-factor-by-month.js';
import { worstDay } from '#libs/present/worst-day.js';
import { drawChartTable, drawFigureBeside, drawFigures, halves } from './figure-block.js';
import { NOTE, type Paper } from './paper.js';
import { type Column, drawTable } from './table.js';
import { BODY, type Style } from './typesetter.js';

const SMALL: Style = { ...BODY, size: 8.6 };
/** More levels than this are listed in columns beside each other. */
const MOST_STAGES = 40;

/** The need over the year, the worst day, the currents of one moment, the months: before and after the bank. */
export function drawLoad(paper: Paper, outcome: Outcome): void {
  const { operation, requirement } = outcome.result;
  const target = formatNumber(requirement.targetPowerFactor, 'given');
  paper.heading(
    '8',
    say`Load before and after: in target ${formatQuantity(operation.shareInTargetPct, '%')} of the time`,
    { keep: 240 },
  );
  paper.paragraph([
    say`The target is ${target}. With the bank ${formatQuantity(operation.laggingKvarh, 'kvarh')} lagging and
      ${formatQuantity(operation.leadingKvarh, 'kvarh')} leading are left at the meter. At the bus the residual lies between
      ${formatQuantity(operation.minResidualKvar, 'kvar')} and ${formatQuantity(operation.maxResidualKvar, 'kvar')}.`,
  ]);
  drawFigureBeside(paper, { number: '8.1', chart: durationCurve(outcome) }, 0.58, 182);
  drawFigureBeside(paper, { number: '8.2', chart: powerFactorByMonth(outcome) }, 0.58, 172);
  const day = worstDay(outcome);
  drawFigures(paper, [{ number: '8.3', chart: day }], [{ x: paper.left, width: paper.width }], 190);
  drawChartTable(paper, day);
  drawFigureBeside(paper, { number: '8.4', chart: phasors(outcome) }, 0.54, 196);
  drawWear(paper, outcome);
}

function drawWear(paper: Paper, outcome: Outcome): void {
  const { operation, bank } = outcome.result;
  if (bank.stages.length === 0) return;
  paper.heading('8.5', say`Switchings: ${formatNumber(operation.totalSwitchings, 'whole')} in the record`, {
    level: 3,
  });
  const stages: Column[] = [
    { head: say`stage`, share: 1, align: 'right' },
    { head: 'kvar', share: 1, align: 'right' },
    { head: say`switchings`, share: 1.2, align: 'right' },
  ];
  const hours: Column[] = [
    { head: say`level kvar`, share: 1, align: 'right' },
    { head: say`hours`, share: 1, align: 'right' },
  ];
  const [left, right] = halves(paper);
  const stageRows = operation.switchings
    .slice(0, MOST_STAGES)
    .map((count, at) => [String(at + 1), formatNumber(bank.stages[at]!.effectiveKvar), formatNumber(count, 'whole')]);
  const used = operation.hoursAtLevel.filter(({ hours: length }) => length > 0);
  const hourRows = used
    .slice(0, MOST_STAGES)
    .map(({ levelKvar, hours: length }) => [formatNumber(levelKvar), formatNumber(length)]);
  const rowHeight = 8.6 * 1.38 + 3.2;
  paper.need(Math.max(stageRows.length, hourRows.length) * rowHeight + 24);
  const top = paper.y;
  drawTable(paper, stages, stageRows, { style: SMALL, padding: 1.6, ...left });
  const end = paper.y;
  paper.y = top;
  drawTable(paper, hours, hourRows, { style: SMALL, padding: 1.6, ...right });
  paper.y = Math.max(paper.y, end);
  const idle = operation.hoursAtLevel.length - used.length;
  const notes = [
    ...(idle > 0 ? [say`${idle} ${idle === 1 ? say`level is` : say`levels are`} never used.`] : []),
    ...(used.length > MOST_STAGES || operation.switchings.length > MOST_STAGES
      ? [say`The first ${MOST_STAGES} are listed; the result as JSON holds all.`]
      : []),
  ];
  if (notes.length > 0) paper.paragraph([notes.join(' ')], { style: NOTE });
}
