import type { MeterMap } from '#libs/contract/meter-map.js';
import { Question, type QuestionAsked, type QuestionReading } from '#libs/contract/question.js';
import { InputProblem, type Remark } from '#libs/engine/index.js';
import { note } from '../note.js';
import type { ReadResult } from '../record/close-reading.js';
import { ConflictingRows } from '../record/interval-grid.js';
import { sameColumns, shownReading } from '../record/reading-shown.js';
import { dateOrders } from '../time/date-orders.js';
import type { DateOrder } from '../time/stamp-text.js';
import type { ColumnChoice } from './column-choice.js';
import { type CsvFile, type CsvMeaning, readUnder } from './csv-reading.js';
import type { DecimalSign } from './decimal-mark.js';

/** What a file leaves open, each with every answer there is. */
interface OpenPoints {
  choice: ColumnChoice[];
  decimal: (DecimalSign | null)[];
  order: DateOrder[];
  keep: ('first' | 'last' | undefined)[];
}

type Point = keyof OpenPoints;

interface Attempt {
  meaning: CsvMeaning;
  result: ReadResult;
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
  try {
    return settledAmong(file, points);
  } catch (problem) {
    if (!(problem instanceof ConflictingRows)) throw problem;
    return askWhichCounts(file, points, problem);
  }
}

/** Rows that disagree are asked about, with the row that raises it, or refused where either answer gives one record. */
function askWhichCounts(file: CsvFile, points: OpenPoints, problem: ConflictingRows): never {
  try {
    settledAmong(file, { ...points, keep: ['first', 'last'] });
  } catch (question) {
    if (question instanceof Question) throw new Question(question.questions, { row: problem.row });
  }
  throw problem;
}

function openPoints({ layout, reader, map }: CsvFile): OpenPoints {
  const { mark } = reader;
  const open = mark.openDots.length + mark.openCommas.length > 0;
  return {
    choice: layout.choices,
    decimal: mark.sign === null && open ? ['.', ','] : [mark.sign],
    order: dateOrders(reader.rows, map.dateOrder),
    keep: [map.keepRow],
  };
}

function settledAmong(file: CsvFile, points: OpenPoints): ReadResult {
  const attempts: Attempt[] = [];
  let failure: unknown;
  const all = meanings(points);
  for (const meaning of all) {
    try {
      attempts.push({ meaning, result: readUnder(file, meaning, all.length === 1) });
    } catch (problem) {
      if (!(problem instanceof InputProblem)) throw problem;
      failure ??= problem;
    }
  }
  const [first] = attempts;
  if (first === undefined) throw failure;
  const questions = (Object.keys(points) as Point[]).flatMap((point) => asked(point, attempts));
  if (questions.length > 0) throw new Question(questions);
  return { ...first.result, notes: [...settledNotes(file, points, first.meaning), ...first.result.notes] };
}

function meanings({ choice, decimal, order, keep }: OpenPoints): CsvMeaning[] {
  return choice.flatMap((chosen) =>
    decimal.flatMap((sign) =>
      order.flatMap((dates) => keep.map((kept) => ({ choice: chosen, decimal: sign, order: dates, keep: kept }))),
    ),
  );
}

/** The question a point needs: its answers, everything else taken as in the first meaning that can be. */
function asked(point: Point, attempts: Attempt[]): QuestionAsked[] {
  const [first] = attempts;
  const others = (['choice', 'decimal', 'order', 'keep'] as const).filter((other) => other !== point);
  const beside = attempts.filter(({ meaning }) => others.every((other) => meaning[other] === first!.meaning[other]));
  const distinct: Attempt[] = [];
  for (const attempt of beside) {
    if (!distinct.some(({ result }) => sameColumns(result.columns, attempt.result.columns))) distinct.push(attempt);
  }
  if (distinct.length < 2) return [];
  const readings: QuestionReading[] = distinct.map(({ meaning, result }) =>
    shownReading(mapOf(point, meaning), result.columns),
  );
  return [{ id: ID[point], about: ABOUT[point], readings }];
}

const ID: Record<Point, string> = { choice: 'columns', decimal: 'decimal', order: 'dateOrder', keep: 'keepRow' };

const ABOUT: Record<Point, string> = {
  choice: 'which columns hold active and reactive power, and in which unit',
  decimal: 'whether the mark in numbers such as 1,234 or 1.234 is the decimal mark or divides thousands',
  order: 'whether dates such as 03/04 have the day or the month first',
  keep: 'which of several rows with the same time and different values counts',
};

function mapOf(point: Point, meaning: CsvMeaning): MeterMap {
  if (point === 'choice') return meaning.choice.map;
  if (point === 'decimal') return meaning.decimal === null ? {} : { decimal: meaning.decimal };
  if (point === 'order') return { dateOrder: meaning.order };
  return meaning.keep === undefined ? {} : { keepRow: meaning.keep };
}

function settledNotes({ reader, map }: CsvFile, points: OpenPoints, meaning: CsvMeaning): Remark[] {
  const { mark, rows } = reader;
  const divided = meaning.decimal === ',' ? mark.openDots : meaning.decimal === '.' ? mark.openCommas : [];
  const settledDates = (rows.dateForm === 'slashed' || rows.dateForm === 'short') && map.dateOrder === undefined;
  return [
    ...(meaning.decimal === ',' && map.decimal === undefined ? [note('decimal-mark-settled', { mark: ',' })] : []),
    ...(divided.length > 0 ? [note('thousands-divided', { numbers: divided.length })] : []),
    ...(settledDates && points.order.length === 1 ? [note('date-order-settled', { order: meaning.order })] : []),
  ];
}
