/** A stroke on an axis. */
export interface Tick {
  at: number;
  text: string;
  /** drawn heavier: an order that is present */
  strong?: boolean;
}

/** One axis in its own unit; the renderer turns values into places. */
export interface Axis {
  label: string;
  unit: string;
  scale: 'linear' | 'log';
  from: number;
  to: number;
  ticks: Tick[];
}

/** Whose quantity a series or mark shows; each renderer gives every part its own line or fill. */
export type Part = 'site' | 'need' | 'after' | 'bank' | 'without' | 'beyond' | 'limit';

/**
 * A row of values. line: from point to point; stair: each value holds to the next x; wash: filled from `base` up;
 * washStair: the same under a stair; hatch: the same, hatched. NaN leaves a gap.
 */
export interface Series {
  part: Part;
  shape: 'line' | 'stair' | 'wash' | 'washStair' | 'hatch';
  x: ArrayLike<number>;
  y: ArrayLike<number>;
  /** lower edge of a fill, else the axis' lower end */
  base?: ArrayLike<number>;
}

/** Something set on the chart beside its series. */
export type Mark =
  | { kind: 'ring' | 'disc'; x: number; y: number; text?: string; side?: 'left' | 'right' | 'above' | 'below' }
  | { kind: 'window'; from: number; to: number }
  | { kind: 'tick'; x: number; heavy: boolean }
  | { kind: 'label'; x: number; y: number; text: string; side: 'left' | 'right' | 'above' | 'below'; part: Part }
  | { kind: 'level'; y: number; text: string }
  | { kind: 'join'; x: number; from: number; to: number }
  | { kind: 'arrow'; from: [number, number]; to: [number, number]; part: Part }
  | { kind: 'cell'; column: number; row: number; text: string; fill: CellFill };

/** How a cell of a map is filled: blank to 50 % of its limit, quiet to 80, hatched to 100, solid beyond. */
export type CellFill = 'blank' | 'quiet' | 'hatch' | 'solid';

/** The same as words and numbers, already formatted; the first row holds the headings. */
export interface ChartTable {
  columns: { head: string; right: boolean }[];
  rows: string[][];
}

/** A figure as data: what a screen or a paper draws, says and lists. */
export interface Chart {
  id: string;
  /** the finding, which is its heading */
  finding: string;
  /** what is drawn */
  caption: string;
  /** the whole in words, for who cannot see it */
  sentence: string;
  x: Axis;
  y: Axis;
  /** one length is one quantity on both axes */
  equalScales: boolean;
  series: Series[];
  marks: Mark[];
  table: ChartTable;
}
