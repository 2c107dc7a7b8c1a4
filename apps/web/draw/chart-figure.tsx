import { type ReactNode, useId, useRef, useState } from 'react';
import type { Figure } from '#libs/engine/index.js';
import type { Chart } from '#libs/present/chart.js';
import { useAskedFigure } from '../working/asked-figure.js';
import { WorkingBlock, WorkingBlocks } from '../working/working-block.js';
import { ChartTableView } from './chart-table.js';
import { csvOf, saveText, svgOf } from './save-files.js';

/** What every figure has, whatever it draws. */
export type Figured = Pick<Chart, 'id' | 'finding' | 'caption' | 'sentence' | 'table'>;

/**
 * A figure on the page: its finding as heading, what is drawn, the drawing, and always its table, its working and a way
 * to save it. The drawing can be stepped through by keyboard: each step reads a row of the table.
 */
export function ChartFigure({
  figure,
  working = [],
  workings = [],
  steps = true,
  picture,
  children,
}: {
  figure: Figured;
  /** ids of the figures whose working belongs here */
  working?: readonly string[];
  /** workings of what is drawn alone */
  workings?: readonly Figure[];
  /** false where the drawing has a reach of its own */
  steps?: boolean;
  /** the drawing as a file, where it is none of lines on the page */
  picture?: () => string;
  children: ReactNode;
}) {
  const [opened, setOpen] = useState<'table' | 'working' | 'save' | 'none' | null>(null);
  const asked = useAskedFigure();
  const open = opened ?? (workings.some(({ id }) => id === asked) ? 'working' : null);
  const plot = useRef<HTMLDivElement | null>(null);
  const heading = useId();
  const toggle = (part: typeof open) => setOpen(open === part ? 'none' : part);
  return (
    <section className="section figure" aria-labelledby={heading}>
      <div className="figure-head">
        <div className="plot-head">
          <h2 id={heading}>{figure.finding}</h2>
          <span className="ways">
            <Toggle name="Table" isOpen={open === 'table'} onClick={() => toggle('table')} />
            {working.length + workings.length === 0 ? null : (
              <Toggle name="Working" isOpen={open === 'working'} onClick={() => toggle('working')} />
            )}
            <Toggle name="Save" isOpen={open === 'save'} onClick={() => toggle('save')} />
          </span>
        </div>
        <p className="caption">{figure.caption}</p>
        {open === 'save' ? (
          <SaveWays figure={figure} picture={picture ?? (() => svgOf(plot.current, figure.finding))} />
        ) : null}
      </div>
      <div className="figure-body">
        <div className="plot" ref={plot}>
          <p className="hidden">{figure.sentence}</p>
          {children}
          {steps ? <StepThrough figure={figure} /> : null}
        </div>
        {open === 'working' && working.length > 0 ? <WorkingBlocks ids={working} /> : null}
        {open === 'working' ? workings.map((figure) => <WorkingBlock key={figure.id} figure={figure} />) : null}
        {open === 'table' ? <ChartTableView table={figure.table} name={figure.finding} /> : null}
        <div className="print-only">
          <ChartTableView table={figure.table} name={figure.finding} />
        </div>
      </div>
    </section>
  );
}

function Toggle({ name, isOpen, onClick }: { name: string; isOpen: boolean; onClick: () => void }) {
  return (
    <button type="button" className="way" aria-expanded={isOpen} onClick={onClick}>
      {name}
    </button>
  );
}

function SaveWays({ figure, picture }: { figure: Figured; picture: () => string }) {
  return (
    <p className="row">
      <button type="button" className="way" onClick={() => saveText(`${figure.id}.svg`, 'image/svg+xml', picture())}>
        Save as SVG
      </button>
      <button
        type="button"
        className="way"
        onClick={() => saveText(`${figure.id}.csv`, 'text/csv', csvOf(figure.table))}
      >
        Save as CSV
      </button>
    </p>
  );
}

/** A slider over the rows of the table: arrows step, and each row is read. */
function StepThrough({ figure }: { figure: Figured }) {
  const { rows, columns } = figure.table;
  const [at, setAt] = useState(0);
  const [isReached, setReached] = useState(false);
  if (rows.length === 0) return null;
  const row = rows[Math.min(at, rows.length - 1)]!;
  const words = row.map((text, k) => `${columns[k]?.head ?? ''} ${text}`.trim()).join(', ');
  return (
    <>
      <input
        className="reach"
        type="range"
        aria-label={`Numbers of: ${figure.finding}`}
        aria-valuetext={words}
        min={0}
        max={rows.length - 1}
        value={Math.min(at, rows.length - 1)}
        onChange={({ target }) => setAt(Number(target.value))}
        onFocus={({ target }) => setReached(target.matches(':focus-visible'))}
        onBlur={() => setReached(false)}
      />
      {isReached ? <p className="reading">{words}</p> : null}
    </>
  );
}
