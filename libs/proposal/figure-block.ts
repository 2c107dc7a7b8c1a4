import type { Chart } from '#libs/present/chart.js';
import { say } from '#libs/present/language.js';
import { drawChart } from './draw-chart.js';
import { SOFT } from './ink.js';
import { LABEL, leading, type Paper, STRONG } from './paper.js';
import { type Column, drawTable } from './table.js';
import { BODY, type Line, type Piece, type Style } from './typesetter.js';

const HEAD: Style = { ...STRONG, size: 9.2 };
const ROW_PADDING = 1.6;
const TABLE: Style = { ...BODY, size: 8.6 };

/** A figure to be set, with the number it goes by. */
export interface Numbered {
  number: string;
  chart: Chart;
}

/** Where a figure stands: left edge and width [pt]. */
export interface Span {
  x: number;
  width: number;
}

/**
 * The lines above a figure: number and finding, then what is drawn.
 * @returns lines broken for the width
 */
export function captionLines(paper: Paper, { number, chart }: Numbered, width: number): Line[] {
  const caption: Piece = { text: chart.caption, weight: 'regular', ink: SOFT };
  return paper.type.wrap([say`Figure ${number}\u00a0\u00a0 ${chart.finding}. `, caption], HEAD, width);
}

/** Draws lines above a figure from a top edge. */
export function drawCaption(paper: Paper, lines: readonly Line[], at: { x: number; y: number }): void {
  paper.tagged('Caption', () => paper.lines(lines, HEAD, at));
}

/** Height of one caption line [pt]. */
export const CAPTION_LEADING = leading(HEAD);

/**
 * Draws figures beside each other, their captions above and plots level with each other.
 * @param spans left edge and width of each
 * @param height of the plots [pt]
 */
export function drawFigures(paper: Paper, figures: readonly Numbered[], spans: readonly Span[], height: number): void {
  const captions = figures.map((figure, at) => captionLines(paper, figure, spans[at]!.width));
  const captionHeight = Math.max(...captions.map((lines) => lines.length)) * CAPTION_LEADING;
  paper.need(captionHeight + height + 8);
  const top = paper.y;
  figures.forEach(({ chart }, at) => {
    const span = spans[at]!;
    drawCaption(paper, captions[at]!, { x: span.x, y: top });
    drawChart(paper, chart, { ...span, y: top + captionHeight + 2, height });
  });
  paper.y = top + captionHeight + height + 8;
}

/** The table of a figure, in small type. */
export function drawChartTable(paper: Paper, chart: Chart, span?: Span): void {
  const columns: Column[] = chart.table.columns.map(({ head, right }, at) => ({
    head,
    share: at === 0 ? 1.2 : 1,
    align: right ? 'right' : 'left',
  }));
  drawTable(paper, columns, chart.table.rows, { style: TABLE, padding: ROW_PADDING, ...span });
}

/**
 * Draws a figure with its table to the right of it, so that neither is left alone on a page.
 * @param share of the width that the figure takes
 * @param height of the plot [pt]
 */
export function drawFigureBeside(paper: Paper, figure: Numbered, share: number, height: number): void {
  const gutter = 22;
  const left = { x: paper.left, width: share * paper.width - gutter / 2 };
  const right = { x: left.x + left.width + gutter, width: paper.width - left.width - gutter };
  const rowHeight = leading(TABLE) + 2 * ROW_PADDING;
  const tableHeight = figure.chart.table.rows.length * rowHeight + 2 * leading(LABEL) + 6;
  const lines = captionLines(paper, figure, paper.width);
  const captionHeight = lines.length * CAPTION_LEADING + 4;
  const body = Math.max(height, Math.min(tableHeight, 420));
  paper.need(captionHeight + body + 10);
  const top = paper.y;
  drawCaption(paper, lines, { x: paper.left, y: top });
  drawChart(paper, figure.chart, { ...left, y: top + captionHeight, height });
  const page = paper.doc.bufferedPageRange().count;
  paper.y = top + captionHeight + 6;
  drawChartTable(paper, figure.chart, right);
  // a table that ran on to another page ends lower than its figure, there
  if (paper.doc.bufferedPageRange().count === page) paper.y = Math.max(paper.y, top + captionHeight + height);
  paper.y += 8;
}

/** Two spans of equal width across the page. */
export function halves(paper: Paper, gutter = 20): [Span, Span] {
  const width = (paper.width - gutter) / 2;
  return [
    { x: paper.left, width },
    { x: paper.left + width + gutter, width },
  ];
}
