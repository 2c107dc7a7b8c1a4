import type { BankOutcome, NetworkLevel } from '#libs/engine/index.js';
import { standingWords } from '#libs/present/duty-bars.js';
import { engineName } from '#libs/present/engine-name.js';
import { dutyName } from '#libs/present/figure-words.js';
import { countWord } from '#libs/present/findings.js';
import { formatApart, formatNumber, formatQuantity, GAP } from '#libs/present/format-number.js';
import { impedanceOverOrder } from '#libs/present/impedance-over-order.js';
import { say, words } from '#libs/present/language.js';
import { marginMap } from '#libs/present/margin-map.js';
import { plainName } from '#libs/present/plain-name.js';
import { bankName } from '#libs/present/proposed-words.js';
import { countDuties, type DutyCount, verdictWords } from '#libs/present/verdict-words.js';
import { CELL_HEIGHT, cellsHeight, drawCellKey, drawCells } from './draw-cells.js';
import {
  CAPTION_LEADING,
  captionLines,
  drawCaption,
  drawFigures,
  halves,
  type Numbered,
  type Span,
} from './figure-block.js';
import { drawVerdictMark } from './marks.js';
import { NOTE, type Paper } from './paper.js';
import { type Cell, type Column, drawTable } from './table.js';
import { BODY, type Style } from './typesetter.js';

const SMALL: Style = { ...BODY, size: 8.6 };
const PLOT_HEIGHT = 186;
/** More levels than this are thinned in maps and lists, keeping those nearest their limits. */
const MOST_LEVELS = 40;
/** Rows of a map that stand beside the rest of the page; longer maps take a page of their own. */
const MAP_ROWS = 24;

/** Impedance, margins, duties and levels; a rival stands beside the bank on the same scales. */
export function drawNetwork(paper: Paper, outcome: BankOutcome): void {
  const { result } = outcome;
  if (result.bank.stages.length === 0) {
    paper.heading('9', say`Network and duties: nothing is connected`);
    paper.paragraph([say`Without a bank there is no level to judge; the network stays as it is.`]);
    drawImpedance(paper, outcome);
    return;
  }
  const words = dutyWords(countDuties(result.duties));
  paper.heading('9', say`Network and duties: ${words}`, { keep: 220 });
  paper.paragraph([networkSentence(outcome)]);
  drawImpedance(paper, outcome);
  drawMargins(paper, outcome);
  drawDuties(paper, outcome);
  drawLevels(paper, outcome);
}

function dutyWords({ avoid, watch }: DutyCount): string {
  const rows = (count: number) => `${countWord(count)} ${count === 1 ? say`row` : say`rows`}`;
  if (avoid > 0) return say`${rows(avoid)} over a limit`;
  return watch > 0 ? say`${rows(watch)} near a limit` : say`every row judged is within its limit`;
}

function networkSentence({ result }: BankOutcome): string {
  const { levels, shortCircuitMva, shortCircuitMinMva } = result.network;
  const present = (levels[0]?.orders ?? []).map(({ orderH }) => formatNumber(orderH, 'given'));
  const peaks = levels
    .filter(({ levelKvar }) => levelKvar > 0)
    .flatMap(({ parallelOrderH }) => (parallelOrderH === null ? [] : [parallelOrderH]));
  const fault = say`The fault level at the bus lies between ${formatQuantity(shortCircuitMinMva, 'MVA')} and ${formatQuantity(shortCircuitMva, 'MVA')}.`;
  const orders = present.length === 0 ? say`No order is present.` : say`Orders present: ${present.join(', ')}.`;
  if (peaks.length === 0) return say`${fault} ${orders} No level makes a peak.`;
  const range = say`${formatNumber(Math.min(...peaks))} and ${formatNumber(Math.max(...peaks))}`;
  return say`${fault} ${orders} Over all levels, nominal and worst case, the parallel resonance lies between order ${range}.`;
}

