import type { Chart, Tick } from '#libs/present/chart.js';
import { type PlotBox, textWidth } from './plot-box.js';

/** Grid, zero line, ticks and their words; a chart's unit stands once, above its axis. */
export function ChartAxes({ chart, box }: { chart: Chart; box: PlotBox }) {
  if (chart.equalScales) return <TopAxis chart={chart} box={box} />;
  const zero = chart.y.scale === 'linear' && chart.y.from <= 0 ? 0 : chart.y.from;
  const rows = spaced(
    chart.y.ticks,
    (tick) => box.y(tick.at),
    () => 14,
  );
  const columns = spaced(
    chart.x.ticks,
    (tick) => box.x(tick.at),
    (tick) => textWidth(tick.text) + 6,
  );
  const hasOrders = chart.x.ticks.some(({ strong }) => strong !== undefined);
  return (
    <g>
      {rows.map(({ at, text }) => (
        <g key={at}>
          {at === zero ? null : <path className="grid" d={`M${box.left} ${box.y(at)}H${box.right}`} />}
          <text className="axis" x={box.left - 8} y={box.y(at) + 4} textAnchor="end">
            {text}
          </text>
        </g>
      ))}
      {chart.y.unit === '' ? null : (
        <text className="axis" x={box.left - 8} y={11} textAnchor="end">
          {chart.y.unit}
        </text>
      )}
      <path className="zero" d={`M${box.left} ${box.y(zero)}H${box.right}`} />
      {hasOrders
        ? chart.x.ticks.map(({ at, strong }) => (
            <path
              key={at}
              className={strong ? 'tick heavy' : 'tick'}
              d={`M${box.x(at)} ${box.bottom}v${strong ? 8 : 4}`}
            />
          ))
        : null}
      {columns.map(({ at, text, strong }, k) => (
        <text
          key={at}
          className={strong ? 'strong' : 'axis'}
          x={box.x(at)}
          y={box.bottom + 19}
          textAnchor={k === columns.length - 1 && box.x(at) > box.right - 8 ? 'end' : 'middle'}
        >
          {text}
          {k === columns.length - 1 && chart.x.unit !== '' ? ` ${chart.x.unit}` : ''}
        </text>
      ))}
      {chart.x.label === '' ? null : (
        <text className="axis" x={(box.left + box.right) / 2} y={box.bottom + 36} textAnchor="middle">
          {chart.x.label}
        </text>
      )}
    </g>
  );
}

/** One scale for both directions, drawn along the voltage. */
function TopAxis({ chart, box }: { chart: Chart; box: PlotBox }) {
  const ticks = spaced(
    chart.x.ticks.filter(({ at }) => at > 0),
    (tick) => box.x(tick.at),
    (tick) => textWidth(tick.text) + 24,
  );
  return (
    <g>
      <text className="axis" x={box.left} y={box.y(0) - 7}>
        {chart.x.unit}
      </text>
      {ticks.map(({ at, text }) => (
        <g key={at}>
          <path className="tick" d={`M${box.x(at)} ${box.y(0)}v-4`} />
          <text className="axis" x={box.x(at)} y={box.y(0) - 7} textAnchor="middle">
            {text}
          </text>
          <path
            className="grid none"
            d={`M${box.x(at)} ${box.y(0)}A${box.x(at) - box.x(0)} ${box.x(at) - box.x(0)} 0 0 1 ${box.x(0) + (box.x(at) - box.x(0)) * Math.SQRT1_2} ${box.y(0) + (box.x(at) - box.x(0)) * Math.SQRT1_2}`}
          />
        </g>
      ))}
    </g>
  );
}

/** Ticks whose words stand clear of the one before; strong ones go first. */
function spaced(ticks: readonly Tick[], place: (tick: Tick) => number, width: (tick: Tick) => number): Tick[] {
  const kept: Tick[] = [];
  const clear = (tick: Tick) =>
    kept.every((other) => Math.abs(place(other) - place(tick)) >= (width(other) + width(tick)) / 2);
  for (const tick of [...ticks.filter(({ strong }) => strong), ...ticks.filter(({ strong }) => !strong)]) {
    if (clear(tick)) kept.push(tick);
  }
  return kept.sort((a, b) => a.at - b.at);
}
