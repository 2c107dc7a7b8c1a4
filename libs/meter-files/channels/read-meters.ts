import { Question, type QuestionReading } from '#libs/contract/question.js';
import { InputProblem } from '#libs/engine/index.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { shownReading } from '../record/reading-shown.js';

/** Reads one meter of a file. */
export type ReadMeter<Meter> = (meter: Meter, options: ReadOptions) => MeterReading;

/**
 * What is done where only one of several meters gives a record: the others are named in a note, as in feeds that hold gas
 * beside electricity, or a person is asked, as where a damaged number would hide a part of the meter's days.
 */
export type OtherMeters = 'leave' | 'ask';

/** More are not worked out for a question. */
const MOST_METERS = 12;

/**
 * Reads the one meter of a file, or the one a person names.
 * @param meters what the file holds, by the meter's own number
 * @param options what is said about it; the map's `meter` names one of several
 * @param readMeter how one of them is read
 * @param others what is done with meters that give no record by themselves
 * @returns the record and its quality
 * @throws Question where there are several and none is named
 * @throws InputProblem where there is none, or the one named is not there
 */
export function readMeters<Meter>(
  meters: ReadonlyMap<string, Meter>,
  options: ReadOptions,
  readMeter: ReadMeter<Meter>,
  others: OtherMeters = 'ask',
): MeterReading {
  const names = [...meters.keys()];
  const said = options.map?.meter;
  const found = names.slice(0, MOST_METERS).join(', ') || 'none';
  if (said !== undefined) {
    const meter = meters.get(said);
    if (meter !== undefined) return readMeter(meter, options);
    throw new InputProblem([
      { code: 'out-of-range', path: 'meter', expected: `a meter of the file: ${found}`, found: said },
    ]);
  }
  const [only] = meters.values();
  if (only === undefined)
    throw new InputProblem([{ code: 'empty-file', expected: 'values of a meter', found: 'none' }]);
  if (meters.size === 1) return readMeter(only, options);
  return askWhichMeter(meters, options, readMeter, others);
}

function askWhichMeter<Meter>(
  meters: ReadonlyMap<string, Meter>,
  options: ReadOptions,
  readMeter: ReadMeter<Meter>,
  others: OtherMeters,
): MeterReading {
  const readings: QuestionReading[] = [];
  const whole: { name: string; reading: MeterReading }[] = [];
  let failure: unknown;
  for (const [name, meter] of [...meters].slice(0, MOST_METERS)) {
    try {
      const reading = readMeter(meter, options);
      whole.push({ name, reading });
      readings.push(shownReading({ meter: name }, reading.record));
    } catch (problem) {
      if (!(problem instanceof InputProblem) || problem instanceof Question) throw problem;
      failure ??= problem;
    }
  }
  const [first] = whole;
  if (first === undefined) throw failure;
  if (others === 'ask' || whole.length > 1 || meters.size > MOST_METERS) {
    throw new Question([{ id: 'meter', about: `which of the ${meters.size} meters of the file is meant`, readings }]);
  }
  const left = [...meters.keys()].filter((name) => name !== first.name).join(', ');
  const { record, quality } = first.reading;
  return { record: { ...record, notes: [...record.notes, note('meters-left-out', { meters: left })] }, quality };
}
