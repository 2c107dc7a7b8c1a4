import { type MeterMap, POWER_FACTOR_SIGNS, type PowerFactorSign } from '#libs/contract/meter-map.js';
import { Question, type QuestionAsked, type QuestionReading } from '#libs/contract/question.js';
import { InputProblem, type Remark } from '#libs/engine/index.js';
import { note } from '../note.js';
import type { ReadResult } from '../record/close-reading.js';
import { ConflictingRows } from '../record/interval-grid.js';
import { dateOrders } from '../time/date-orders.js';
import type { CsvFile, CsvMeaning } from './csv-meaning.js';
import { readUnder } from './csv-reading.js';
import { energyColumns, movesOf } from './energy-registers.js';
import { hasNegative } from './power-factor.js';
import { fillerNotes } from './filler-numbers.js';
import { ReadingRoom, type ShownUnder, shownUnder } from './shown-reading.js';

/** What a file leaves open, with every answer there is. */
type OpenPoints = { [Point in keyof CsvMeaning]: CsvMeaning[Point][] };

type Point = keyof OpenPoints;

/** What is kept of a reading under one of several meanings. */
interface Attempt extends ShownUnder {
  meaning: CsvMeaning;
}

/**
 * Reads the rows under every meaning they can have; where the meanings make one record that record is the result.
 * @param file what was read
 * @returns the record's columns and notes
 * @throws Question where the meanings make different records
 * @throws InputProblem where the rows have no meaning
 */
export function settleMeaning(file: CsvFile): ReadResult {
  const points = openPoints(file);
  const room = new ReadingRoom();
  try {
    return settledAmong(file, points, room);
  } catch (problem) {
    if (!(problem instanceof ConflictingRows)) throw problem;
    return askWhichCounts(file, points, { problem, room });
  }
}

/**
 * The first reading that a file can have, whatever else it can mean; for showing it beside others.
 * @param file what was read
 * @param room memory to read in
 * @returns what is told of it, or why it can't be read
 */
export function firstReading(file: CsvFile, room: ReadingRoom): ShownUnder | InputProblem {
  try {
    return firstAmong(file, openPoints(file), room);
  } catch (problem) {
    if (problem instanceof InputProblem) return problem;
    throw problem;
  }
}

function firstAmong(file: CsvFile, points: OpenPoints, room: ReadingRoom): ShownUnder {
  let failure: unknown;
  for (const meaning of meanings({ ...points, keep: file.map.keepRow === undefined ? ['first'] : points.keep })) {
    try {
      return shownUnder(file, meaning, room);
    } catch (problem) {
      if (!(problem instanceof InputProblem)) throw problem;
      failure ??= problem;
    }
  }
  throw failure;
}

/** Rows that disagree are asked about, with the row that raises it, or refused where either answer gives one record. */
function askWhichCounts(
  file: CsvFile,
  points: OpenPoints,
  { problem, room }: { problem: ConflictingRows; room: ReadingRoom },
): never {
  try {
    settledAmong(file, { ...points, keep: ['first', 'last'] }, room);
  } catch (question) {
    if (question instanceof Question) throw new Question(question.questions, { row: problem.row });
  }
  throw problem;
}

function openPoints(file: CsvFile): OpenPoints {
  const { layout, reader, map } = file;
  const { mark } = reader;
  const open = mark.openDots.count + mark.openCommas.count > 0;
  const decimal = mark.sign === null && open ? (['.', ','] as const) : [mark.sign];
  const order = dateOrders(reader.rows, map.dateOrder);
  return {
    choice: layout.choices,
    decimal: [...decimal],
    order,
    keep: [map.keepRow],
    energy: energyMeanings(file),
    powerFactorSign: factorSigns(file),
    multiplier: map.multiplier === undefined ? [1, ...layout.ratios] : [map.multiplier],
    quality: reader.qualities.readings(map),
    days: dayMeanings(file),
    fillers: file.fillers.open === null ? [null] : ['missing', 'values'],
  };
}

