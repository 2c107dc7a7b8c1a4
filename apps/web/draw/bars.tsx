import { useId } from 'react';
import type { Figure } from '#libs/engine/index.js';
import type { Bar, BarFigure } from '#libs/present/bar-figure.js';
import { ChartFigure } from './chart-figure.js';
import { textWidth } from './plot-box.js';
import { usePlotWidth } from './plot-size.js';

/** Bars on one scale as a figure; with verdicts, each bar is filled by its own. */
export function Bars({
  figure,
  working,
  workings,
  isWide = false,
}: {
  figure: BarFigure;
  working?: readonly string[];
  workings?: readonly Figure[];
  isWide?: boolean;
}) {
  const [place, width] = usePlotWidth();
  return (
    <ChartFigure figure={figure} working={working} workings={workings}>
      <div ref={place}>
        {width === 0 ? null : isWide ? (
          <DutySvg figure={figure} width={width} />
        ) : (
          <NarrowSvg figure={figure} width={width} />
        )}
      </div>
    </ChartFigure>
  );
}

const ROW = 19;

/** Name, bar, number on one row each. */
function NarrowSvg({ figure, width }: { figure: BarFigure; width: number }) {
  const { bars, to, limit } = figure;
  const left = 34;
  const scale = (width - left - 46) / to;
  const bottom = bars.length * ROW + 6;
  return (
    <svg width={width} height={bottom + 26} aria-hidden="true">
      {bars.map((bar, k) => (
        <g key={bar.name}>
          <text className="axis" x={left - 8} y={k * ROW + 15} textAnchor="end">
            {bar.name}
          </text>
          <rect
            className="fill-wash2 stroke-bank"
            x={left}
            y={k * ROW + 5}
            width={Math.max(0, bar.value * scale)}
            height={11}
          />
          <text x={left + bar.value * scale + 6} y={k * ROW + 15}>
            {bar.text}
          </text>
        </g>
      ))}
      <path className="zero" d={`M${left} 0V${bottom}`} />
      {limit === null ? null : (
        <g>
          <path
            className="stroke-ink"
            strokeWidth="1.4"
            strokeDasharray={limit.dotted ? '1.5 3' : undefined}
            d={`M${left + limit.at * scale} 0V${bottom}`}
          />
          <text className="axis" x={left + limit.at * scale} y={bottom + 16} textAnchor="end">
            {limit.text}
          </text>
        </g>
      )}
    </svg>
  );
}

/** Room for verdict and numbers beside the bars. */
const SIDE = 112;

/** Each duty's own limit is one line across all: unlike units compare. */
function DutySvg({ figure, width }: { figure: BarFigure; width: number }) {
  const { bars, to } = figure;
  const hatch = useId();
  const scale = (width - SIDE) / to;
  const limit = 100 * scale;
  // A name that would run into its verdict takes a line of its own.
  const lead = bars.some(({ name }) => textWidth(name) > width - SIDE) ? 15 : 0;
  const tall = 38 + lead;
  const height = bars.length * tall + 24;
  return (
    <svg width={width} height={height} aria-hidden="true">
      <defs>
        <pattern id={hatch} width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <rect className="fill-watch-wash" width="5" height="5" />
          <path d="M0 0V5" className="stroke-watch" strokeWidth="2.4" />
        </pattern>
      </defs>
      <text className="axis" x={limit} y={11} textAnchor="middle">
        limit
      </text>
      <path className="stroke-ink" strokeWidth="2" d={`M${limit} 16V${height}`} />
      {bars.map((bar, k) => (
        <DutyRow key={bar.name} {...{ bar, hatch, width, scale, to, lead }} y={18 + k * tall} />
      ))}
    </svg>
  );
}

interface DutyRowProps {
  bar: Bar;
  hatch: string;
  width: number;
  scale: number;
  to: number;
  lead: number;
  y: number;
}

function DutyRow({ bar, hatch, width, scale, to, lead, y: top }: DutyRowProps) {
  const y = top + lead;
  const isBroken = bar.value > to;
  const end = Math.min(bar.value, to) * scale;
  const fill = bar.verdict === 'watch' ? `url(#${hatch})` : undefined;
  const look =
    bar.verdict === 'avoid' ? 'fill-avoid' : bar.verdict === 'watch' ? 'stroke-watch' : 'fill-mid stroke-ink';
  return (
    <g>
      <text className="halo" x={0} y={top + 12}>
        {bar.name}
      </text>
      <path className="grid" d={`M0 ${y + 28}H${to * scale}`} />
      <rect className={look} fill={fill} x={0.5} y={y + 18} width={Math.max(0, end - 0.5)} height={8} />
      {isBroken ? <path stroke="var(--sheet)" strokeWidth="1.6" d={`M${end - 12} ${y + 28}l6 -12m0 12l6 -12`} /> : null}
      {bar.nearAt === undefined ? null : (
        <path className="stroke-ink" strokeDasharray="1.5 2" d={`M${bar.nearAt * scale} ${y + 16}v12`} />
      )}
      <path className="stroke-ink" strokeWidth="2" d={`M${100 * scale} ${y + 15}v14`} />
      <MarkAt verdict={bar.verdict ?? null} x={width - 92} y={y + 2} />
      <text x={width} y={y + 12} textAnchor="end" className={bar.verdict === 'clear' ? '' : 'strong'}>
        {bar.text}
      </text>
      <text className="axis" x={width} y={y + 27} textAnchor="end">
        {bar.note}
      </text>
    </g>
  );
}

function MarkAt({ verdict, x, y }: { verdict: Bar['verdict']; x: number; y: number }) {
  if (verdict === 'clear') return <circle className="none stroke-ink" strokeWidth="1.6" cx={x} cy={y + 6} r="4.4" />;
  if (verdict === 'watch') {
    return (
      <g>
        <path className="fill-sheet stroke-watch" d={`M${x} ${y}l6 6-6 6-6-6Z`} />
        <path fill="var(--watch)" d={`M${x} ${y}v12l-6-6Z`} />
      </g>
    );
  }
  if (verdict !== 'avoid') return <path className="stroke-soft" d={`M${x - 5} ${y + 6}h10`} />;
  return (
    <g>
      <rect className="fill-avoid" x={x - 6} y={y} width="12" height="12" />
      <path stroke="var(--on-avoid)" strokeWidth="1.8" d={`M${x - 3.5} ${y + 9.5}l7 -7`} />
    </g>
  );
}