function drawImpedance(paper: Paper, outcome: BankOutcome): void {
  const { bank, rival } = outcome;
  const own = impedanceOverOrder(outcome, bank, bank.groups.length === 0 ? say`No bank` : bankName(bank.groups));
  const [left, right] = halves(paper);
  if (rival === null) {
    const figure = { number: '9.1', chart: own.chart() };
    drawFigures(paper, [figure], [{ x: paper.left, width: paper.width }], PLOT_HEIGHT);
  } else {
    const other = impedanceOverOrder(outcome, rival.bank, bankName(rival.bank.groups));
    const shared = {
      leastOhm: Math.min(own.scale.leastOhm, other.scale.leastOhm),
      mostOhm: Math.max(own.scale.mostOhm, other.scale.mostOhm),
    };
    const figures = [
      { number: '9.1', chart: own.chart(shared) },
      { number: '9.2', chart: other.chart(shared) },
    ];
    drawFigures(paper, figures, [left, right], PLOT_HEIGHT);
  }
  const key =
    bank.groups.length === 0
      ? say`Dashed: without a bank.`
      : say`Grey: all levels. Heavy line: all stages in. Dashed: no bank. Heavy strokes below: orders present, with windows of ±0.3.
        Strokes above: each level’s peak, heavy inside a window.`;
  paper.paragraph([key], { style: NOTE });
}

function drawMargins(paper: Paper, outcome: BankOutcome): void {
  const { bank, margins, rival } = outcome;
  if (margins.ordersH.length === 0) {
    paper.paragraph([say`No order with a limit is present, so there is no map of margins.`], { style: NOTE });
    return;
  }
  const maps: Numbered[] = [{ number: '9.3', chart: marginMap(margins, bankName(bank.groups), MOST_LEVELS) }];
  if (rival !== null)
    maps.push({ number: '9.4', chart: marginMap(rival.margins, bankName(rival.bank.groups), MOST_LEVELS) });
  const wide = margins.ordersH.length > 9;
  const spans = rival === null || wide ? [{ x: paper.left, width: paper.width }] : halves(paper);
  if (wide) for (const map of maps) drawMaps(paper, [map], spans);
  else drawMaps(paper, maps, spans);
  drawCellKey(paper, { x: paper.left, y: paper.y });
  paper.y += CELL_HEIGHT + 12;
  if (rival === null) return;
  const other = bankName(rival.bank.groups);
  paper.paragraph([
    say`${other}, for comparison: ${verdictWords(rival.verdict)}; harmonic voltage over a limit at ${rival.levelsOver} of ${rival.levelsAll} levels.`,
  ]);
}

/** Maps level with each other, broken over pages where they are long. */
function drawMaps(paper: Paper, maps: readonly Numbered[], spans: readonly Span[]): void {
  const captions = maps.map((map, at) => captionLines(paper, map, spans[at]!.width));
  const captionHeight = Math.max(...captions.map((lines) => lines.length)) * CAPTION_LEADING + 2;
  const total = Math.max(...maps.map(({ chart }) => chart.table.rows.length));
  paper.need(captionHeight + cellsHeight(Math.min(total, MAP_ROWS)) + 20);
  for (const [at, lines] of captions.entries()) drawCaption(paper, lines, { x: spans[at]!.x, y: paper.y });
  paper.y += captionHeight;
  let from = 0;
  while (from < total) {
    const fitting = Math.max(1, Math.floor((paper.rest - cellsHeight(0) - 20) / CELL_HEIGHT));
    const to = Math.min(total, from + fitting);
    maps.forEach(({ chart }, at) => {
      const last = Math.min(to, chart.table.rows.length);
      if (last > from) drawCells(paper, chart, { ...spans[at]!, y: paper.y }, { from, to: last });
    });
    paper.y += cellsHeight(to - from);
    from = to;
    if (from < total) paper.turn();
  }
}

