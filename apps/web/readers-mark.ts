import { setDecimalMark } from '#libs/present/format-number.js';

/** Shows numbers with the decimal mark of the reader's language; page and workers each do so once, as they start. */
export function takeReadersMark(): void {
  setDecimalMark((0.5).toLocaleString(navigator.language).includes(',') ? ',' : '.');
}
