import { InputProblem, type Problem } from '#libs/engine/index.js';
import { TimedReadings } from '../reading-type/timed-readings.js';
import { RowProblems } from '../row-problems.js';
import type { XmlElement, XmlVisitor } from '../xml/walk-xml.js';
import { readDecimal } from '../xml/xml-numbers.js';
import { readCimStamp } from './cim-stamp.js';
import { type CimType, readCimType } from './cim-type.js';

/** More channels than any file of one site has. */
const MOST_SERIES = 2000;
const LONGEST_NAME = 80;

const BLOCKS = ['IntervalBlocks', 'IntervalBlock'];
const INTERVALS = ['IntervalReadings', 'IntervalReading'];
const READINGS = ['Readings', 'Reading'];
/** Edited, estimated, derived, projected: the middle one of the three codes of a quality. */
const SUBSTITUTED = [7, 8, 11, 12];
/** Failed reasonability or validation, questionable. */
const QUESTIONABLE = [5, 6, 10];
/** A reading that is known to be missing. */
const MISSING = /^\d+\.5\.259$/;

/** Readings of one type of one meter. */
export interface CimSeries extends CimType {
  meter: string;
  readings: TimedReadings;
}

/** Gathers the readings of a message, meter by meter. */
export class CimMessage implements XmlVisitor {
  /** by meter and reading type */
  readonly series = new Map<string, CimSeries>();
  readonly problems = new RowProblems();
  /** whether stamps have no offset of their own; null where there is none yet */
  local: boolean | null = null;
  #meter = { mRID: '', name: '', usagePoint: '' };
  /** readings of the open MeterReading by their type; the meter may stand behind them */
  #ofMeter = new Map<string, CimSeries>();
  /** readings of the open block; their type may stand behind them */
  #ofBlock = new TimedReadings();
  #type: CimType | null = null;
  #ref = '';
  #reading = freshReading(0);
  #typeGiven = false;
  #blockRow = 1;

  opened(element: XmlElement): void {
    const { name, parent, attributes, row } = element;
    if (name === 'MeterReading') {
      this.#meter = { mRID: '', name: '', usagePoint: '' };
      this.#ofMeter = new Map();
    } else if (BLOCKS.includes(name)) this.#openBlock(row);
    else if (READINGS.includes(name) && parent === 'MeterReading') {
      this.#openBlock(row);
      this.#reading = freshReading(row);
    } else if (INTERVALS.includes(name) && BLOCKS.includes(parent)) this.#reading = freshReading(row);
    else if (name === 'ReadingType' && attributes.ref !== undefined) this.#takeType(attributes.ref, element);
    else if (name === 'ReadingQualityType' && attributes.ref !== undefined) this.#takeQuality(attributes.ref);
  }

  closed(element: XmlElement): void {
    const { name, parent, text } = element;
    if (name === 'MeterReading') this.#closeMeter();
    else if (BLOCKS.includes(name)) this.#closeBlock();
    else if (INTERVALS.includes(name) && BLOCKS.includes(parent)) this.#closeReading();
    else if (READINGS.includes(name) && parent === 'MeterReading') {
      this.#closeReading();
      this.#closeBlock();
    } else if (name === 'ReadingType' && text !== '') this.#takeType(text, element);
    else if (name === 'ReadingQualityType' && text !== '') this.#takeQuality(text);
    else if (isReading(parent)) this.#takeField(element);
    else if (parent === 'timePeriod') this.#takePeriod(element);
    else this.#takeName(element);
  }

