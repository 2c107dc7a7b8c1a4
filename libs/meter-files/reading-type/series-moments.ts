import { InputProblem } from '#libs/engine/index.js';
import { MeterChannel } from '../channels/meter-channel.js';
import { commonestStepS } from '../record/commonest-step.js';
import { mixedIntervals } from '../record/mixed-intervals.js';
import type { ChosenSeries } from './choose-series.js';
import { describeType } from './reading-type.js';
import type { TimedReadings } from './timed-readings.js';

/** What the stamps of a format mark, and what a person says of them. */
export interface StampMarks {
  /** beginnings with lengths behind them, or ends */
  marks: 'begin' | 'end';
  said: 'begin' | 'end' | undefined;
}

/**
 * The length of a series' intervals: that of its readings, else that of its type, else the commonest step.
 * @param readings of one series
 * @param statedS by its type, NaN where that is silent [s]
 * @returns NaN where nothing tells [s]
 */
export function intervalOf({ count, spanS, stampS }: TimedReadings, statedS: number): number {
  for (let i = 0; i < count; i++) if (spanS.at(i) > 0) return spanS.at(i);
  return Number.isNaN(statedS) ? commonestStepS(stampS.toNumbers().sort()) : statedS;
}

/**
 * Turns a series into a channel.
 * @param chosen the series and what it is to the record
 * @param stamps what they mark
 * @param beside ratio of instrument transformers that is not in the values yet, 1 where there is none; and the moments of
 * another channel
 * @throws InputProblem where intervals are of several lengths
 */
export function channelOf(
  chosen: ChosenSeries,
  stamps: StampMarks,
  { multiplier, known }: { multiplier: number; known: Float64Array | undefined },
): MeterChannel {
  const { series, quantity, form, negative } = chosen;
  const { readings, type, intervalS } = series;
  const kilo = type.unit === 29 ? type.power : type.power - 3;
  const channel = new MeterChannel({
    name: describeType(type),
    quantity,
    energy: form !== 'power',
    cumulative: form === 'register',
    times: (negative ? -1 : 1) * (kilo > 0 ? 10 ** kilo : 1) * (quantity === 'voltage' ? 1 : multiplier),
    over: kilo < 0 ? 10 ** -kilo : 1,
  });
  if (form !== 'register') {
    refuseOtherLengths(readings, intervalS);
    channel.intervalS = intervalS;
  }
  const { count, rowNumber } = readings;
  const beginS = momentsOf(chosen, stamps, known);
  channel.take({ beginS, values: readings.values.subarray(0, count), rowNumber });
  return channel;
}

/** The moments of a channel: those of another one themselves where they are the same, so that they are kept once. */
function momentsOf({ series, form }: ChosenSeries, stamps: StampMarks, known: Float64Array | undefined): Float64Array {
  const { readings, intervalS } = series;
  const { count, stampS, spanS } = readings;
  const shiftS =
    form === 'register'
      ? (i: number) => registerShiftS(spanS.at(i), stamps)
      : (i: number) => intervalShiftS(spanS.at(i), intervalS, stamps);
  let same = known?.length === count;
  for (let i = 0; i < count && same; i++) same = stampS.at(i) + shiftS(i) === known![i];
  if (same) return known!;
  const beginS = new Float64Array(count);
  for (let i = 0; i < count; i++) beginS[i] = stampS.at(i) + shiftS(i);
  return beginS;
}

/** From the stamp to the moment at which a register was read [s]. */
function registerShiftS(spanS: number, { marks, said }: StampMarks): number {
  return marks === 'begin' && said === 'end' && spanS > 0 ? spanS : 0;
}

/** From the stamp to the beginning of the interval [s]. */
function intervalShiftS(spanS: number, intervalS: number, { marks, said }: StampMarks): number {
  if (marks === 'begin') return 0;
  if (spanS > 0) return -spanS;
  return said === 'begin' ? 0 : -intervalS;
}

function refuseOtherLengths({ count, spanS, stampS, rowNumber }: TimedReadings, intervalS: number): void {
  let stated = false;
  for (let i = 0; i < count; i++) {
    if (!(spanS.at(i) > 0)) continue;
    stated = true;
    if (spanS.at(i) !== intervalS) throw new InputProblem([mixedIntervals(rowNumber.at(i), intervalS, spanS.at(i))]);
  }
  // a mean over a quarter of an hour, read once an hour, is no record of the hour
  const stepS = stated ? intervalS : commonestStepS(stampS.toNumbers().sort());
  if (stepS !== intervalS && !Number.isNaN(stepS)) {
    throw new InputProblem([mixedIntervals(rowNumber.at(0), intervalS, stepS)]);
  }
}
