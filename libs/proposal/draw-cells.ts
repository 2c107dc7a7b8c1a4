import type { CellFill, Chart } from '#libs/present/chart.js';
import { say } from '#libs/present/language.js';
import { HAIR, INK, PAPER, STROKE, WASH } from './ink.js';
import { hatch } from './marks.js';
import type { Paper } from './paper.js';
import { AXIS, type Box, ON_CHART } from './plot-frame.js';
import type { Style } from './typesetter.js';

export const CELL_HEIGHT = 10.6;
const HEAD_HEIGHT = 16;

/**
 * Height of a map of cells.
 * @param rows number of levels
 * @returns height [pt]
 */
export function cellsHeight(rows: number): number {
  return HEAD_HEIGHT + rows * CELL_HEIGHT + 4;
}

/** Which rows of a map stand on one page. */
export interface RowRange {
  from: number;
  to: number;
}

/**
 * Draws the rows of a map of cells as a table for a reading program: the fill says what the number says.
 * @param box left, top and width; the height follows from the rows [pt]
 */
export function drawCells(paper: Paper, chart: Chart, box: Omit<Box, 'height'>, rows: RowRange): void {
  const { doc } = paper;
  const labelWidth = Math.max(...chart.y.ticks.map(({ text }) => paper.type.width([text], AXIS)), 18) + 7;
  const grid = { x: box.x + labelWidth, y: box.y + HEAD_HEIGHT, width: box.width - labelWidth };
  const columns = chart.x.ticks.length;
  const cellWidth = grid.width / columns;
  const cellBox = (row: number, column: number): Box => ({
    x: grid.x + column * cellWidth,
    y: grid.y + (row - rows.from) * CELL_HEIGHT,
    width: cellWidth,
    height: CELL_HEIGHT,
  });
  const size = Math.min(8.6, (cellWidth - 2) / 2.2);
  paper.artifact(() => {
    for (const mark of chart.marks) {
      if (mark.kind !== 'cell' || mark.row < rows.from || mark.row >= rows.to) continue;
      fillCell(paper, mark, cellBox(mark.row, mark.column), size);
    }
    doc
      .lineWidth(STROKE.load)
      .moveTo(grid.x, grid.y)
      .lineTo(grid.x + grid.width, grid.y)
      .stroke(INK);
  });
  const put = (text: string, style: Style, at: Box) => {
    const width = paper.type.width([text], style);
    paper.type.put([text], style, at.x + (at.width - width) / 2, at.y + CELL_HEIGHT - 2.6);
  };
  paper.within('Table', () => {
    paper.within('TR', () => {
      paper.tagged('TH', () => paper.type.put([chart.y.unit], AXIS, box.x, box.y + 11), { scope: 'Column' });
      chart.x.ticks.forEach(({ text }, column) => {
        const style: Style = { ...ON_CHART, size: Math.min(8.6, size + 0.4), weight: 'semibold' };
        paper.tagged('TH', () => put(text, style, { ...cellBox(rows.from, column), y: box.y }), { scope: 'Column' });
      });
    });
    for (let row = rows.from; row < rows.to; row++) {
      paper.within('TR', () => {
        const label = chart.y.ticks[row]!.text;
        const right = grid.x - 6 - paper.type.width([label], AXIS);
        paper.tagged('TH', () => paper.type.put([label], AXIS, right, cellBox(row, 0).y + CELL_HEIGHT - 2.6), {
          scope: 'Row',
        });
        for (const mark of chart.marks) {
          if (mark.kind !== 'cell' || mark.row !== row) continue;
          const style: Style = { ...ON_CHART, size, tabular: true, ink: mark.fill === 'solid' ? PAPER : INK };
          paper.tagged('TD', () => put(mark.text, style, cellBox(row, mark.column)));
        }
      });
    }
  });
}

function fillCell(paper: Paper, { fill, text }: { fill: CellFill; text: string }, box: Box, size: number): void {
  const { doc } = paper;
  if (fill === 'quiet') doc.rect(box.x, box.y, box.width, box.height).fill(WASH);
  if (fill === 'solid') doc.rect(box.x, box.y, box.width, box.height).fill(INK);
  if (fill === 'hatch') {
    hatch(doc, box);
    const width = Math.min(paper.type.width([text], { ...ON_CHART, size, tabular: true }) + 5, box.width);
    doc.rect(box.x + (box.width - width) / 2, box.y, width, box.height).fill(PAPER);
  }
  doc.lineWidth(STROKE.grid).rect(box.x, box.y, box.width, box.height).stroke(HAIR);
}

/**
 * The key of a map's fills, on one line.
 * @param at left edge and top [pt]
 */
export function drawCellKey(paper: Paper, at: { x: number; y: number }): void {
  const entries: [CellFill, string][] = [
    ['blank', say`to 50`],
    ['quiet', say`to 80`],
    ['hatch', say`near the limit, to 100`],
    ['solid', say`over the limit`],
  ];
  paper.tagged('P', () => {
    let x = at.x;
    paper.type.put([say`% of limit`], AXIS, x, at.y + 8);
    x += paper.type.width([say`% of limit`], AXIS) + 12;
    for (const [fill, words] of entries) {
      const box = { x, y: at.y, width: 20, height: CELL_HEIGHT };
      if (fill === 'hatch') hatch(paper.doc, box);
      else if (fill !== 'blank')
        paper.doc.rect(box.x, box.y, box.width, box.height).fill(fill === 'quiet' ? WASH : INK);
      paper.doc.lineWidth(STROKE.grid).rect(box.x, box.y, box.width, box.height).stroke(HAIR);
      paper.type.put([words], AXIS, x + 25, at.y + 8);
      x += 25 + paper.type.width([words], AXIS) + 14;
    }
  });
}