  #openBlock(row: number): void {
    this.#ofBlock = new TimedReadings();
    this.#type = null;
    this.#typeGiven = false;
    this.#blockRow = row;
  }

  #takeType(ref: string, element: XmlElement): void {
    if (!BLOCKS.includes(element.parent) && !READINGS.includes(element.parent)) return;
    if (this.#typeGiven && ref !== this.#ref) {
      refuse({ code: 'inconsistent', expected: 'one reading type', found: 'two' }, element);
    }
    if (!this.#typeGiven || this.#type === null) this.#type = this.#ofMeter.get(ref) ?? readCimType(ref, element);
    this.#typeGiven = true;
    this.#ref = ref;
  }

  #takeQuality(ref: string): void {
    const category = Number(ref.split('.')[1] ?? 0);
    if (MISSING.test(ref)) this.#reading.missing = true;
    if (SUBSTITUTED.includes(category)) this.#reading.substituted = true;
    if (QUESTIONABLE.includes(category)) this.#reading.questionable = true;
  }

  #takeField(element: XmlElement): void {
    if (element.name === 'value') {
      this.#reading.value = readDecimal(element, this.problems);
      this.#reading.row = element.row;
    } else if (element.name === 'timeStamp') this.#reading.stampS = this.#stamp(element);
  }

  #takePeriod(element: XmlElement): void {
    if (element.text === '') return;
    if (element.name === 'start') this.#reading.startS = this.#stamp(element);
    else if (element.name === 'end') this.#reading.endS = this.#stamp(element);
  }

  #takeName({ name, parent, text }: XmlElement): void {
    if (text === '') return;
    const label = text.slice(0, LONGEST_NAME);
    if (name === 'mRID' && parent === 'Meter') this.#meter.mRID = label;
    else if (name === 'mRID' && parent === 'UsagePoint') this.#meter.usagePoint = label;
    else if (name === 'name' && parent === 'Names' && this.#meter.name === '') this.#meter.name = label;
  }

  #stamp(element: XmlElement): number {
    const stamp = readCimStamp(element, this.problems);
    if (stamp === null) return Number.NaN;
    this.local ??= stamp.local;
    if (this.local !== stamp.local) {
      const expected = this.local ? 'stamps without an offset, as before' : 'stamps with an offset, as before';
      refuse({ code: 'bad-time', expected, found: element.text }, element);
    }
    return stamp.clockS;
  }

  #closeReading(): void {
    const { stampS, startS, endS, value, row, missing, substituted, questionable } = this.#reading;
    const atS = Number.isNaN(endS) ? stampS : endS;
    if (Number.isNaN(atS)) {
      this.problems.add({ code: 'bad-time', row, expected: 'a time stamp', found: 'none' });
      return;
    }
    if (startS > endS) {
      this.problems.add({ code: 'bad-time', row, expected: 'a period that ends behind its start', found: 'another' });
    }
    const readings = this.#ofBlock;
    readings.add({ stampS: atS, spanS: endS - startS, value: missing ? Number.NaN : value, row });
    if (substituted && !missing) readings.counts.substituted++;
    if (questionable && !missing) readings.counts.questionable++;
  }

  #closeBlock(): void {
    if (this.#ofBlock.count === 0) return;
    if (this.#type === null) {
      this.problems.refuse();
      const found = 'none';
      throw new InputProblem([{ code: 'missing', row: this.#blockRow, expected: 'the type of the readings', found }]);
    }
    const { type, intervalS } = this.#type;
    const known = this.#ofMeter.get(this.#ref);
    if (known !== undefined) known.readings.append(this.#ofBlock);
    else this.#ofMeter.set(this.#ref, { type, intervalS, meter: '', readings: this.#ofBlock });
    this.#ofBlock = new TimedReadings();
  }

  #closeMeter(): void {
    const meter = this.#meter.mRID || this.#meter.name || this.#meter.usagePoint || 'unnamed';
    for (const [ref, series] of this.#ofMeter) {
      const key = `${meter}\n${ref}`;
      const known = this.series.get(key);
      if (known !== undefined) known.readings.append(series.readings);
      else this.series.set(key, { ...series, meter });
    }
    this.#ofMeter = new Map();
    if (this.series.size <= MOST_SERIES) return;
    const expected = `at most ${MOST_SERIES} series of readings`;
    throw new InputProblem([{ code: 'too-large', row: this.#blockRow, expected, found: 'more' }]);
  }
}

function isReading(name: string): boolean {
  return INTERVALS.includes(name) || READINGS.includes(name);
}

function refuse(problem: Problem, { row, column }: XmlElement): never {
  throw new InputProblem([{ row, column, ...problem }]);
}

function freshReading(row: number) {
  const [stampS, startS, endS, value] = [Number.NaN, Number.NaN, Number.NaN, Number.NaN];
  return { stampS, startS, endS, value, row, missing: false, substituted: false, questionable: false };
}
