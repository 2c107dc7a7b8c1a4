import type { Verdict } from '#libs/engine/index.js';
import type { ChartTable } from './chart.js';

/** One bar with its name before and its number behind it. */
export interface Bar {
  name: string;
  value: number;
  text: string;
  /** how it is filled; absent, as the bank's */
  verdict?: Verdict | null;
  /** a dotted stroke: from here on it is near its limit */
  nearAt?: number;
  /** stands under the number */
  note?: string;
}

/** A list of bars on one scale, as data. */
export interface BarFigure {
  id: string;
  finding: string;
  caption: string;
  sentence: string;
  bars: Bar[];
  /** end of the scale; longer bars are drawn broken */
  to: number;
  /** a line across all bars */
  limit: { at: number; text: string; dotted: boolean } | null;
  table: ChartTable;
}
