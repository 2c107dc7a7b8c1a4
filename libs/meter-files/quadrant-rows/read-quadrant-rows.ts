import type { MeterMap } from '#libs/contract/meter-map.js';
import { Question, type QuestionAsked } from '#libs/contract/question.js';
import { InputProblem } from '#libs/engine/index.js';
import type { DecimalSign } from '../csv/decimal-mark.js';
import { readCsv } from '../csv/read-csv.js';
import { LONGEST_ROW_BYTES, RowBuffer } from '../csv/row-buffer.js';
import { RowCells } from '../csv/row-cells.js';
import type { MeterBytes } from '../meter-bytes.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { closeReading, type ReadResult } from '../record/close-reading.js';
import { ConflictingRows } from '../record/interval-grid.js';
import { sameColumns, shownReading } from '../record/reading-shown.js';
import { dateOrders } from '../time/date-orders.js';
import { QuadrantReader } from './quadrant-reader.js';
import { type QuadrantMeaning, quadrantRecord } from './quadrant-record.js';

const SEMICOLON = 0x3b;

/**
 * Reads rows of stamp; season flag; AI; AE; R1; R2; R3; R4.
 * @param source the file
 * @param options what is said about it; a map that numbers columns makes it plain delimited text
 * @returns the record and its quality
 * @throws InputProblem where it can't be read, Question where it can be read in several ways
 */
export async function readQuadrantRows(source: MeterBytes, options: ReadOptions): Promise<MeterReading> {
  const map = options.map ?? {};
  if (map.columns !== undefined || map.headerRow !== undefined) return readCsv(source, options);
  const reader = new QuadrantReader(map);
  const buffer = new RowBuffer(source);
  const cells = new RowCells();
  do {
    for (;;) {
      const marks = { delimiter: SEMICOLON, rowEnd: buffer.rowEnd };
      const next = cells.split(buffer.bytes, buffer.start, buffer.end, marks);
      if (next < 0) break;
      buffer.start = next;
      reader.take(cells, ++buffer.rowsBefore);
    }
    if (buffer.end - buffer.start > LONGEST_ROW_BYTES) buffer.refuseEndlessRow();
  } while (await buffer.more());
  reader.end(buffer.end > buffer.start ? buffer.rowsBefore + 1 : 0);
  return closeReading(settled(reader, options), map);
}

interface Attempt {
  meaning: QuadrantMeaning;
  result: ReadResult;
}

/** The record that every meaning gives, or the question which of them it is. */
function settled(reader: QuadrantReader, options: ReadOptions): ReadResult {
  const map = options.map ?? {};
  const { mark } = reader;
  const open = mark.sign === null && mark.openDots.count + mark.openCommas.count > 0;
  const decimals: (DecimalSign | null)[] = open ? ['.', ','] : [mark.sign];
  const orders = dateOrders(reader.rows, map.dateOrder);
  const meanings = decimals.flatMap((decimal) => orders.map((order) => ({ decimal, order })));
  try {
    return among(
      reader,
      options,
      meanings.map((meaning) => ({ ...meaning, keep: map.keepRow })),
    );
  } catch (problem) {
    if (!(problem instanceof ConflictingRows)) throw problem;
    const both = (['first', 'last'] as const).flatMap((keep) => meanings.map((meaning) => ({ ...meaning, keep })));
    try {
      among(reader, options, both);
    } catch (question) {
      if (question instanceof Question) throw new Question(question.questions, { row: problem.row });
    }
    throw problem;
  }
}

function among(reader: QuadrantReader, options: ReadOptions, meanings: QuadrantMeaning[]): ReadResult {
  const attempts: Attempt[] = [];
  let failure: unknown;
  for (const meaning of meanings) {
    try {
      attempts.push({ meaning, result: quadrantRecord(reader, options, meaning) });
    } catch (problem) {
      if (!(problem instanceof InputProblem)) throw problem;
      failure ??= problem;
    }
  }
  const [first] = attempts;
  if (first === undefined) throw failure;
  const questions = (['decimal', 'order', 'keep'] as const).flatMap((point) => asked(point, attempts));
  if (questions.length > 0) throw new Question(questions);
  return first.result;
}

type Point = keyof QuadrantMeaning;

const ASKED: Record<Point, { id: string; about: string; map: (meaning: QuadrantMeaning) => MeterMap }> = {
  decimal: {
    id: 'decimal',
    about: 'whether the mark in numbers such as 1,234 or 1.234 is the decimal mark or divides thousands',
    map: ({ decimal }) => (decimal === null ? {} : { decimal }),
  },
  order: {
    id: 'dateOrder',
    about: 'whether dates such as 03/04 have the day or the month first',
    map: ({ order }) => ({ dateOrder: order }),
  },
  keep: {
    id: 'keepRow',
    about: 'which of several rows with the same time and different values counts',
    map: ({ keep }) => (keep === undefined ? {} : { keepRow: keep }),
  },
};

function asked(point: Point, attempts: Attempt[]): QuestionAsked[] {
  const [first] = attempts;
  const others = (Object.keys(ASKED) as Point[]).filter((other) => other !== point);
  const distinct: Attempt[] = [];
  for (const attempt of attempts) {
    if (!others.every((other) => attempt.meaning[other] === first!.meaning[other])) continue;
    if (!distinct.some(({ result }) => sameColumns(result.columns, attempt.result.columns))) distinct.push(attempt);
  }
  if (distinct.length < 2) return [];
  const { id, about, map } = ASKED[point];
  return [{ id, about, readings: distinct.map(({ meaning, result }) => shownReading(map(meaning), result.columns)) }];
}
