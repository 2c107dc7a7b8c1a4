import type { Figure, Problem, RecordSummary, Result, Verdict, ZoneTable } from '#libs/engine/index.js';
import type { BarFigure } from '#libs/present/bar-figure.js';
import type { Chart } from '#libs/present/chart.js';
import type { DayReplay } from '#libs/present/day-replay.js';
import type { Finding } from '#libs/present/findings.js';
import type { SingleLine } from '#libs/present/single-line.js';
import type { YearMap } from '#libs/present/year-map.js';
import type { Station } from '../address.js';
import type { SiteDocument } from '../api/shown.js';

/** What the reader has picked. */
export interface Picks {
  /** a moment of the day that is replayed [s] */
  momentS: number | null;
  /** second of that day under the cursor; null: that of the moment [s] */
  cursorS: number | null;
  /** the level drawn heavy [kvar] */
  levelKvar: number | null;
}

/** A site file to be looked at. */
export interface LookAsked {
  document: SiteDocument;
  kind: 'plan' | 'assess';
  station: Station;
  picks: Picks;
  /** quick: what follows the hand, the peaks of |Z| left as they were */
  depth: 'quick' | 'full';
}

/** How firm a verdict is, and its saving as a range: some sixty judgements, had once the hand has rested for longer. */
export type Firmness = Pick<Result, 'assumptions' | 'reactorTrials' | 'robustness' | 'money'>;

/** Charts of the open station; the others' are made when they are opened. */
export interface StationCharts {
  record?: { year: YearMap };
  supply?: { singleLine: SingleLine };
  need?: { target: Chart; duration: Chart; year: YearMap };
  bank?: {
    replay: DayReplay;
    phasors: Chart;
    switchings: BarFigure;
    hours: BarFigure;
    months: Chart;
    names: string[];
    workings: Record<'day' | 'currents' | 'switchings' | 'hours', Figure[]>;
  };
  network?: {
    impedance: Chart;
    margins: Chart;
    rival: {
      name: string;
      impedance: Chart;
      margins: Chart;
      verdict: Verdict;
      workings: Record<'impedance' | 'margins', Figure[]>;
    } | null;
    /** of the picked row of the map */
    marginWorkings: Figure[];
    duties: BarFigure;
    levelsKvar: number[];
  };
}

/** What the engine says of a site file, in words. */
export interface Look {
  depth: 'quick' | 'full';
  result: Result;
  proposed: string;
  findings: Finding[];
  highestV: number;
  charts: StationCharts;
  /** time the engine took [ms] */
  tookMs: number;
}

/** The record on its whole grid for a trace, thinned by nobody. */
export interface Trace {
  /** UTC of the first slot [s] */
  firstS: number;
  /** width of a slot [s] */
  intervalS: number;
  /** a slot without a reading is NaN */
  activeKw: Float32Array;
  reactiveKvar: Float32Array;
  /** stretches of slots without a reading, first and one after the last */
  gaps: [from: number, to: number][];
  /** the site's offsets */
  zone: ZoneTable;
}

export type DeskAsked =
  | { ask: 'open'; ticket: number; columnsUrl: string; summary: RecordSummary; timeZone: string }
  | { ask: 'look'; ticket: number; look: LookAsked }
  | { ask: 'firm'; ticket: number; look: LookAsked }
  | { ask: 'warm'; ticket: number; look: LookAsked }
  | { ask: 'trace'; ticket: number };

export type DeskAnswered =
  | { ticket: number; opened: true }
  | { ticket: number; warm: true }
  | { ticket: number; look: Look }
  | { ticket: number; firm: Firmness }
  | { ticket: number; trace: Trace }
  | { ticket: number; problems: readonly Problem[] }
  | { ticket: number; fault: string };
