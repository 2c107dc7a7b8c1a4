import type { Feeder, SingleLine, StageSymbol } from '#libs/present/single-line.js';
import { ChartFigure, type Figured } from '../draw/chart-figure.js';
import { textWidth } from '../draw/plot-box.js';
import { usePlotWidth } from '../draw/plot-size.js';

const BUS_Y = 168;
/** Where the bank stands below the feeders, its tap goes down beside them. */
const TAP_ROOM = 20;
/** Lines that fit below a feeder before the bank begins. */
const MOST_LINES = 4;

/** The single-line diagram: open symbols in ink, the bank in blue. */
export function DiagramFigure({ diagram }: { diagram: SingleLine }) {
  const [place, width] = usePlotWidth();
  return (
    <ChartFigure figure={figureOf(diagram)}>
      <div ref={place}>{width === 0 ? null : <DiagramSvg diagram={diagram} width={Math.max(width, 300)} />}</div>
    </ChartFigure>
  );
}

function figureOf(diagram: SingleLine): Figured {
  const rows = [
    ['grid', diagram.grid, ''],
    ...diagram.transformers.map(({ name, detail }) => ['transformer', name, detail]),
    ['bus', diagram.bus, `${diagram.faultLevel.most}, ${diagram.faultLevel.least}`],
    ...diagram.feeders.map(({ name, detail }) => ['feeder', name, detail]),
    ...diagram.bank.map((words) => ['bank', words, '']),
  ];
  return {
    id: 'singleLine',
    finding: 'Single-line diagram, drawn from the data',
    caption: `The bank’s branch is the only blue on it. ${diagram.notEntered}`,
    sentence: diagram.sentence,
    table: { columns: ['element', 'what', 'detail'].map((head) => ({ head, right: false })), rows },
  };
}

function DiagramSvg({ diagram, width }: { diagram: SingleLine; width: number }) {
  const { feeders, stages, transformers } = diagram;
  const isNarrow = width < 520;
  const feedX = width * (isNarrow ? 0.3 : 0.34);
  const bankFrom = stages.length === 0 ? width : width * (isNarrow ? 0.02 : 0.54);
  const loadTo = stages.length === 0 ? width : isNarrow ? width - TAP_ROOM : width * 0.52;
  const pitch = loadTo / Math.max(1, feeders.length);
  const bankY = isNarrow ? BUS_Y + 128 : BUS_Y;
  return (
    <svg width={width} height={bankY + 168} viewBox={`0 0 ${width} ${bankY + 168}`} aria-hidden="true">
      <Grid x={feedX} words={diagram.grid} />
      {transformers.length === 0 ? (
        <path className="tick" strokeWidth="1.4" d={`M${feedX} 40V${BUS_Y}`} />
      ) : (
        transformers
          .slice(0, 3)
          .map((transformer, at) => (
            <Transformer
              key={at}
              x={feedX + at * 46}
              feedX={feedX}
              words={at === transformers.length - 1 || at === 2 ? transformer : null}
            />
          ))
      )}
      <Breaker x={feedX} y={108} />
      <circle className="none stroke-ink" strokeDasharray="2 2" cx={feedX} cy={BUS_Y - 14} r={6} />
      <Meter x={feedX} y={diagram.meteredAt === 'primary' ? 32 : BUS_Y - 36} />
      <path className="stroke-ink" strokeWidth="5" d={`M0 ${BUS_Y}H${width}`} />
      <text className="axis" x={0} y={BUS_Y - 10}>
        {isNarrow ? '' : diagram.bus}
      </text>
      <text className="strong" x={width} y={BUS_Y - 26} textAnchor="end">
        {diagram.faultLevel.most}
      </text>
      <text className="axis" x={width} y={BUS_Y - 10} textAnchor="end">
        {diagram.faultLevel.least}
      </text>
      {feeders.map((feeder, at) => (
        <FeederSymbol key={feeder.name} feeder={feeder} x={pitch * (at + 0.5)} pitch={pitch} />
      ))}
      {stages.length === 0 ? null : (
        <BankBranch stages={stages} words={diagram.bank} from={bankFrom} to={width} y={bankY} isBelow={isNarrow} />
      )}
    </svg>
  );
}

function Grid({ x, words }: { x: number; words: string }) {
  return (
    <g>
      <rect className="none stroke-ink" strokeWidth="1.4" x={x - 11} y={4} width={22} height={18} />
      <path className="stroke-ink" d={`M${x - 11} 16l12-12M${x - 6} 22l17-17M${x + 3} 22l8-8`} />
      <path className="stroke-ink" strokeWidth="1.4" d={`M${x} 22V44`} />
      <text x={x + 20} y={18}>
        {words}
      </text>
    </g>
  );
}

/** A device that is needed there, dashed: its ratings stand at the network. */
function Breaker({ x, y, look = 'stroke-ink' }: { x: number; y: number; look?: string }) {
  return (
    <g>
      <rect className="fill-sheet" x={x - 6} y={y - 6} width={12} height={12} />
      <rect className={`none ${look}`} strokeDasharray="2 2" x={x - 6} y={y - 6} width={12} height={12} />
      <path className={look} strokeWidth="1.3" d={`M${x - 3.5} ${y - 3.5}l7 7m-7 0l7-7`} />
    </g>
  );
}

function Meter({ x, y }: { x: number; y: number }) {
  return (
    <g>
      <path className="stroke-ink" d={`M${x} ${y}h12`} />
      <rect className="none stroke-ink" strokeWidth="1.4" x={x + 12} y={y - 7} width={24} height={14} />
      <text x={x + 24} y={y + 3.5} textAnchor="middle" style={{ fontSize: 9 }}>
        kWh
      </text>
      <text className="axis" x={x + 42} y={y + 4}>
        meter
      </text>
    </g>
  );
}

