import { useId } from 'react';
import { BEYOND_CELL, GAP_CELL, legendOf, type YearMap } from '#libs/present/year-map.js';
import { ChartFigure } from './chart-figure.js';
import { textWidth } from './plot-box.js';
import { usePlotWidth } from './plot-size.js';

const ROWS = 24;
const LEFT = 34;
const TOP = 24;

/** A record by day and hour; the months below share its columns. */
export function YearFigure({
  map,
  working,
  onDay,
}: {
  map: YearMap;
  working?: readonly string[];
  /** a day was picked, counted from the record's first */
  onDay?: (day: number) => void;
}) {
  const [place, width] = usePlotWidth();
  return (
    <ChartFigure figure={map} working={working}>
      <div ref={place} className="year">
        {width === 0 ? null : <YearSvg map={map} width={width} onDay={onDay} />}
      </div>
    </ChartFigure>
  );
}

function YearSvg({ map, width, onDay }: { map: YearMap; width: number; onDay: ((day: number) => void) | undefined }) {
  const hatch = useId();
  const cell = (width - LEFT) / map.days;
  const row = width < 480 ? 5 : 8;
  const bottom = TOP + ROWS * row;
  const fits = width >= 620;
  const height = bottom + 42 + (fits ? map.table.columns.length * 20 - 12 : 0);
  // Names that would touch each other are told by their first letter.
  const isTight = map.months.some(({ name, from, to }) => to - from > 27 && (to - from) * cell < textWidth(name) + 10);
  const steps = [...new Set(map.cells)].sort((a, b) => a - b);
  return (
    <svg
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      aria-hidden="true"
      onClick={({ clientX, currentTarget }) => {
        const day = Math.floor((clientX - currentTarget.getBoundingClientRect().left - LEFT) / cell);
        if (day >= 0 && day < map.days) onDay?.(day);
      }}
    >
      <defs>
        <pattern id={hatch} width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <path d="M0 0V5" className="stroke-soft" strokeWidth="1" />
        </pattern>
      </defs>
      <path className="zero" d={`M${LEFT} ${TOP}H${width}`} />
      {[0, 6, 12, 18, 24].map((hour) => (
        <g key={hour}>
          <path className="tick" d={`M${LEFT - 4} ${TOP + hour * row}h4`} />
          <text className="axis" x={LEFT - 8} y={TOP + hour * row + 4} textAnchor="end">
            {String(hour).padStart(2, '0')}
          </text>
        </g>
      ))}
      {steps.map((step) => (
        <path
          key={step}
          className={step === BEYOND_CELL ? 'cell-beyond' : `cell-${step}`}
          fill={step === GAP_CELL ? `url(#${hatch})` : undefined}
          d={cellsPath(map, step, { cell, row })}
        />
      ))}
      <path className="beyond-edge" d={beyondEdge(map, { cell, row })} />
      {map.months.map(({ name, from, to }) => (
        <g key={`${name}${from}`}>
          {from === 0 ? null : <path className="month" d={`M${LEFT + from * cell} ${TOP}V${bottom}`} />}
          <path className="hair" d={`M${LEFT + from * cell} ${TOP - 16}V${TOP}`} />
          {(to - from) * cell < textWidth(isTight ? 'M' : name) + 4 ? null : (
            <text className="axis" x={LEFT + from * cell + 4} y={TOP - 6}>
              {isTight ? name.charAt(0) : name}
            </text>
          )}
        </g>
      ))}
      <YearLegend map={map} y={bottom + 12} width={width} />
      {fits ? <MonthRows map={map} cell={cell} y={bottom + 56} width={width} /> : null}
    </svg>
  );
}

/** Every cell of one step as one path; neighbours in a day are joined. */
function cellsPath(map: YearMap, step: number, { cell, row }: { cell: number; row: number }): string {
  const parts: string[] = [];
  const across = cell.toFixed(2);
  for (let day = 0; day < map.days; day++) {
    let hour = 0;
    while (hour < ROWS) {
      if (map.cells[day * ROWS + hour] !== step) {
        hour++;
        continue;
      }
      let to = hour;
      while (to < ROWS && map.cells[day * ROWS + to] === step) to++;
      parts.push(`M${(LEFT + day * cell).toFixed(2)} ${TOP + hour * row}h${across}v${(to - hour) * row}h-${across}Z`);
      hour = to;
    }
  }
  return parts.join('');
}

/** The outline of what lies beyond the bank. */
function beyondEdge(map: YearMap, { cell, row }: { cell: number; row: number }): string {
  const isBeyond = (day: number, hour: number) =>
    hour >= 0 && hour < ROWS && map.cells[day * ROWS + hour] === BEYOND_CELL;
  const parts: string[] = [];
  for (let day = 0; day < map.days; day++) {
    for (let hour = 0; hour < ROWS; hour++) {
      if (!isBeyond(day, hour)) continue;
      const [x, y] = [(LEFT + day * cell).toFixed(1), TOP + hour * row];
      if (!isBeyond(day, hour - 1)) parts.push(`M${x} ${y}h${cell.toFixed(1)}`);
      if (!isBeyond(day, hour + 1)) parts.push(`M${x} ${y + row}h${cell.toFixed(1)}`);
    }
  }
  return parts.join('');
}

function YearLegend({ map, y, width }: { map: YearMap; y: number; width: number }) {
  const texts = legendOf(map);
  const words = width < 620 ? '' : map.measure;
  const from = width < 620 ? LEFT : LEFT + textWidth(words) + 16;
  const step = Math.min(34, (width - from - 8) / (texts.length + 6));
  const end = from + (texts.length - 1) * step;
  return (
    <g>
      <text className="axis" x={LEFT} y={y + 22}>
        {words}
      </text>
      {texts.slice(0, -1).map((text, at) => (
        <g key={text}>
          <rect className={`cell-${at}`} x={from + at * step} y={y + 12} width={step} height={10} />
          {at % 2 === 0 && from + at * step < end - textWidth(text) - 8 ? (
            <text className="axis" x={from + at * step} y={y + 8} textAnchor="middle">
              {text}
            </text>
          ) : null}
        </g>
      ))}
      <text className="axis" x={end} y={y + 8} textAnchor="middle">
        {texts.at(-1)} {map.unit}
      </text>
      {map.beyond === null ? null : (
        <g>
          <rect className="cell-beyond" x={end} y={y + 12} width={step} height={10} />
          <text className="axis" x={end + step + 6} y={y + 22}>
            beyond the bank
          </text>
        </g>
      )}
    </g>
  );
}

/** Months under their columns. */
function MonthRows({ map, cell, y, width }: { map: YearMap; cell: number; y: number; width: number }) {
  const heads = map.table.columns.slice(1).map(({ head }) => head);
  return (
    <g>
      {heads.map((head, k) => (
        <g key={head}>
          <path className="grid" d={`M0 ${y + k * 20 + 5}H${width}`} />
          <text className="axis" x={0} y={y + k * 20}>
            {head}
          </text>
          {map.months.map(({ name, from, to }, at) => {
            const text = map.table.rows[at]?.[k + 1] ?? '';
            return (to - from) * cell < textWidth(text) ? null : (
              <text
                key={`${name}${from}`}
                x={LEFT + to * cell - 6}
                y={y + k * 20}
                textAnchor="end"
                className={k === heads.length - 1 ? 'strong' : ''}
              >
                {text}
              </text>
            );
          })}
        </g>
      ))}
    </g>
  );
}
