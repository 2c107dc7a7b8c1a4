import { shown } from '#libs/contract/shown.js';
import type { Problem } from '#libs/engine/index.js';
import { MAX_INTERVALS } from '../meter-format.js';
import type { RowProblems } from '../row-problems.js';
import { refuseTooLong } from '../time/stamped-rows.js';
import { type ProfileHeader, readProfileHeader, valuesBehind } from './profile-header.js';

/** A head with the values of the intervals that follow it, row after row of its columns. */
export interface Stretch {
  header: ProfileHeader;
  values: number[];
  /** row of the file of each interval */
  rows: number[];
  /** row of the head */
  row: number;
}

/** Everything read out of one meter. */
export interface Readout {
  meter: string;
  stretches: Stretch[];
  /** ratios of the instrument transformers, as the meter states them */
  currentRatio: number | null;
  voltageRatio: number | null;
}

const GROUPS = /\(([^()]*)\)/g;
const LINE = /^([^()]*)((?:\([^()]*\))+)$/;
const PROFILE = /(?:^|:)P\.0[12]$/;
const NUMBER = /(?:^|:)(?:C\.1\.0|0\.0\.[0-9])$/;
const VALUE = /^-?\d{1,12}(?:\.\d{0,9})?$/;

/** Takes the lines of read-outs in order. */
export class ProfileStretches {
  readonly readouts: Readout[] = [];
  values = 0;
  readonly #problems: RowProblems;
  #readout: Readout | null = null;
  #stretch: Stretch | null = null;

  constructor(problems: RowProblems) {
    this.#problems = problems;
  }

  /**
   * Takes a line; control characters of the transmission are taken away before.
   * @param line text
   * @param row of the file, counted from 1
   */
  take(line: string, row: number): void {
    const text = withoutControls(line);
    if (text === '') return;
    if (text.startsWith('/')) {
      this.#stretch = null;
      this.#begin('');
      return;
    }
    if (text === '!') {
      this.#stretch = null;
      return;
    }
    const parts = LINE.exec(text);
    if (parts === null) {
      const expected = 'an identification code and values in round brackets';
      this.#problems.add({ code: 'unreadable', row, expected, found: shown(text) });
      return;
    }
    const groups = [...parts[2]!.matchAll(GROUPS)].map(([, content]) => content!.trim());
    this.#takeParts(parts[1]!.trim(), groups, row);
  }

  #takeParts(code: string, groups: string[], row: number): void {
    if (code === '') {
      if (this.#stretch !== null) this.#addValues(this.#stretch, groups, row);
      return;
    }
    this.#stretch = null;
    if (PROFILE.test(code)) this.#takeHeader(groups, row);
    else this.#takeFact(code, groups[0]!);
  }

  #takeHeader(groups: string[], row: number): void {
    const header = readProfileHeader(groups, row);
    if ('code' in header) {
      this.#problems.add(header as Problem);
      return;
    }
    this.#stretch = { header, values: [], rows: [], row };
    this.#current().stretches.push(this.#stretch);
    const values = valuesBehind(groups, header);
    if (values.length > 0) this.#addValues(this.#stretch, values, row);
  }

  #addValues({ header, values, rows }: Stretch, groups: readonly string[], row: number): void {
    const width = header.columns.length;
    if (groups.length % width !== 0) {
      this.#problems.add({ code: 'wrong-length', row, expected: `${width} values`, found: `${groups.length}` });
      return;
    }
    for (const [k, text] of groups.entries()) {
      this.values++;
      if (this.values > 8 * MAX_INTERVALS) refuseTooLong(row);
      values.push(this.#number(text, row, k + 1));
      if (k % width === 0) rows.push(row);
    }
  }

  #number(text: string, row: number, column: number): number {
    const bare = text.replace(/\*[A-Za-z]+$/, '');
    if (VALUE.test(bare)) return Number(bare) + 0;
    if (!/^-*(?:\.-*)?$/.test(bare)) {
      this.#problems.add({ code: 'bad-number', row, column, expected: 'a number', found: shown(text) });
    }
    return Number.NaN;
  }

  #takeFact(code: string, value: string): void {
    const readout = this.#current();
    if (NUMBER.test(code) && readout.meter === '') readout.meter = value.slice(0, 80);
    if (/(?:^|:)0\.4\.2$/.test(code)) readout.currentRatio = ratioOf(value);
    if (/(?:^|:)0\.4\.3$/.test(code)) readout.voltageRatio = ratioOf(value);
  }

  #begin(meter: string): void {
    this.#readout = { meter, stretches: [], currentRatio: null, voltageRatio: null };
    this.readouts.push(this.#readout);
  }

  #current(): Readout {
    if (this.#readout === null) this.#begin('');
    return this.#readout!;
  }
}

const ACK = 0x06;
const ETX = 0x03;

/** STX before the data and ETX with its check character behind them belong to the transmission. */
function withoutControls(line: string): string {
  let from = 0;
  while (line.charCodeAt(from) >= 0x01 && line.charCodeAt(from) <= ACK && line.charCodeAt(from) !== ETX) from++;
  const end = line.indexOf(String.fromCharCode(ETX), from);
  return line.slice(from, end < 0 ? undefined : end).trim();
}

/** 80, 400/5 or 20000:100 */
function ratioOf(text: string): number | null {
  const parts = /^(\d{1,9}(?:\.\d{1,6})?)(?:\s*[/:]\s*(\d{1,9}(?:\.\d{1,6})?))?(?:\*\S+)?$/.exec(text);
  if (parts === null) return null;
  const ratio = Number(parts[1]) / Number(parts[2] ?? 1);
  return Number.isFinite(ratio) && ratio > 0 ? ratio : null;
}
