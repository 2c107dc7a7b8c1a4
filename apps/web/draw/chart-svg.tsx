import { useId } from 'react';
import type { Chart, Part, Series } from '#libs/present/chart.js';
import { ChartAxes } from './chart-axes.js';
import { ChartMarks } from './chart-marks.js';
import { linePath, type PlotBox, plotBox, washPath } from './plot-box.js';

/** How the parts of one chart are drawn where it differs from the common way. */
export type PartStyles = Partial<Record<Part, string>>;

const COMMON: Record<Part, string> = {
  site: 'site',
  need: 'need',
  after: 'after',
  bank: 'picked',
  without: 'without',
  beyond: 'site',
  limit: 'limit',
};

/** A chart drawn from its data: axes, series, marks. */
export function ChartSvg({
  chart,
  width,
  height,
  styles = {},
}: {
  chart: Chart;
  width: number;
  height: number;
  styles?: PartStyles;
}) {
  const hatch = useId();
  const box = plotBox(chart, width, height);
  const isFill = ({ shape }: Series) => shape === 'wash' || shape === 'washStair' || shape === 'hatch';
  return (
    <svg width={box.width} height={box.height} viewBox={`0 0 ${box.width} ${box.height}`} aria-hidden="true">
      <defs>
        <pattern id={hatch} width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <path d="M0 0V5" className="stroke-ink" strokeWidth="1.6" />
        </pattern>
      </defs>
      {chart.marks.map((mark) =>
        mark.kind === 'window' ? (
          <rect
            key={mark.from}
            className="window"
            x={box.x(mark.from)}
            y={box.top}
            width={Math.max(1, Math.min(box.right, box.x(mark.to)) - box.x(mark.from))}
            height={box.bottom - box.top}
          />
        ) : null,
      )}
      <ChartAxes chart={chart} box={box} />
      {chart.series.map((series, at) => (isFill(series) ? <Fill key={at} {...{ series, box, hatch }} /> : null))}
      {chart.series.map((series, at) =>
        isFill(series) ? null : (
          <path
            key={at}
            className={`line ${styles[series.part] ?? COMMON[series.part]}`}
            d={linePath(box, series.x, series.y, series.shape === 'stair')}
          />
        ),
      )}
      <ChartMarks chart={chart} box={box} />
    </svg>
  );
}

function Fill({ series, box, hatch }: { series: Series; box: PlotBox; hatch: string }) {
  const { x, y, base, shape } = series;
  const isStair = shape !== 'wash' && shape !== 'hatch';
  const d = washPath(box, { x, y, isStair, ...(base === undefined ? {} : { base }) });
  if (shape === 'hatch') return <path d={d} fill={`url(#${hatch})`} />;
  return (
    <>
      <path d={d} className="wash" />
      <path d={linePath(box, x, y, isStair)} className="edge" />
      {base === undefined || isStair ? null : <path d={linePath(box, x, base)} className="edge" />}
    </>
  );
}
