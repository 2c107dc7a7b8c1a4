import { createHash } from 'node:crypto';
import type { MeterMap } from '#libs/contract/meter-map.js';
import type { QuestionReading } from '#libs/contract/question.js';
import type { RecordColumns } from './build-columns.js';

const SHOWN_ROWS = 3;
const PRINTED_AT_ONCE = 8192;
const PRINTED = [
  'beginS',
  'activeKw',
  'laggingKvar',
  'leadingKvar',
  'voltageV',
  'connectedKvar',
  'standby',
] as const satisfies (keyof RecordColumns)[];

/** What a question tells of a reading, gathered part by part, so that its columns need not be held. */
export class ReadingShown {
  #maxKw = Number.NaN;
  #sumKw = 0;
  #intervalS = 0;
  readonly #firstRows: string[][] = [];

  /**
   * Takes further intervals.
   * @param columns of the intervals that follow those before
   */
  take(columns: RecordColumns): void {
    const { intervalS, beginS, activeKw, laggingKvar, leadingKvar } = columns;
    this.#intervalS = intervalS;
    for (const kw of activeKw) {
      if (!(kw <= this.#maxKw)) this.#maxKw = kw;
      this.#sumKw += Math.max(kw, 0);
    }
    for (let i = 0; i < beginS.length && this.#firstRows.length < SHOWN_ROWS; i++) {
      const powers = [activeKw, laggingKvar, leadingKvar].map((column) => String(column[i]));
      this.#firstRows.push([utcStamp(beginS[i]!), ...powers]);
    }
  }

  /**
   * Greatest kW, imported kWh and the first intervals in UTC, kW, lagging and leading kvar.
   * @param map what settles it this way
   */
  reading(map: MeterMap): QuestionReading {
    const maxKw = Number.isNaN(this.#maxKw) ? 0 : this.#maxKw;
    return { map, maxKw, activeKwh: (this.#sumKw * this.#intervalS) / 3600, firstRows: this.#firstRows };
  }
}

/** A print of a reading's columns, gathered part by part, whichever parts they come in. */
export class ColumnsPrint {
  #intervalS = 0;
  readonly #prints = PRINTED.map(() => createHash('sha256'));
  readonly #absent = new Set<string>();
  readonly #part = new Float64Array(PRINTED_AT_ONCE);

  /**
   * Takes further intervals.
   * @param columns of the intervals that follow those before
   */
  take(columns: RecordColumns): void {
    this.#intervalS = columns.intervalS;
    for (const [k, name] of PRINTED.entries()) this.#printColumn(k, columns[name]);
  }

  /** Equal where two readings make one record, and as good as never elsewhere; asked for once, at the end. */
  text(): string {
    const prints = PRINTED.map((name, k) => (this.#absent.has(name) ? 'none' : this.#prints[k]!.digest('hex')));
    return [this.#intervalS, ...prints].join(' ');
  }

  #printColumn(k: number, column: Float64Array | Uint8Array | null): void {
    if (column === null) {
      this.#absent.add(PRINTED[k]!);
      return;
    }
    const part = this.#part;
    for (let from = 0; from < column.length; from += PRINTED_AT_ONCE) {
      const count = Math.min(PRINTED_AT_ONCE, column.length - from);
      // adding 0 makes 0 of −0, which is the same number
      for (let i = 0; i < count; i++) part[i] = column[from + i]! + 0;
      this.#prints[k]!.update(part.subarray(0, count));
    }
  }
}

/**
 * A reading as a question shows it, see ReadingShown.
 * @param map what settles it this way
 * @param columns what would come of it
 */
export function shownReading(map: MeterMap, columns: RecordColumns): QuestionReading {
  const shown = new ReadingShown();
  shown.take(columns);
  return shown.reading(map);
}

/**
 * A moment as an ISO 8601 stamp in UTC, to the second.
 * @param momentS UTC [s]
 */
export function utcStamp(momentS: number): string {
  const iso = new Date(momentS * 1000).toISOString();
  return momentS === Math.floor(momentS) ? `${iso.slice(0, -5)}Z` : iso;
}

/**
 * Whether two readings make one record.
 * @param a columns of the first
 * @param b columns of the second
 */
export function sameColumns(a: RecordColumns, b: RecordColumns): boolean {
  return (
    a.intervalS === b.intervalS &&
    same(a.beginS, b.beginS) &&
    same(a.activeKw, b.activeKw) &&
    same(a.laggingKvar, b.laggingKvar) &&
    same(a.leadingKvar, b.leadingKvar) &&
    same(a.voltageV, b.voltageV) &&
    same(a.connectedKvar, b.connectedKvar) &&
    same(a.standby, b.standby)
  );
}

function same(a: Float64Array | Uint8Array | null, b: Float64Array | Uint8Array | null): boolean {
  if (a === null || b === null) return a === b;
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return false;
  return true;
}
