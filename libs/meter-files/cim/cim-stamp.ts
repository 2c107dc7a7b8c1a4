import { shown } from '#libs/contract/shown.js';
import { dayNumber } from '#libs/engine/index.js';
import type { RowProblems } from '../row-problems.js';
import { isDate } from '../time/date-orders.js';
import type { XmlElement } from '../xml/walk-xml.js';

const DATE_TIME =
  /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2})(?::(\d{2})(?:\.(\d{1,9}))?)?(?:(Z)|([-+])(\d{2}):?(\d{2}))?$/;
const DAY_S = 86_400;

/** A time as a message writes it. */
export interface CimStamp {
  /** UTC, or of the local clock [s] */
  clockS: number;
  /** without an offset of its own */
  local: boolean;
}

/**
 * Reads a date and time by ISO 8601 as XML Schema writes it; fractions of a second are cut.
 * @param element with its text
 * @param problems takes the refusal
 * @returns null where it is refused
 */
export function readCimStamp({ text, row, column }: XmlElement, problems: RowProblems): CimStamp | null {
  const parts = text.length > 40 ? null : DATE_TIME.exec(text);
  const stamp = parts === null ? null : stampOf(parts);
  if (stamp === null) {
    const expected = 'a date and time such as 2024-05-06T00:15:00Z';
    problems.add({ code: 'bad-time', row, column, expected, found: shown(text) });
  }
  return stamp;
}

function stampOf(parts: RegExpExecArray): CimStamp | null {
  const number = (index: number) => Number(parts[index] ?? 0);
  const date = { year: number(1), month: number(2), day: number(3) };
  const secondS = number(4) * 3600 + number(5) * 60 + number(6);
  if (!isDate(date) || number(5) > 59 || number(6) > 59 || secondS > DAY_S || number(11) > 59) return null;
  const offsetS = (parts[9] === '-' ? -1 : 1) * (number(10) * 3600 + number(11) * 60);
  if (Math.abs(offsetS) > 18 * 3600) return null;
  const local = parts[8] === undefined && parts[9] === undefined;
  return { clockS: dayNumber(date.year, date.month, date.day) * DAY_S + secondS - offsetS, local };
}
