import { useEffect, useRef, useState } from 'react';
import { formatMoment } from '#libs/present/local-stamp.js';
import type { RecordShown } from '../api/shown.js';
import type { Trace } from '../desk/look.js';
import { usePlotWidth } from '../draw/plot-size.js';
import { useTheme } from '../theme.js';
import { drawTrace, type TraceView } from './draw-trace.js';
import { TracePyramid } from './trace-pyramid.js';

const HEIGHT = 240;
const DAY_S = 86_400;

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
  return (
    <section className="section" aria-labelledby="trace">
      <h2 id="trace">The record, down to its intervals</h2>
      <p className="caption">
        Above kW, below kvar, lagging up. The wheel zooms, dragging moves; by keyboard + and − zoom, arrows move. Times
        are the site’s. {marksWords(record)}
      </p>
      <div className="plot" ref={place} style={{ minHeight: HEIGHT }}>
        {trace === null || width === 0 ? null : <TraceCanvas key={record.id} {...{ trace, record, width, dayS }} />}
      </div>
    </section>
  );
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

interface TraceCanvasProps {
  trace: Trace;
  record: RecordShown;
  width: number;
  dayS: number | null;
}

function TraceCanvas({ trace, record, width, dayS }: TraceCanvasProps) {
  const canvas = useRef<HTMLCanvasElement | null>(null);
  const words = useRef<HTMLParagraphElement | null>(null);
  const [pyramids] = useState(() => ({
    kw: new TracePyramid(trace.activeKw),
    kvar: new TracePyramid(trace.reactiveKvar),
  }));
  const [suspect] = useState(() => suspectSlots(trace, record));
  const n = trace.activeKw.length;
  const view = useRef<TraceView>({ from: 0, to: n });
  const theme = useTheme();
  const draw = () => {
    if (canvas.current === null || words.current === null) return;
    drawTrace(canvas.current, { trace, ...pyramids, suspect, view: view.current, width, height: HEIGHT });
    const momentOf = (slot: number) => formatMoment(trace.zone, trace.firstS + Math.round(slot) * trace.intervalS);
    words.current.textContent = `${momentOf(view.current.from)} to ${momentOf(view.current.to)}`;
  };
  // biome-ignore lint/correctness/useExhaustiveDependencies: drawn again for another width or theme
  useEffect(draw, [width, theme, trace]);
  // biome-ignore lint/correctness/useExhaustiveDependencies: a day that is picked is shown once
  useEffect(() => {
    if (dayS !== null) show((dayS - trace.firstS) / trace.intervalS, DAY_S / trace.intervalS);
  }, [dayS]);
  const show = (from: number, span: number) => {
    const kept = Math.max(Math.min(48, n), Math.min(n, span));
    const start = Math.max(0, Math.min(n - kept, from));
    view.current = { from: start, to: start + kept };
    requestAnimationFrame(draw);
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
          const span = view.current.to - view.current.from;
          if (event.key === '+') zoom(1 / 1.5, 0.5);
          else if (event.key === '-') zoom(1.5, 0.5);
          else if (event.key === 'ArrowLeft') show(view.current.from - span / 8, span);
          else if (event.key === 'ArrowRight') show(view.current.from + span / 8, span);
          else return;
          event.preventDefault();
        }}
      />
      <p className="caption num" ref={words} />
    </>
  );
}