/** Counted columns of a day may follow the clock or the time passed; where there is one for a 25th hour, it is the latter. */
function dayMeanings({ layout: { days }, reader: { counted }, map }: CsvFile): CsvMeaning['days'][] {
  if (map.dayColumns !== undefined) return [map.dayColumns];
  if (counted !== null) return counted.hasFurtherHour ? ['elapsed'] : ['clock', 'elapsed'];
  if (days === null || !days.counted) return ['clock'];
  return days.slots.some(({ beginS }) => beginS >= 86_400) ? ['elapsed'] : ['clock', 'elapsed'];
}

/** Registers and energies of intervals are asked about where numbers and names leave both possible. */
function energyMeanings({ layout, reader, map }: CsvFile): CsvMeaning['energy'][] {
  if (map.energy !== undefined) return [map.energy];
  const moves = (column: number) => movesOf(reader.valuesOf(column));
  const open = layout.choices.some(({ columns }) => energyColumns(columns, moves).open.size > 0);
  return open ? ['interval', 'register'] : [null];
}

function factorSigns({ layout, reader, map }: CsvFile): PowerFactorSign[] {
  if (reader.sided.size > 0) return sidedSign(map);
  if (map.powerFactorSign !== undefined) return [map.powerFactorSign];
  const factors = layout.choices.flatMap(({ columns }) =>
    columns.filter(({ quantity }) => quantity === 'powerFactor').map(({ column }) => column),
  );
  return factors.some((column) => hasNegative(reader.valuesOf(column))) ? [...POWER_FACTOR_SIGNS] : ['negativeLeads'];
}

/** Where cells say lagging and leading, a sign has nothing left to say. */
function sidedSign({ powerFactorSign = 'negativeLeads' }: MeterMap): PowerFactorSign[] {
  if (powerFactorSign === 'negativeLeads') return [powerFactorSign];
  const expected = 'none: the cells say lagging or leading';
  throw new InputProblem([
    {
      code: 'out-of-range',
      path: 'powerFactorSign',
      expected,
      found: powerFactorSign,
    },
  ]);
}

function settledAmong(file: CsvFile, points: OpenPoints, room: ReadingRoom): ReadResult {
  const all = meanings(points);
  const meaning = all.length === 1 ? all[0]! : settledMeaning(file, points, { all, room });
  // no other is looked at any more
  const result = readUnder(file, meaning, room.moments(file.reader.rows.count));
  return { ...result, notes: [...settledNotes(file, points, meaning), ...result.notes] };
}

/** The first meaning that can be, where the others that can be make the same record. */
function settledMeaning(
  file: CsvFile,
  points: OpenPoints,
  { all, room }: { all: readonly CsvMeaning[]; room: ReadingRoom },
): CsvMeaning {
  const attempts: Attempt[] = [];
  const conflicts = new Map<CsvMeaning['choice'], ConflictingRows>();
  for (const meaning of all) {
    try {
      attempts.push({ meaning, ...shownUnder(file, meaning, room) });
    } catch (problem) {
      if (!(problem instanceof InputProblem)) throw problem;
      if (problem instanceof ConflictingRows) conflicts.set(meaning.choice, problem);
    }
  }
  keepConflicting(conflicts, attempts);
  const [first] = attempts;
  // none can be: the reading as a whole is refused with all its problems
  if (first === undefined) return all[0]!;
  const questions = (Object.keys(points) as Point[]).flatMap((point) => asked(point, attempts));
  if (questions.length > 0) throw new Question(questions);
  return first.meaning;
}

/** Rows that disagree are asked about: they do not say that the columns they stand in are the wrong ones. */
function keepConflicting(conflicts: Map<CsvMeaning['choice'], ConflictingRows>, attempts: readonly Attempt[]): void {
  if (attempts.length === 0) return;
  for (const [choice, problem] of conflicts) {
    if (!attempts.some(({ meaning }) => meaning.choice === choice)) throw problem;
  }
}

function meanings(points: OpenPoints): CsvMeaning[] {
  const each = Object.entries(points) as [Point, CsvMeaning[Point][]][];
  return each.reduce<Partial<CsvMeaning>[]>(
    (known, [point, answers]) => known.flatMap((meaning) => answers.map((answer) => ({ ...meaning, [point]: answer }))),
    [{}],
  ) as CsvMeaning[];
}

