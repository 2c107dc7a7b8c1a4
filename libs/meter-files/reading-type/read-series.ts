import type { MeterMap } from '#libs/contract/meter-map.js';
import { Question } from '#libs/contract/question.js';
import { InputProblem, type Problem, type Remark } from '#libs/engine/index.js';
import type { MeterChannel } from '../channels/meter-channel.js';
import { readChannels } from '../channels/read-channels.js';
import { readMeters } from '../channels/read-meters.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { shownReading } from '../record/reading-shown.js';
import { type ChosenSeries, chooseSeries, leadingLeftOut, type Series } from './choose-series.js';
import { TOTAL_FLOWS } from './flow-schemes.js';
import { describeType, formOf, isSample } from './reading-type.js';
import { channelOf } from './series-moments.js';

const LONGEST_LIST = 300;

/** The series of one meter or usage point. */
export interface SeriesMeter {
  name: string;
  series: readonly Series[];
}

/** What a reader of typed readings has found in a file. */
export interface SeriesFile {
  format: string;
  meters: readonly SeriesMeter[];
  /** what stamps mark */
  marks: 'begin' | 'end';
  notes: readonly Remark[];
}

/**
 * Makes a record of readings whose types are given by the code lists of IEC 61968-9.
 * @param file meters with their series
 * @param options of the map `meter`, `stamp`, `multiplier`, `keepRow` and repairs matter
 * @returns the record and its quality
 * @throws Question where several meters could be meant, or a register could be read at either end of its interval
 * @throws InputProblem where active or reactive energy is missing, or intervals are of several lengths
 */
export function readSeries(file: SeriesFile, options: ReadOptions): MeterReading {
  const meters = new Map(file.meters.filter(({ series }) => series.length > 0).map((meter) => [meter.name, meter]));
  return readMeters(meters, options, (meter, said) => readMeter(file, meter, said), 'leave');
}

function readMeter(file: SeriesFile, meter: SeriesMeter, options: ReadOptions): MeterReading {
  const chosen = chooseSeries(meter.series);
  refuseMissing(chosen, meter.series);
  const said = options.map?.stamp;
  if (said === undefined && file.marks === 'begin' && chosen.some(hasEitherEnd)) askStamp(file, meter, options);
  const multiplier = options.map?.multiplier ?? 1;
  const channels: MeterChannel[] = [];
  for (const each of chosen) {
    channels.push(channelOf(each, { marks: file.marks, said }, { multiplier, known: channels[0]?.beginS }));
  }
  const rowsRead = meter.series.reduce((sum, { readings }) => sum + readings.count, 0);
  const notes = [...file.notes, ...seriesNotes(chosen, meter.series), ...markNotes(file, chosen, said)];
  if (multiplier !== 1) notes.push(note('values-multiplied', { multiplier }));
  const leadingElsewhere = leadingLeftOut(chosen, meter.series).map(describeSeries);
  return readChannels({ format: file.format, channels, notes, rowsRead, leadingElsewhere }, options);
}

/** Whether a register's readings come with an interval and could stand at its beginning or its end. */
function hasEitherEnd({ form, series: { readings } }: ChosenSeries): boolean {
  return form === 'register' && readings.spanS.some((spanS) => spanS > 0);
}

function askStamp(file: SeriesFile, meter: SeriesMeter, options: ReadOptions): never {
  const about = 'whether a register was read at the beginning or at the end of the interval it is given with';
  const readings = (['begin', 'end'] as const).map((stamp) => {
    const map: MeterMap = { keepRow: 'last', ...options.map, stamp };
    return shownReading({ stamp }, readMeter(file, meter, { ...options, map }).record);
  });
  throw new Question([{ id: 'stamp', about, readings }]);
}

function refuseMissing(chosen: readonly ChosenSeries[], all: readonly Series[]): void {
  const has = (...quantities: string[]) => chosen.some(({ quantity }) => quantities.includes(quantity));
  const found = listed(all.map(({ type }) => describeType(type)));
  const problems: Problem[] = [];
  if (!has('active')) problems.push({ code: 'no-active-column', expected: 'active energy or power', found });
  if (!has('lagging', 'reactive')) {
    problems.push({ code: 'no-reactive-column', expected: 'lagging reactive energy or power', found });
  }
  if (problems.length > 0) throw new InputProblem(problems);
}

function seriesNotes(chosen: readonly ChosenSeries[], all: readonly Series[]): Remark[] {
  const used = chosen.map(({ series }) => series);
  const leftOut = all.filter((series) => !used.includes(series)).map(describeSeries);
  const names = (test: (series: Series) => boolean) => used.filter(test).map(({ type }) => describeType(type));
  const samples = names(({ type }) => formOf(type) === 'power' && isSample(type));
  const totals = names(({ type }) => TOTAL_FLOWS.includes(type.flowDirection));
  const secondary = names(({ type }) => type.commodity === 1);
  const voltages = chosen.filter(({ quantity }) => quantity === 'voltage');
  const sum = (count: 'substituted' | 'questionable') =>
    used.reduce((total, { readings }) => total + readings.counts[count], 0);
  const [substituted, questionable] = [sum('substituted'), sum('questionable')];
  return [
    ...(leftOut.length > 0 ? [note('channels-left-out', { channels: listed(leftOut) })] : []),
    ...(samples.length > 0 ? [note('samples-taken-as-means', { channels: listed(samples) })] : []),
    ...(totals.length > 0 ? [note('total-flow-taken', { channels: listed(totals) })] : []),
    ...(secondary.length > 0 ? [note('secondary-metered', { channels: listed(secondary) })] : []),
    ...(voltages.length > 0 ? [note('voltage-taken-line-to-line', { column: 'V' })] : []),
    ...(substituted > 0 ? [note('values-substituted', { values: substituted })] : []),
    ...(questionable > 0 ? [note('readings-questionable', { readings: questionable })] : []),
  ];
}

function describeSeries({ type, intervalS }: Series): string {
  return intervalS > 0 ? `${describeType(type)} of ${intervalS} s` : describeType(type);
}

/** Stamps that are ends because the format says so, not because each interval is written out. */
function markNotes(file: SeriesFile, chosen: readonly ChosenSeries[], said: 'begin' | 'end' | undefined): Remark[] {
  const open = chosen.some(
    ({ form, series: { readings } }) => form !== 'register' && readings.spanS.some((spanS) => !(spanS > 0)),
  );
  if (file.marks === 'begin' || said !== undefined || !open) return [];
  return [note('interval-ends-by-format', {})];
}

function listed(names: readonly string[]): string {
  return [...new Set(names)].sort().join(', ').slice(0, LONGEST_LIST) || 'none';
}
