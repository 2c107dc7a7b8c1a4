import type { Chart, Mark, Part } from '#libs/present/chart.js';
import { ledHeights } from '#libs/present/led-heights.js';
import { type PlotBox, textWidth } from './plot-box.js';

/** Words that lead back to a ring or a disc [px]. */
const LED = { line: 16, above: 4, top: 8 };

type Of<K extends Mark['kind']> = Extract<Mark, { kind: K }>;
type Point = Extract<Mark, { kind: 'ring' | 'disc' }>;
const BANK_DISCS = new Set(['powerFactorByMonth', 'factorSince', 'impedanceOverOrder', 'billsByMonth']);

/** Everything set on a chart beside its series, labels clear of each other. */
export function ChartMarks({ chart, box }: { chart: Chart; box: PlotBox }) {
  const of = <K extends Mark['kind']>(kind: K) => chart.marks.filter((mark): mark is Of<K> => mark.kind === kind);
  const isBank = BANK_DISCS.has(chart.id);
  const points = chart.marks.filter((mark): mark is Point => mark.kind === 'ring' || mark.kind === 'disc');
  return (
    <g>
      {of('join').map(({ x, from, to }) => (
        <path key={x} className="join" d={`M${box.x(x)} ${box.y(from)}V${box.y(to)}`} />
      ))}
      {of('tick').map(({ x, heavy }, at) =>
        x > chart.x.to ? null : (
          <path
            key={at}
            className={heavy ? 'peak heavy' : 'peak'}
            d={`M${box.x(x)} ${box.top - 3}v${heavy ? -7 : -10}`}
          />
        ),
      )}
      {of('arrow').map((mark, at) => (
        <Arrow key={at} {...{ mark, box }} />
      ))}
      {of('label').map((mark, at) => (
        <Label key={at} {...{ mark, box }} />
      ))}
      <Levels marks={of('level')} box={box} />
      {points.map((mark, at) => (
        <circle
          key={at}
          className={`${mark.kind}${isBank && (mark.kind === 'disc' || chart.id === 'impedanceOverOrder') ? ' bank' : ''}`}
          cx={box.x(mark.x)}
          cy={box.y(mark.y)}
          r={mark.kind === 'ring' ? 4 : 3.6}
        />
      ))}
      <PointWords marks={points.filter(({ text }) => text !== undefined)} box={box} />
    </g>
  );
}

const STROKES: Record<Part, { colour: string; width: number }> = {
  site: { colour: 'ink', width: 1.6 },
  after: { colour: 'ink', width: 2.6 },
  bank: { colour: 'bank', width: 2.6 },
  beyond: { colour: 'soft', width: 1.2 },
  need: { colour: 'ink', width: 1.2 },
  without: { colour: 'ink', width: 1.2 },
  limit: { colour: 'ink', width: 1.2 },
};

function Arrow({ mark, box }: { mark: Of<'arrow'>; box: PlotBox }) {
  const { colour, width } = STROKES[mark.part];
  const [x0, y0] = [box.x(mark.from[0]), box.y(mark.from[1])];
  const [x1, y1] = [box.x(mark.to[0]), box.y(mark.to[1])];
  const angle = Math.atan2(y1 - y0, x1 - x0);
  const wing = (turn: number) => `${x1 - 10 * Math.cos(angle + turn)} ${y1 - 10 * Math.sin(angle + turn)}`;
  return (
    <g>
      <path
        className={`stroke-${colour}`}
        strokeWidth={width}
        d={`M${x0} ${y0}L${x1 - 7 * Math.cos(angle)} ${y1 - 7 * Math.sin(angle)}`}
      />
      <path className={`fill-${colour}`} d={`M${x1} ${y1}L${wing(0.32)}L${wing(-0.32)}Z`} />
    </g>
  );
}

function Label({ mark, box }: { mark: Of<'label'>; box: PlotBox }) {
  const { side, part, text } = mark;
  const dx = side === 'right' ? 8 : side === 'left' ? -8 : 0;
  const dy = side === 'above' ? -8 : side === 'below' ? 16 : 4;
  const anchor = side === 'right' ? 'start' : side === 'left' ? 'end' : 'middle';
  const x = Math.min(
    Math.max(box.x(mark.x) + dx, box.left),
    box.width - (anchor === 'middle' ? textWidth(text) / 2 : 0),
  );
  return (
    <text
      className={part === 'bank' ? 'bank' : part === 'beyond' ? 'axis' : ''}
      x={x}
      y={box.y(mark.y) + dy}
      textAnchor={anchor}
    >
      {text}
    </text>
  );
}

/** Level words stand right of the field, the highest and the lowest first. */
function Levels({ marks, box }: { marks: Of<'level'>[]; box: PlotBox }) {
  const kept: Of<'level'>[] = [];
  const byWeight = [marks.at(-1), marks[0], ...marks.slice(1, -1)].filter((mark) => mark !== undefined);
  for (const mark of byWeight) {
    if (kept.every((other) => Math.abs(box.y(other.y) - box.y(mark.y)) >= 16)) kept.push(mark);
  }
  return (
    <g>
      {kept.map(({ y, text }) => (
        <g key={y}>
          <path className="stroke-bank" d={`M${box.right + 2} ${box.y(y)}h5`} />
          <text className="bank" x={box.right + 11} y={box.y(y) + 4}>
            {text}
          </text>
        </g>
      ))}
    </g>
  );
}

/** Words of rings and discs; those to the right lead back to their point. */
function PointWords({ marks, box }: { marks: Point[]; box: PlotBox }) {
  const led = marks.filter(({ side }) => side === 'right');
  const heights = ledHeights(
    led.map(({ y }) => box.y(y)),
    LED,
  );
  return (
    <g>
      {marks.map((mark) => {
        const at = led.indexOf(mark);
        if (at === -1) return <BesideWords key={mark.text} mark={mark} box={box} />;
        return <LedWords key={mark.text} mark={mark} box={box} at={heights[at]!} />;
      })}
    </g>
  );
}

function BesideWords({ mark, box }: { mark: Point; box: PlotBox }) {
  const x = box.x(mark.x);
  const isOut = x - 10 - textWidth(mark.text!) < 0;
  return (
    <text className="halo" x={isOut ? x + 10 : x - 10} y={box.y(mark.y) - 6} textAnchor={isOut ? 'start' : 'end'}>
      {mark.text}
    </text>
  );
}

function LedWords({ mark, box, at }: { mark: Point; box: PlotBox; at: number }) {
  const [x, y] = [box.x(mark.x), box.y(mark.y)];
  const isOut = x + 28 + textWidth(mark.text!) > box.width;
  const far = isOut ? x - 26 : x + 26;
  return (
    <g>
      <path className="stroke-soft" strokeWidth="0.8" d={`M${x + (isOut ? -5 : 5)} ${y}L${far} ${at}`} />
      <text className="halo" x={isOut ? far - 3 : far + 3} y={at + 4} textAnchor={isOut ? 'end' : 'start'}>
        {mark.text}
      </text>
    </g>
  );
}
