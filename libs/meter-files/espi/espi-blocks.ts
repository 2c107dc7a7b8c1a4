import { InputProblem } from '#libs/engine/index.js';
import { RunColumn } from '../reading-type/run-column.js';
import { TimedReadings } from '../reading-type/timed-readings.js';
import { mixedIntervals } from '../record/mixed-intervals.js';
import type { RowProblems } from '../row-problems.js';
import type { XmlElement } from '../xml/walk-xml.js';
import { readDecimal, readWhole } from '../xml/xml-numbers.js';

/** From 1950 to 2150, as seconds since 1970. */
const EPOCH_S = { min: -631_152_000, max: 5_680_281_600 };
const DURATION_S = { min: 0, max: 4_294_967_295 };
const CODE = { min: 0, max: 255 };

/** Edited, estimated, derived, projected, mixed, normalised for weather. */
const SUBSTITUTED = [7, 8, 9, 11, 12, 13, 15];
const QUESTIONABLE = 10;

/** A block whose readings have no time of their own: they follow from the block's. */
export interface UntimedBlock {
  from: number;
  to: number;
  startS: number;
  durationS: number;
  row: number;
}

/** Readings of the blocks of one meter reading. */
export class EspiBlocks {
  readonly readings = new TimedReadings();
  readonly untimed: UntimedBlock[] = [];
  /** of readings that state no quality */
  unstated = 0;

  /** Adds other blocks behind these. */
  append({ readings, untimed, unstated }: EspiBlocks): void {
    const at = this.readings.count;
    for (const block of untimed) this.untimed.push({ ...block, from: at + block.from, to: at + block.to });
    if (readings.count > 0) this.readings.append(readings);
    this.unstated += unstated;
  }

  /** Gives readings without a time of their own that of their place in their block. */
  settleTimes(lengthS: number): void {
    if (this.untimed.length === 0) return;
    const { stampS, spanS, count } = this.readings;
    const [stamps, spans] = [new RunColumn(), new RunColumn()];
    const keepTo = (to: number) => {
      for (let i = stamps.count; i < to; i++) {
        stamps.add(stampS.at(i));
        spans.add(spanS.at(i));
      }
    };
    for (const block of this.untimed) {
      const stepS = stepOf(block, lengthS);
      keepTo(block.from);
      for (let i = 0; i < block.to - block.from; i++) {
        stamps.add(block.startS + i * stepS);
        spans.add(stepS);
      }
    }
    keepTo(count);
    this.readings.stampS = stamps;
    this.readings.spanS = spans;
  }

  /** Counts readings that state no quality by the one their type states for them. */
  settleQuality(defaultQuality: number): void {
    countQuality(this.readings, defaultQuality, this.unstated);
  }
}

/** Length of the readings of a block that have no time of their own [s]. */
function stepOf({ from, to, startS, durationS, row }: UntimedBlock, lengthS: number): number {
  const count = to - from;
  const stepS = Number.isNaN(lengthS) ? durationS / count : lengthS;
  if (!(stepS > 0) || Number.isNaN(startS)) {
    const expected = 'a time for each reading, or the beginning of its block and the length of an interval';
    throw new InputProblem([{ code: 'bad-time', row, expected, found: 'neither' }]);
  }
  if (stepS * count !== durationS && !Number.isNaN(durationS)) {
    const expected = `${durationS / stepS} readings of ${stepS} s in a block of ${durationS} s`;
    throw new InputProblem([{ code: 'wrong-length', row, expected, found: `${count}` }]);
  }
  if (!Number.isInteger(stepS)) throw new InputProblem([mixedIntervals(row, Math.round(stepS), stepS)]);
  return stepS;
}

function countQuality({ counts }: TimedReadings, quality: number, readings: number): void {
  if (SUBSTITUTED.includes(quality)) counts.substituted += readings;
  if (quality === QUESTIONABLE) counts.questionable += readings;
}

/** Takes the elements of an IntervalBlock. */
export class EspiBlockParts {
  readonly #readings = new TimedReadings();
  readonly #row: number;
  #startS = Number.NaN;
  #durationS = Number.NaN;
  #untimed = 0;
  #unstated = 0;
  #reading = freshReading(0);

  constructor(row: number) {
    this.#row = row;
  }

  open({ name, row }: XmlElement): void {
    if (name === 'IntervalReading') this.#reading = freshReading(row);
  }

  take(element: XmlElement, problems: RowProblems): void {
    const { name, parent } = element;
    if (name === 'IntervalReading') this.#closeReading();
    else if (parent === 'interval' && name === 'start') this.#startS = readWhole(element, EPOCH_S, problems);
    else if (parent === 'interval' && name === 'duration') this.#durationS = readWhole(element, DURATION_S, problems);
    else if (parent === 'timePeriod' && name === 'start') this.#takeStart(element, problems);
    else if (parent === 'timePeriod' && name === 'duration')
      this.#reading.spanS = readWhole(element, DURATION_S, problems);
    else if (parent === 'IntervalReading' && name === 'value') this.#takeValue(element, problems);
    else if (parent === 'ReadingQuality' && name === 'quality')
      this.#reading.quality = readWhole(element, CODE, problems);
  }

  /** Adds the block behind those of its meter reading. */
  closeInto(blocks: EspiBlocks, problems: RowProblems): void {
    const { count } = this.#readings;
    if (this.#untimed > 0 && this.#untimed < count) {
      problems.refuse();
      const expected = 'a time for each reading of a block, or for none';
      throw new InputProblem([{ code: 'bad-time', row: this.#row, expected, found: `none for ${this.#untimed}` }]);
    }
    if (this.#untimed > 0) {
      const from = blocks.readings.count;
      const block = { from, to: from + count, startS: this.#startS, durationS: this.#durationS, row: this.#row };
      blocks.untimed.push(block);
    }
    if (count > 0) blocks.readings.append(this.#readings);
    blocks.unstated += this.#unstated;
  }

  #takeStart(element: XmlElement, problems: RowProblems): void {
    this.#reading.stampS = readWhole(element, EPOCH_S, problems);
    this.#reading.timed = element.text !== '';
  }

  #takeValue(element: XmlElement, problems: RowProblems): void {
    this.#reading.value = readDecimal(element, problems);
    this.#reading.row = element.row;
  }

  #closeReading(): void {
    const reading = this.#reading;
    if (!reading.timed) this.#untimed++;
    if (reading.quality === null) this.#unstated++;
    else countQuality(this.#readings, reading.quality, 1);
    this.#readings.add(reading);
  }
}

interface OpenReading {
  stampS: number;
  timed: boolean;
  spanS: number;
  value: number;
  row: number;
  /** null where it states none */
  quality: number | null;
}

function freshReading(row: number): OpenReading {
  return { stampS: Number.NaN, timed: false, spanS: Number.NaN, value: Number.NaN, row, quality: null };
}