/** The question a point needs: its answers, everything else taken as in the first meaning that can be. */
function asked(point: Point, attempts: Attempt[]): QuestionAsked[] {
  const [first] = attempts;
  const others = (Object.keys(first!.meaning) as Point[]).filter((other) => other !== point);
  const beside = attempts.filter(({ meaning }) => others.every((other) => meaning[other] === first!.meaning[other]));
  const distinct: Attempt[] = [];
  for (const attempt of beside) {
    if (!distinct.some(({ print }) => print === attempt.print)) distinct.push(attempt);
  }
  if (distinct.length < 2) return [];
  const readings: QuestionReading[] = distinct.map(({ meaning, reading }) => reading(mapOf(point, meaning)));
  const { id, about } = ASKED[point];
  return [{ id, about, readings }];
}

const ASKED: Record<Point, { id: string; about: string }> = {
  choice: { id: 'columns', about: 'which columns hold active and reactive power, and in which unit' },
  decimal: {
    id: 'decimal',
    about: 'whether the mark in numbers such as 1,234 or 1.234 is the decimal mark or divides thousands',
  },
  order: { id: 'dateOrder', about: 'whether dates such as 03/04 have the day or the month first' },
  keep: { id: 'keepRow', about: 'which of several rows with the same time and different values counts' },
  energy: {
    id: 'energy',
    about: 'whether the columns of energy hold the energy of each interval or the reading of a register',
  },
  powerFactorSign: {
    id: 'powerFactorSign',
    about: 'whether a negative power factor means leading kvar, lagging kvar, or exported power',
  },
  multiplier: { id: 'multiplier', about: 'whether the numbers still have to be multiplied by the transformer ratio' },
  days: {
    id: 'dayColumns',
    about: 'whether the columns of a day follow the clock or count the time since midnight where clocks change',
  },
  fillers: {
    id: 'fillers',
    about: 'whether numbers such as 9999 or -999 are values or stand for missing ones',
  },
  quality: {
    id: 'quality',
    about: 'whether values of this quality are measured or missing',
  },
};

function mapOf(point: Point, meaning: CsvMeaning): MeterMap {
  switch (point) {
    case 'choice':
      return meaning.choice.map;
    case 'decimal':
      return meaning.decimal === null ? {} : { decimal: meaning.decimal };
    case 'order':
      return { dateOrder: meaning.order };
    case 'keep':
      return meaning.keep === undefined ? {} : { keepRow: meaning.keep };
    case 'energy':
      return meaning.energy === null ? {} : { energy: meaning.energy };
    case 'powerFactorSign':
      return { powerFactorSign: meaning.powerFactorSign };
    case 'multiplier':
      return { multiplier: meaning.multiplier };
    case 'days':
      return { dayColumns: meaning.days };
    case 'fillers':
      return meaning.fillers === null ? {} : { fillers: meaning.fillers };
    case 'quality':
      return { quality: { ...meaning.quality } };
  }
}

/** Channels whose rows no record is made of; of those that measure something, the ones that another is taken before. */
function channelNotes({ reader: { leftOut }, layout: { names } }: CsvFile, { choice }: CsvMeaning): Remark[] {
  if (leftOut === undefined) return [];
  const used = new Set(choice.columns.map(({ column }) => column));
  const channels = [...leftOut, ...names.filter((_, column) => !used.has(column))];
  return channels.length === 0 ? [] : [note('channels-left-out', { channels: channels.join(', ') })];
}

function settledNotes(file: CsvFile, points: OpenPoints, meaning: CsvMeaning): Remark[] {
  const { reader, map } = file;
  const { mark, rows } = reader;
  const divided = meaning.decimal === ',' ? mark.openDots.count : meaning.decimal === '.' ? mark.openCommas.count : 0;
  const settledDates = (rows.dateForm === 'slashed' || rows.dateForm === 'short') && map.dateOrder === undefined;
  return [
    ...channelNotes(file, meaning),
    ...fillerNotes(file, meaning),
    ...(meaning.decimal === ',' && map.decimal === undefined ? [note('decimal-mark-settled', { mark: ',' })] : []),
    ...(divided > 0 ? [note('thousands-divided', { numbers: divided })] : []),
    ...(settledDates && points.order.length === 1 ? [note('date-order-settled', { order: meaning.order })] : []),
  ];
}
