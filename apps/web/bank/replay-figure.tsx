import type { Figure } from '#libs/engine/index.js';
import type { DayReplay } from '#libs/present/day-replay.js';
import { formatNumber } from '#libs/present/format-number.js';
import { formatClock } from '#libs/present/local-stamp.js';
import { linearAxis, placeOnAxis } from '#libs/present/ticks.js';
import { useDesk } from '../desk/use-desk.js';
import { ChartFigure } from '../draw/chart-figure.js';
import { textWidth } from '../draw/plot-box.js';
import { usePlotWidth } from '../draw/plot-size.js';

const TOP = 26;
const FIELD = 190;
const ROW = 13;
const LEFT = 40;
const RIGHT = 52;
/** Digits and small letters take less than the common width. */
const WORDS = 0.92;

/** A day replayed: load, need and the stages as blocks; below a row a stage; one cursor through both. */
export function ReplayFigure({ replay, workings }: { replay: DayReplay; workings: readonly Figure[] }) {
  const { desk, state } = useDesk();
  const [place, width] = usePlotWidth();
  const day = (days: number) => desk.pick({ momentS: replay.beginS + (0.5 + days) * 86_400 });
  const { momentS } = state.picks;
  const cursorS = state.picks.cursorS ?? (momentS ?? replay.beginS) - replay.beginS;
  const at = intervalAt(replay, cursorS);
  const words =
    replay.atS.length === 0
      ? 'no reading'
      : `${formatClock(replay.atS[at]!)}, ${formatNumber(replay.connectedKvar[at]!)} of ${formatNumber(replay.loadKvar[at]!)} kvar`;
  return (
    <ChartFigure figure={replay} workings={workings} steps={false}>
      <div ref={place}>
        {width === 0 ? null : (
          <>
            <ReplaySvg replay={replay} width={width} at={at} words={words} />
            <input
              className="handle"
              type="range"
              aria-label="Moment of the day"
              aria-valuetext={words}
              min={0}
              max={Math.max(0, replay.lengthS - replay.intervalS)}
              step={replay.intervalS}
              value={cursorS}
              style={{ left: LEFT - 8, width: width - LEFT - RIGHT + 16, top: TOP - 20, height: FIELD }}
              onChange={({ target }) => desk.pick({ cursorS: Number(target.value), momentS: replay.beginS + 43_200 })}
            />
          </>
        )}
      </div>
      <p className="row">
        <button type="button" className="way" onClick={() => day(-1)}>
          Day before
        </button>
        <button type="button" className="way" onClick={() => day(1)}>
          Day after
        </button>
      </p>
    </ChartFigure>
  );
}

function intervalAt(replay: DayReplay, cursorS: number): number {
  return Math.max(
    0,
    replay.atS.findLastIndex((s) => s <= cursorS),
  );
}

function ReplaySvg({ replay, width, at, words }: { replay: DayReplay; width: number; at: number; words: string }) {
  const { atS, lengthS, intervalS, stages } = replay;
  const x = (s: number) => LEFT + (s / lengthS) * (width - LEFT - RIGHT);
  const most = Math.max(1, ...replay.loadKvar, ...replay.connectedKvar);
  const least = Math.min(0, ...replay.loadKvar);
  const axis = linearAxis('', 'kvar', { least, most }, 4);
  const y = (kvar: number) => TOP + FIELD - placeOnAxis(axis, kvar) * FIELD;
  const rows = TOP + FIELD + 48;
  const height = rows + stages.length * ROW + 8;
  const stair = (values: readonly number[]) =>
    atS
      .map(
        (s, i) =>
          `${i === 0 || s - atS[i - 1]! > intervalS ? 'M' : 'L'}${x(s).toFixed(1)} ${y(values[i]!).toFixed(1)}H${x(s + intervalS).toFixed(1)}`,
      )
      .join('');
  const cursor = x((atS[at] ?? 0) + intervalS / 2);
  const hours = Array.from({ length: Math.floor(lengthS / 10_800) + 1 }, (_, k) => k * 10_800);
  const hourStep = width >= 520 ? 1 : width >= 300 ? 2 : 4;
  const isRight = cursor + 9 + WORDS * textWidth(words) <= width;
  // The words take the unit's place where they reach it.
  const isUnitFree = isRight || cursor - 9 - textWidth(words) > LEFT;
  return (
    <svg width={width} height={height} aria-hidden="true">
      {isUnitFree ? (
        <text className="axis" x={LEFT - 8} y={11} textAnchor="end">
          kvar
        </text>
      ) : null}
      {axis.ticks.map((tick) => (
        <g key={tick.at}>
          <path className={tick.at === 0 ? 'zero' : 'grid'} d={`M${LEFT} ${y(tick.at)}H${width - RIGHT}`} />
          <text className="axis" x={LEFT - 8} y={y(tick.at) + 4} textAnchor="end">
            {tick.text}
          </text>
        </g>
      ))}
      <Blocks replay={replay} x={x} y={y} />
      <path className="line need" d={stair(replay.needKvar)} />
      <path className="line site" d={stair(replay.loadKvar)} />
      {hours.map((s, k) =>
        k % hourStep !== 0 ? null : (
          <text key={s} className="axis" x={x(s)} y={TOP + FIELD + 18} textAnchor={k === 0 ? 'start' : 'middle'}>
            {s === lengthS ? '24:00' : formatClock(s)}
          </text>
        ),
      )}
      <EndWords replay={replay} x={width - RIGHT + 6} y={y} />
      <text className="axis" x={LEFT - 8} y={rows - 8} textAnchor="end">
        stage
      </text>
      <text className="axis" x={width - RIGHT + 6} y={rows - 8}>
        switched
      </text>
      {stages.map((stage, k) => (
        <StageRuns key={k} {...{ stage, replay, x, width }} name={String(k + 1)} y={rows + k * ROW} />
      ))}
      <path className="stroke-ink" strokeWidth="1.4" d={`M${cursor} ${TOP - 6}V${height}`} />
      <path className="fill-ink" d={`M${cursor - 5} ${TOP - 18}h10v6l-5 6-5-6Z`} />
      <text
        className="strong"
        x={isRight ? cursor + 9 : cursor - 9}
        y={TOP - 10}
        textAnchor={isRight ? 'start' : 'end'}
      >
        {words}
      </text>
    </svg>
  );
}

