import type { Figure } from '#libs/engine/index.js';
import type { Chart } from '#libs/present/chart.js';
import { ChartFigure } from './chart-figure.js';
import { ChartSvg, type PartStyles } from './chart-svg.js';
import { usePlotWidth } from './plot-size.js';

/** A chart with one scale for both axes needs no more room [px]. */
const SQUARE_PX = 460;

/** A chart of lines as a figure, as wide as its place. */
export function Plot({
  chart,
  height,
  styles,
  working,
  workings,
}: {
  chart: Chart;
  height: number;
  styles?: PartStyles;
  working?: readonly string[];
  workings?: readonly Figure[];
}) {
  const [place, width] = usePlotWidth(chart.equalScales ? SQUARE_PX : undefined);
  return (
    <ChartFigure figure={chart} working={working} workings={workings}>
      <div ref={place} className={chart.equalScales ? 'square' : undefined}>
        {width === 0 ? null : <ChartSvg chart={chart} width={width} height={height} styles={styles} />}
      </div>
    </ChartFigure>
  );
}
