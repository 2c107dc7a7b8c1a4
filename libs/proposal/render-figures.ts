import type { EstimateOutcome, Outcome } from '#libs/engine/index.js';
import { isEstimate } from '#libs/engine/index.js';
import { billsByMonth } from '#libs/present/bills-by-month.js';
import type { Chart } from '#libs/present/chart.js';
import { durationCurve } from '#libs/present/duration-curve.js';
import { impedanceOverOrder } from '#libs/present/impedance-over-order.js';
import { marginMap } from '#libs/present/margin-map.js';
import { phasors } from '#libs/present/phasors.js';
import { plainName } from '#libs/present/plain-name.js';
import { powerFactorByMonth } from '#libs/present/power-factor-by-month.js';
import { bankName } from '#libs/present/proposed-words.js';
import { singleLine } from '#libs/present/single-line.js';
import { worstDay } from '#libs/present/worst-day.js';
import { cellsHeight, drawCells } from './draw-cells.js';
import { drawChart } from './draw-chart.js';
import { setSingleLine } from './draw-single-line.js';
import { Paper, sheet } from './paper.js';
import { penned, SvgPen, svgFile } from './svg-pen.js';

/** A figure as a file of its own. */
export interface FigureFile {
  /** "single-line", "duration-curve" */
  name: string;
  svg: string;
}

const WIDTH = 505;
const HEIGHT = 240;
const MARGIN = 8;
/** A map shows so many levels, as on paper. */
const MOST_LEVELS = 40;

/**
 * The single-line diagram and the figures of a plan as SVG, drawn by the same functions as on paper.
 * @param outcome the plan or judgement, in words
 * @returns files by name, the diagram first
 */
export async function renderFigures(outcome: Outcome | EstimateOutcome): Promise<FigureFile[]> {
  const { default: PDFDocument } = await import('pdfkit');
  const open = () =>
    new PDFDocument({ size: sheet('A4'), margin: 0, tagged: true, font: null as unknown as string, bufferPages: true });
  const site = plainName(outcome.site.name);
  const charts = chartsOf(outcome).map(([name, chart]) => ({ name, svg: chartSvg(open(), { name, chart }, site) }));
  return [{ name: 'single-line', svg: diagramSvg(open(), outcome, site) }, ...charts];
}

function chartsOf(outcome: Outcome | EstimateOutcome): [string, Chart][] {
  const { bank, margins, result, site } = outcome;
  const name = bank.groups.length === 0 ? 'No bank' : bankName(bank.groups);
  const charts: [string, Chart][] = [];
  if (!isEstimate(outcome)) {
    charts.push(['duration-curve', durationCurve(outcome)], ['power-factor-by-month', powerFactorByMonth(outcome)]);
    charts.push(['worst-day', worstDay(outcome)], ['phasors', phasors(outcome)]);
  }
  charts.push(['impedance', impedanceOverOrder(outcome, bank, name).chart()]);
  if (margins.ordersH.length > 0) charts.push(['margins', marginMap(margins, name, MOST_LEVELS)]);
  const bills = result.money?.bills;
  if (bills !== undefined && bills.before.months.length > 0) charts.push(['bills', billsByMonth(bills, site.papers)]);
  return charts;
}

function diagramSvg(doc: PDFKit.PDFDocument, outcome: Outcome | EstimateOutcome, site: string): string {
  const diagram = singleLine(outcome);
  const pen = new SvgPen('single-line');
  const { height, draw } = setSingleLine(new Paper(penned(doc, pen)), diagram, WIDTH - 2 * MARGIN);
  draw(MARGIN, MARGIN);
  const size = { width: WIDTH, height: height + 2 * MARGIN };
  return svgFile(pen, size, { title: `Single-line diagram, ${site}`, sentence: diagram.sentence });
}

function chartSvg(doc: PDFKit.PDFDocument, { name, chart }: { name: string; chart: Chart }, site: string): string {
  const pen = new SvgPen(name);
  const paper = new Paper(penned(doc, pen));
  const isMap = chart.marks.some(({ kind }) => kind === 'cell');
  const rows = chart.table.rows.length;
  const height = isMap ? cellsHeight(rows) + 2 * MARGIN : HEIGHT;
  const box = { x: MARGIN, y: MARGIN, width: WIDTH - 2 * MARGIN };
  if (isMap) drawCells(paper, chart, box, { from: 0, to: rows });
  else drawChart(paper, chart, { ...box, height: HEIGHT - 2 * MARGIN });
  return svgFile(pen, { width: WIDTH, height }, { title: `${chart.finding}. ${site}`, sentence: chart.sentence });
}