type Place = (value: number) => number;

/** Each stage a block while it is in, the one longest in lowest; equal neighbours in time are one block. */
function Blocks({ replay, x, y }: { replay: DayReplay; x: Place; y: Place }) {
  const blocks: { stage: number; from: number; to: number; base: number; kvar: number }[] = [];
  const open = new Map<number, (typeof blocks)[number]>();
  replay.stacks.forEach((stack, i) => {
    let base = 0;
    for (const { stage, kvar } of stack) {
      const last = open.get(stage);
      if (last !== undefined && last.to === i && Math.abs(last.base - base) < 1e-9) last.to = i + 1;
      else {
        const block = { stage, from: i, to: i + 1, base, kvar };
        blocks.push(block);
        open.set(stage, block);
      }
      base += kvar;
    }
  });
  const end = (i: number) => (replay.atS[i - 1] ?? 0) + replay.intervalS;
  return (
    <g>
      {blocks.map(({ stage, from, to, base, kvar }) => {
        const left = x(replay.atS[from]!);
        const wide = x(end(to)) - left;
        const high = y(base) - y(base + kvar);
        return (
          <g key={`${stage}:${from}`}>
            <rect
              className={`stroke-bank ${stage % 2 === 0 ? 'fill-wash' : 'fill-wash2'}`}
              strokeWidth="0.7"
              x={left}
              y={y(base + kvar)}
              width={wide}
              height={high}
            />
            {wide > 22 && high > 12 ? (
              <text className="bank" x={left + wide / 2} y={y(base) - high / 2 + 4} textAnchor="middle">
                {stage + 1}
              </text>
            ) : null}
          </g>
        );
      })}
    </g>
  );
}

function EndWords({ replay, x, y }: { replay: DayReplay; x: number; y: Place }) {
  const last = replay.atS.length - 1;
  if (last < 0) return null;
  const words = [
    { text: 'load', at: y(replay.loadKvar[last]!), name: '' },
    { text: 'need', at: y(replay.needKvar[last]!), name: '' },
    { text: 'bank', at: y(replay.connectedKvar[last]! / 2), name: 'bank' },
  ].sort((a, b) => a.at - b.at);
  let lowest = Number.NEGATIVE_INFINITY;
  const floor = TOP + FIELD;
  const placed = words.map((word, k) => {
    lowest = Math.max(Math.min(word.at, floor - (2 - k) * 14), lowest + 14);
    return { ...word, at: lowest };
  });
  return (
    <g>
      {placed.map(({ text, at, name }) => (
        <text key={text} className={name} x={x} y={at + 3}>
          {text}
        </text>
      ))}
    </g>
  );
}

function StageRuns({
  stage,
  replay,
  x,
  y,
  width,
  name,
}: {
  stage: DayReplay['stages'][number];
  replay: DayReplay;
  x: Place;
  y: number;
  width: number;
  name: string;
}) {
  const begin = (i: number) => x(replay.atS[i] ?? 0);
  const end = (i: number) => x((replay.atS[i - 1] ?? 0) + replay.intervalS);
  return (
    <g>
      <text className="axis" x={LEFT - 8} y={y + 9} textAnchor="end">
        {name}
      </text>
      <path className="grid" d={`M${LEFT} ${y + 5}H${width - RIGHT}`} />
      {stage.runs.map(({ from, to }) => (
        <g key={from}>
          <rect className="fill-bank" x={begin(from)} y={y + 3} width={Math.max(1, end(to) - begin(from))} height={4} />
          <path className="stroke-bank" strokeWidth="1.4" d={`M${begin(from)} ${y}v10M${end(to)} ${y}v10`} />
        </g>
      ))}
      <text x={width - RIGHT + 6} y={y + 9}>
        {stage.switchings}
      </text>
    </g>
  );
}