function Transformer({
  x,
  feedX,
  words,
}: {
  x: number;
  feedX: number;
  words: { name: string; detail: string } | null;
}) {
  return (
    <g>
      {x === feedX ? null : <path className="stroke-ink" strokeWidth="1.4" d={`M${feedX} 40H${x}V46`} />}
      <circle className="none stroke-ink" strokeWidth="1.4" cx={x} cy={58} r={14} />
      <circle className="none stroke-ink" strokeWidth="1.4" cx={x} cy={78} r={14} />
      <path className="stroke-ink" strokeWidth="1.4" d={`M${x} 92V${BUS_Y}`} />
      {words === null ? null : (
        <>
          <text className="strong" x={x + 22} y={66}>
            {words.name}
          </text>
          <text className="axis" x={x + 22} y={82}>
            {words.detail}
          </text>
        </>
      )}
    </g>
  );
}

/** Words set in lines no wider than their room, where no single word is. */
function brokenAt(text: string, room: number): string[] {
  const lines: string[] = [];
  for (const word of text.split(' ')) {
    const longer = lines.length === 0 ? word : `${lines.at(-1)} ${word}`;
    if (lines.length > 0 && textWidth(longer) <= room) lines[lines.length - 1] = longer;
    else lines.push(word);
  }
  return lines;
}

function FeederSymbol({ feeder, x, pitch }: { feeder: Feeder; x: number; pitch: number }) {
  const y = BUS_Y + 32;
  const name = 6.2 * feeder.name.length > pitch - 4 ? feeder.short : feeder.name;
  const details = feeder.detail.split(', ').flatMap((detail) => brokenAt(detail, pitch + 8));
  return (
    <g>
      <path className="stroke-ink" strokeWidth="1.4" d={`M${x} ${BUS_Y}V${y}`} />
      {feeder.symbol === 'motor' ? (
        <>
          <circle className="none stroke-ink" strokeWidth="1.4" cx={x} cy={y + 13} r={13} />
          <text x={x} y={y + 17} textAnchor="middle">
            M
          </text>
        </>
      ) : feeder.symbol === 'converter' ? (
        <>
          <rect className="none stroke-ink" strokeWidth="1.4" x={x - 13} y={y} width={26} height={26} />
          <path
            className="none stroke-ink"
            d={`M${x - 13} ${y + 26}l26-26M${x - 9} ${y + 8}q3-5 5 0t5 0M${x + 2} ${y + 18}h8m-8 4h8`}
          />
        </>
      ) : (
        <path className="fill-ink" d={`M${x - 6} ${y}h12l-6 18Z`} />
      )}
      <text x={x} y={y + 44} textAnchor="middle">
        {name}
      </text>
      {details.slice(0, MOST_LINES).map((detail, at) => (
        <text key={detail} className="axis" x={x} y={y + 59 + at * 14} textAnchor="middle">
          {detail}
        </text>
      ))}
    </g>
  );
}

function BankBranch({
  stages,
  words,
  from,
  to,
  y,
  isBelow,
}: {
  stages: readonly StageSymbol[];
  words: readonly string[];
  from: number;
  to: number;
  y: number;
  /** the feeders stand between bus and bank */
  isBelow: boolean;
}) {
  const pitch = Math.min(44, (to - from) / stages.length);
  const start = to - pitch * stages.length + pitch / 2;
  const x = (at: number) => start + at * pitch;
  const line = y + 24;
  const last = x(stages.length - 1);
  const tap = isBelow ? to - 7 : (x(0) + last) / 2;
  return (
    <g className="bank-branch">
      <path className="none stroke-bank" strokeWidth="1.6" d={`M${tap} ${BUS_Y}V${line}`} />
      <Breaker x={tap} y={isBelow ? line - 24 : BUS_Y + 12} look="stroke-bank" />
      <path className="none stroke-bank" strokeWidth="2.4" d={`M${x(0)} ${line}H${Math.max(last, tap)}`} />
      {stages.map((stage, at) => (
        <StageBranch key={at} stage={stage} x={x(at)} y={line} />
      ))}
      {words.map((text, at) => (
        <text key={text} className="bank" x={to} y={line + 104 + at * 16} textAnchor="end">
          {text}
        </text>
      ))}
    </g>
  );
}

function StageBranch({ stage, x, y }: { stage: StageSymbol; x: number; y: number }) {
  return (
    <g>
      <path
        className="none stroke-bank"
        strokeWidth="1.3"
        d={stage.switched ? `M${x} ${y}v8m-5 1l5 12v4` : `M${x} ${y}v25`}
      />
      {stage.detuned ? (
        <path className="none stroke-bank" strokeWidth="1.3" d={`M${x} ${y + 25}q6 4 0 8q6 4 0 8q6 4 0 8v6`} />
      ) : (
        <path className="none stroke-bank" strokeWidth="1.3" d={`M${x} ${y + 25}v30`} />
      )}
      <path className="none stroke-bank" strokeWidth="1.8" d={`M${x - 8} ${y + 55}h16m-16 5h16`} />
      <path className="none stroke-bank" strokeWidth="1.3" d={`M${x} ${y + 60}v6`} />
      <text className="bank" x={x} y={y + 82} textAnchor="middle">
        {stage.times > 1 ? `${stage.times}×` : ''}
        {stage.text}
      </text>
    </g>
  );
}