const DUTY_COLUMNS: Column[] = words([
  { head: 'duty', share: 43 },
  { head: 'value', share: 14, align: 'right' },
  { head: 'limit', share: 14, align: 'right' },
  { head: 'share', share: 13, align: 'right' },
  { head: 'met at', share: 16, align: 'right' },
  { head: 'source', share: 28 },
  { head: 'verdict', share: 22 },
]);

function drawDuties(paper: Paper, outcome: BankOutcome): void {
  const { duties } = outcome.result;
  paper.heading('9.5', say`Duties, worst level and corner`, { level: 3 });
  const rows = duties.map((duty): Cell[] => {
    const apart = duty.limit === null ? null : formatApart(duty.value, duty.limit);
    return [
      dutyName(duty),
      `${apart?.value ?? formatNumber(duty.value)}${GAP}${duty.unit}`,
      apart === null ? '–' : `${apart.limit}${GAP}${duty.unit}`,
      duty.ratio === null ? '–' : `${formatApart(100 * duty.ratio, 100).value}${GAP}%`,
      formatQuantity(duty.levelKvar, 'kvar'),
      engineName(duty.source),
      {
        pieces: [verdictWords(duty.verdict)],
        inset: 13,
        draw: ({ x, y, height }) =>
          drawVerdictMark(paper.doc, duty.verdict, { x: x + 4, y: y + height / 2 - 0.4 }, 3.3),
      },
    ];
  });
  drawTable(paper, DUTY_COLUMNS, rows, { style: { ...BODY, size: 8.8 }, padding: 2.4 });
}

const LEVEL_COLUMNS: Column[] = words([
  { head: 'level, kvar', share: 14, align: 'right' },
  { head: 'case', share: 16 },
  { head: 'peak at order', share: 17, align: 'right' },
  { head: 'peak, Ω', share: 12, align: 'right' },
  { head: 'THD of voltage, %', share: 20, align: 'right' },
  { head: 'TDD of current, %', share: 21, align: 'right' },
  { head: 'fault level, C, L, damping', share: 41 },
]);

function drawLevels(paper: Paper, outcome: BankOutcome): void {
  const { levels } = outcome.result.network;
  const shown = levels.length > 2 * MOST_LEVELS ? spread(levels) : levels;
  const severalBuses = levels.some(({ bus }) => bus !== levels[0]!.bus);
  paper.heading('9.6', say`Levels, nominal and worst case`, { level: 3 });
  const rows = shown.map((level) => [
    formatNumber(level.levelKvar),
    engineName(level.case),
    formatQuantity(level.parallelOrderH, ''),
    formatQuantity(level.peakOhm, ''),
    formatNumber(level.voltageDistortionPct),
    formatNumber(level.currentDistortionPct),
    severalBuses ? `${plainName(level.bus)}: ${cornerWords(level)}` : cornerWords(level),
  ]);
  drawTable(paper, LEVEL_COLUMNS, rows, { style: SMALL, padding: 1.5 });
  if (shown.length < levels.length) {
    paper.paragraph(
      [say`${shown.length / 2} of ${levels.length / 2} levels are listed, evenly; the result as JSON holds all.`],
      { style: NOTE },
    );
  }
}

function spread(levels: readonly NetworkLevel[]): NetworkLevel[] {
  const count = levels.length / 2;
  const step = (count - 1) / (MOST_LEVELS - 1);
  return Array.from({ length: MOST_LEVELS }, (_, i) => 2 * Math.round(i * step)).flatMap((at) => [
    levels[at]!,
    levels[at + 1]!,
  ]);
}

function cornerWords({ corner }: NetworkLevel): string {
  const given = (value: number) => formatNumber(value, 'given');
  const own = `${given(corner.faultLevelMva)}${GAP}MVA, × ${given(corner.capacitanceFactor)}, × ${given(corner.inductanceFactor)}, ${formatQuantity(corner.dampingKw, 'kW')}`;
  return [own, ...standingWords(corner)].join(', ');
}
