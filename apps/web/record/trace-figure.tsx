import { useEffect, useMemo, useRef, useState } from 'react';
import { formatNumber } from '#libs/present/format-number.js';
import { formatMoment } from '#libs/present/local-stamp.js';
import type { RecordShown } from '../api/shown.js';
import type { Trace } from '../desk/look.js';
import { ChartFigure, type Figured } from '../draw/chart-figure.js';
import { useOnPaper } from '../draw/on-paper.js';
import { usePlotWidth } from '../draw/plot-size.js';
import { useTheme } from '../theme.js';
import { drawTrace, type TraceView } from './draw-trace.js';
import { TracePyramid } from './trace-pyramid.js';
import { tracePicture, traceRows } from './trace-rows.js';

const HEIGHT = 240;
const DAY_S = 86_400;
/** Rows of the table, and strokes of the drawing that is saved. */
const MOST_ROWS = 96;
const MOST_STROKES = 800;
/** The table follows the picture once it has rested [ms]. */
const REST_MS = 300;

/** The record itself, from the year to single intervals: the wheel zooms, dragging moves, arrow keys do both. */
export function TraceFigure({
  record,
  trace,
  dayS,
}: {
  record: RecordShown;
  trace: Trace | null;
  /** beginning of a day that was picked [s] */
  dayS: number | null;
}) {
  const [place, width] = usePlotWidth();
  const [view, setView] = useState<TraceView | null>(null);
  const figure = useMemo(() => figureOf(record, trace, view), [record, trace, view]);
  const shown = view ?? { from: 0, to: trace?.activeKw.length ?? 0 };
  return (
    <ChartFigure
      figure={figure}
      steps={false}
      picture={() =>
        trace === null ? '' : tracePicture(traceRows(trace, shown, MOST_STROKES), figure.finding, trace.zone)
      }
    >
      <div ref={place} style={{ minHeight: HEIGHT }}>
        {trace === null || width === 0 ? null : (
          <TraceCanvas key={record.id} {...{ trace, record, width, dayS }} onRest={setView} />
        )}
      </div>
    </ChartFigure>
  );
}

/** What the picture shows as a figure, its table that of the stretch in view. */
function figureOf(record: RecordShown, trace: Trace | null, view: TraceView | null): Figured {
  const rows = trace === null ? [] : traceRows(trace, view ?? { from: 0, to: trace.activeKw.length }, MOST_ROWS);
  const end = (pair: readonly [number, number] | null, at: 0 | 1) => (pair === null ? '–' : formatNumber(pair[at]));
  const heads = ['begins', 'intervals', 'least kW', 'most kW', 'least kvar', 'most kvar'];
  return {
    id: 'trace',
    finding: 'The record, down to its intervals',
    caption: `Above kW, below kvar, lagging up. The wheel zooms, dragging moves; by keyboard + and − zoom, arrows move. Times are the site’s. ${marksWords(record)}`,
    sentence: `Active and reactive power over ${formatNumber(record.record.intervals, 'given')} intervals; the table holds the least and the most of each stretch in view.`,
    table: {
      columns: heads.map((head, at) => ({ head, right: at > 0 })),
      rows: rows.map(({ beginS, read, kw, kvar }) => [
        trace === null ? '' : formatMoment(trace.zone, beginS),
        formatNumber(read, 'given'),
        end(kw, 0),
        end(kw, 1),
        end(kvar, 0),
        end(kvar, 1),
      ]),
    },
  };
}

/** What is marked in the picture, and what of it could not be placed. */
function marksWords({ quality, record: { missing } }: RecordShown): string {
  const words = [
    missing > 0 ? 'Hatched: no reading.' : '',
    quality.suspectZeroCount > 0 ? 'Underlined: zeros that may be none.' : '',
    quality.repaired > 0 ? 'What was repaired is counted by month below.' : '',
  ];
  return words.filter((word) => word !== '').join(' ');
}

function suspectSlots({ firstS, intervalS }: Trace, { quality }: RecordShown): [number, number][] {
  return quality.suspectZeros.map(({ beginS, endS }) => [(beginS - firstS) / intervalS, (endS - firstS) / intervalS]);
}

/** What keys do: by how many eighths of the view they move it, and by how much they zoom. */
const STEPS: Readonly<Record<string, number>> = { ArrowLeft: -1, ArrowRight: 1 };
const ZOOMS: Readonly<Record<string, number>> = { '+': 1 / 1.5, '-': 1.5 };

