import { HAIR, INK, STROKE } from './ink.js';
import { LABEL, leading, type Paper, rise } from './paper.js';
import { BODY, type Line, type Piece, type Style } from './typesetter.js';

/** A column: its heading, its width, and how its cells stand. */
export interface Column {
  head: string;
  /** of the width that fixed columns leave */
  share: number;
  /** width [pt], in place of a share */
  fixed?: number;
  align?: 'left' | 'right';
}

/** A cell: text, or text beside something drawn. */
export type Cell = string | readonly Piece[] | DrawnCell;

/** A cell with a drawing at its left edge. */
export interface DrawnCell {
  pieces: readonly Piece[];
  /** width kept for the drawing [pt] */
  inset: number;
  /** @param box cell's left, top and height of its first line [pt] */
  draw(box: { x: number; y: number; width: number; height: number }): void;
}

export interface TableSetting {
  style?: Style;
  /** left edge and width, else the whole page's */
  x?: number;
  width?: number;
  /** above and below the text of a row [pt] */
  padding?: number;
  /** between columns [pt] */
  gutter?: number;
  after?: number;
}

interface Place {
  x: number;
  width: number;
  right: boolean;
}

interface SetCell {
  lines: Line[];
  inset: number;
  draw: DrawnCell['draw'] | null;
}

const GUTTER = 12;

/**
 * A ruled table: heading row repeated on every page it runs over, cells wrapped, rows kept whole.
 * @param columns headings, shares of the width
 * @param rows one cell a column
 */
export function drawTable(
  paper: Paper,
  columns: readonly Column[],
  rows: readonly (readonly Cell[])[],
  setting: TableSetting = {},
): void {
  const style = { ...(setting.style ?? BODY), tabular: false };
  const padding = setting.padding ?? 3.4;
  const places = placeColumns(paper, columns, setting);
  const first = setting.x ?? paper.left;
  const last = first + (setting.width ?? paper.width);
  const head = columns.map((column, at) => paper.type.wrap([column.head], LABEL, places[at]!.width));
  const headHeight = Math.max(...head.map((lines) => lines.length)) * leading(LABEL) + 4;

  const drawHead = (tagged: boolean) => {
    const top = paper.y;
    const put = (at: number) => drawLines(paper, head[at]!, LABEL, { ...places[at]!, inset: 0, top });
    if (tagged) {
      paper.within('TR', () => {
        for (const at of columns.keys()) paper.tagged('TH', () => put(at), { scope: 'Column' });
      });
    } else {
      paper.artifact(() => {
        for (const at of columns.keys()) put(at);
      });
    }
    paper.y += headHeight;
    paper.rule({ from: first, to: last, width: STROKE.load, ink: INK });
  };

  const set = rows.map((row) =>
    row.map((cell, at) => setCell(paper, cell, cellStyle(style, columns[at]!), places[at]!)),
  );
  const heights = set.map((row) => Math.max(...row.map((cell) => cell.lines.length)) * leading(style) + 2 * padding);
  paper.need(headHeight + (heights[0] ?? 0) + (heights[1] ?? 0));
  paper.within('Table', () => {
    drawHead(true);
    set.forEach((row, n) => {
      if (heights[n]! > paper.rest && paper.y > paper.top + headHeight + 1) {
        paper.turn();
        drawHead(false);
      }
      drawRow(paper, row, { columns, places, style, top: paper.y + padding });
      paper.y += heights[n]!;
      paper.rule({ from: first, to: last, width: STROKE.hair, ink: HAIR });
    });
  });
  paper.y += setting.after ?? 8;
}

function cellStyle(style: Style, column: Column): Style {
  return column.align === 'right' ? { ...style, tabular: true } : style;
}

function placeColumns(paper: Paper, columns: readonly Column[], setting: TableSetting): Place[] {
  const gutter = setting.gutter ?? GUTTER;
  const shares = columns.reduce((sum, { share, fixed }) => sum + (fixed === undefined ? share : 0), 0);
  const taken = columns.reduce((sum, { fixed }) => sum + (fixed ?? 0), gutter * (columns.length - 1));
  const free = (setting.width ?? paper.width) - taken;
  let x = setting.x ?? paper.left;
  return columns.map(({ share, fixed, align }) => {
    const width = fixed ?? (free * share) / shares;
    const place = { x, width, right: align === 'right' };
    x += width + gutter;
    return place;
  });
}

function setCell(paper: Paper, cell: Cell, style: Style, place: Place): SetCell {
  if (typeof cell === 'string') return { lines: paper.type.wrap([cell], style, place.width), inset: 0, draw: null };
  if (!('pieces' in cell)) return { lines: paper.type.wrap(cell, style, place.width), inset: 0, draw: null };
  const { pieces, inset, draw } = cell;
  return { lines: paper.type.wrap(pieces, style, place.width - inset), inset, draw };
}

function drawLines(
  paper: Paper,
  lines: readonly Line[],
  style: Style,
  at: Place & { inset: number; top: number },
): void {
  lines.forEach((line, n) => {
    const x = at.right ? at.x + at.width - line.width : at.x + at.inset;
    paper.type.draw(line, x, at.top + n * leading(style) + rise(style));
  });
}

interface RowSetting {
  columns: readonly Column[];
  places: readonly Place[];
  style: Style;
  top: number;
}

function drawRow(paper: Paper, row: readonly SetCell[], { places, style, top }: RowSetting): void {
  paper.within('TR', () => {
    row.forEach((cell, at) => {
      const place = places[at]!;
      if (cell.draw !== null) {
        const box = { x: place.x, y: top, width: place.width, height: leading(style) };
        paper.artifact(() => cell.draw!(box));
      }
      paper.tagged('TD', () => drawLines(paper, cell.lines, style, { ...place, inset: cell.inset, top }));
    });
  });
}
