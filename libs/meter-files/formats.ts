import { readCsv } from './csv/read-csv.js';
import type { MeterFormat } from './meter-format.js';
import { isNem12 } from './nem12/nem12-records.js';
import { readNem12 } from './nem12/read-nem12.js';
import { isQuadrantRows } from './quadrant-rows/quadrant-line.js';
import { readQuadrantRows } from './quadrant-rows/read-quadrant-rows.js';

/** Every format that is read, in the order in which a file is tried against them; delimited text takes what is left. */
export const FORMATS: readonly MeterFormat[] = [
  {
    name: 'nem12',
    title: 'NEM12 interval meter data',
    described: ['AEMO, Meter Data File Format Specification NEM12 & NEM13, version 1.06, 1 December 2017'],
    recognises: isNem12,
    read: readNem12,
  },
  {
    name: 'quadrant-rows',
    title: 'Quarter-hour rows by quadrant with a season flag',
    described: [
      'IEC 62053-23, annex on the geometric representation of active and reactive power (the four quadrants)',
      'IEC 62056-6-1, value group C, 1 and 2 (active energy), 5 to 8 (reactive energy of quadrants I to IV)',
    ],
    recognises: isQuadrantRows,
    read: readQuadrantRows,
  },
  {
    name: 'csv',
    title: 'Delimited text with a header row',
    described: [
      'RFC 4180, Common Format and MIME Type for Comma-Separated Values (CSV) Files, https://www.rfc-editor.org/rfc/rfc4180',
      'ISO 8601-1:2019, Date and time',
    ],
    recognises: (head) => !head.subarray(0, 512).includes(0),
    read: readCsv,
  },
];
