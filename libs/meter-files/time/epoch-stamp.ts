import type { Stamp } from './stamp-text.js';

const COUNT = /^(\d{9,10}|\d{12,13})(?:[.,]0+)?$/;
/** 2000 and 2033: within them no count of seconds can be taken for one of milliseconds, or for a date in digits. */
const EARLIEST_S = 946_684_800;
const LATEST_S = 2_000_000_000;
const DAY_S = 86_400;

/**
 * Reads a count of whole seconds or milliseconds since 1970 UTC.
 * @param text cell without surrounding blanks
 * @returns the stamp in UTC, or null where the text is none
 */
export function readEpochStamp(text: string): Stamp | null {
  const digits = COUNT.exec(text)?.[1];
  if (digits === undefined) return null;
  const epochS = digits.length > 10 ? Number(digits) / 1000 : Number(digits);
  if (epochS < EARLIEST_S || epochS >= LATEST_S || !Number.isInteger(epochS)) return null;
  const date = new Date(epochS * 1000);
  return {
    dateKey: date.getUTCFullYear() * 10_000 + (date.getUTCMonth() + 1) * 100 + date.getUTCDate(),
    dateForm: 'yearFirst',
    clockS: epochS % DAY_S,
    offsetS: 0,
    untilS: null,
  };
}
