/** The bytes read so far, the row of the file they begin with, and whether there are more. */
export interface CsvView {
  bytes: Uint8Array;
  start: number;
  end: number;
  rowEnd: number;
  rowsBefore: number;
  ended: boolean;
}
