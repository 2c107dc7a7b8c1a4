import type { Stamp } from './stamp-text.js';

const DAY_S = 86_400;
/** 1970-01-01 as a spreadsheet counts days from 1900 (with the day that 1900-02-29 never was). */
const EPOCH_SERIAL = 25_569;
const DAY = /^(\d{5})(?:[.,](\d{1,15}))?$/;
const FRACTION = /^(?:[01]|0?[.,]\d{1,17}|\d(?:[.,]\d{1,17})?e-\d{1,2})$/i;
/** 1954 to 2119. */
const LEAST = 20_000;
const MOST = 80_000;

/**
 * Reads a spreadsheet's serial date: days since the end of 1899, the time of day as their fraction, to the nearest second.
 * @param text cell without surrounding blanks
 * @returns the stamp, or null where the text is none
 */
export function readSerialStamp(text: string): Stamp | null {
  const parts = DAY.exec(text);
  const day = Number(parts?.[1]);
  if (parts === null || day < LEAST || day > MOST) return null;
  const seconds = Math.round(Number(`0.${parts[2] ?? 0}`) * DAY_S);
  const date = new Date((day - EPOCH_SERIAL + Math.floor(seconds / DAY_S)) * DAY_S * 1000);
  return {
    dateKey: date.getUTCFullYear() * 10_000 + (date.getUTCMonth() + 1) * 100 + date.getUTCDate(),
    dateForm: 'yearFirst',
    clockS: seconds % DAY_S,
    offsetS: null,
    untilS: null,
  };
}

/**
 * Reads a time of day written as the fraction of a day, to the nearest second.
 * @param text cell without surrounding blanks
 * @returns seconds since midnight, or null where the text is none [s]
 */
export function readDayFraction(text: string): number | null {
  if (!FRACTION.test(text)) return null;
  return Math.round(Number(text.replace(',', '.')) * DAY_S);
}
