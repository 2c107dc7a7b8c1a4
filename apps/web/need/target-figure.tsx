import type { Chart } from '#libs/present/chart.js';
import { formatNumber } from '#libs/present/format-number.js';
import { useDesk } from '../desk/use-desk.js';
import { ChartFigure } from '../draw/chart-figure.js';
import { ChartSvg } from '../draw/chart-svg.js';
import { plotBox } from '../draw/plot-box.js';
import { usePlotWidth } from '../draw/plot-size.js';
import { valueAt } from '../field/document-path.js';
import { QuantityField } from '../field/quantity-field.js';

const HEIGHT = 260;
const PATH = 'target.powerFactor';

/** Needed kvar over the target: the axis is the slider. */
export function TargetFigure({ chart }: { chart: Chart }) {
  const { desk, state } = useDesk();
  const [place, width] = usePlotWidth();
  const typed = valueAt(state.document, PATH);
  const target = typeof typed === 'number' ? typed : 0.95;
  const { from, to } = chart.x;
  const box = width === 0 ? null : plotBox(chart, width, HEIGHT);
  const inRange = Math.min(to, Math.max(from, target));
  return (
    <ChartFigure figure={chart} steps={false} working={['requirement.maxKvar', 'requirement.p99Kvar']}>
      <div ref={place} style={{ minHeight: HEIGHT + 26 }}>
        {box === null ? null : (
          <>
            <ChartSvg chart={chart} width={width} height={HEIGHT} styles={{ site: 'site', after: 'after' }} />
            <Handle box={box} x={box.x(inRange)} text={formatNumber(target, 'given')} />
            <input
              className="handle"
              type="range"
              aria-label="Target power factor"
              aria-valuetext={`target ${formatNumber(target, 'given')}`}
              min={from}
              max={to}
              step={0.005}
              value={inRange}
              style={{ left: box.left - 10, width: box.right - box.left + 20, top: box.bottom - 12 }}
              onChange={({ target: { value } }) => desk.type(PATH, value, { value: Number(value) })}
            />
          </>
        )}
      </div>
      <div className="fields">
        <QuantityField path={PATH} label="target power factor" otherwise="0.95, assumed" />
      </div>
    </ChartFigure>
  );
}

function Handle({ box, x, text }: { box: ReturnType<typeof plotBox>; x: number; text: string }) {
  const isRight = x > (box.left + box.right) / 2;
  return (
    <svg
      className="grip"
      width={box.width}
      height={HEIGHT + 26}
      style={{ position: 'absolute', left: 0, top: 0, pointerEvents: 'none' }}
      aria-hidden="true"
    >
      <path className="stroke-ink" strokeWidth="1.6" d={`M${x} ${box.top - 4}V${box.bottom}`} />
      <rect className="fill-sheet" x={x - 20} y={box.bottom + 2} width={40} height={22} />
      <path className="fill-ink" d={`M${x} ${box.bottom + 1}l8 6v20h-16v-20Z`} />
      <path stroke="var(--sheet)" strokeWidth="1.4" d={`M${x - 3} ${box.bottom + 12}h6m-6 4h6m-6 4h6`} />
      <rect className="fill-sheet" x={isRight ? x - 86 : x + 12} y={box.bottom + 24} width={74} height={18} />
      <text x={isRight ? x - 14 : x + 14} y={box.bottom + 38} textAnchor={isRight ? 'end' : 'start'}>
        target <tspan fontWeight="600">{text}</tspan>
      </text>
    </svg>
  );
}