/** Where a key leads from a view, null for a key that does nothing. */
function keyed(key: string, { from, to }: TraceView): { from: number; span: number } | null {
  const span = to - from;
  const factor = ZOOMS[key];
  const eighths = STEPS[key];
  if (factor !== undefined) return { from: from + (span * (1 - factor)) / 2, span: span * factor };
  return eighths === undefined ? null : { from: from + (eighths * span) / 8, span };
}

/** Says the last view once no other has come for a while. */
function useRested(onRest: (view: TraceView) => void): (view: TraceView) => void {
  const timer = useRef(0);
  useEffect(() => () => clearTimeout(timer.current), []);
  return (view) => {
    clearTimeout(timer.current);
    timer.current = window.setTimeout(() => onRest(view), REST_MS);
  };
}

interface TraceCanvasProps {
  trace: Trace;
  record: RecordShown;
  width: number;
  dayS: number | null;
  /** the picture stands still on this stretch */
  onRest: (view: TraceView) => void;
}

function TraceCanvas({ trace, record, width, dayS, onRest }: TraceCanvasProps) {
  const canvas = useRef<HTMLCanvasElement | null>(null);
  const words = useRef<HTMLParagraphElement | null>(null);
  const [pyramids] = useState(() => ({
    kw: new TracePyramid(trace.activeKw),
    kvar: new TracePyramid(trace.reactiveKvar),
  }));
  const [suspect] = useState(() => suspectSlots(trace, record));
  const n = trace.activeKw.length;
  const view = useRef<TraceView>({ from: 0, to: n });
  const rested = useRested(onRest);
  const theme = useTheme();
  const isOnPaper = useOnPaper();
  const draw = () => {
    if (canvas.current === null || words.current === null) return;
    drawTrace(canvas.current, { trace, ...pyramids, suspect, view: view.current, width, height: HEIGHT });
    const momentOf = (slot: number) => formatMoment(trace.zone, trace.firstS + Math.round(slot) * trace.intervalS);
    words.current.textContent = `${momentOf(view.current.from)} to ${momentOf(view.current.to)}`;
  };
  // biome-ignore lint/correctness/useExhaustiveDependencies: drawn again for another width, theme or paper
  useEffect(draw, [width, theme, isOnPaper, trace]);
  // biome-ignore lint/correctness/useExhaustiveDependencies: a day that is picked is shown once
  useEffect(() => {
    if (dayS !== null) show((dayS - trace.firstS) / trace.intervalS, DAY_S / trace.intervalS);
  }, [dayS]);
  const show = (from: number, span: number) => {
    const kept = Math.max(Math.min(48, n), Math.min(n, span));
    const start = Math.max(0, Math.min(n - kept, from));
    view.current = { from: start, to: start + kept };
    requestAnimationFrame(draw);
    rested(view.current);
  };
  const zoom = (factor: number, at: number) => {
    const { from, to } = view.current;
    const span = (to - from) * factor;
    show(from + (to - from - span) * at, span);
  };
  useEffect(() => {
    const element = canvas.current;
    const wheel = (event: WheelEvent) => {
      event.preventDefault();
      zoom(event.deltaY > 0 ? 1.2 : 1 / 1.2, event.offsetX / width);
    };
    element?.addEventListener('wheel', wheel, { passive: false });
    return () => element?.removeEventListener('wheel', wheel);
  });
  const drag = useRef<{ x: number; from: number } | null>(null);
  return (
    <>
      <canvas
        ref={canvas}
        tabIndex={0}
        role="img"
        aria-label="The record's kW and kvar over time; + and − zoom, arrow keys move"
        style={{ width, height: HEIGHT, display: 'block', cursor: 'grab', touchAction: 'pan-y' }}
        onPointerDown={(event) => {
          event.currentTarget.setPointerCapture(event.pointerId);
          drag.current = { x: event.clientX, from: view.current.from };
        }}
        onPointerMove={({ clientX }) => {
          if (drag.current === null) return;
          const span = view.current.to - view.current.from;
          show(drag.current.from - ((clientX - drag.current.x) / width) * span, span);
        }}
        onPointerUp={() => {
          drag.current = null;
        }}
        onKeyDown={(event) => {
          const next = keyed(event.key, view.current);
          if (next === null) return;
          show(next.from, next.span);
          event.preventDefault();
        }}
      />
      <p className="caption num" ref={words} />
    </>
  );
}
