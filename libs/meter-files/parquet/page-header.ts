import { PageError } from './page-error.js';
import { ThriftError, ThriftReader, type ThriftStruct } from './thrift.js';

/** What a page says of itself (Parquet's PageHeader). */
export interface PageHeader {
  kind: 'rows' | 'rowsV2' | 'dictionary' | 'other';
  headerBytes: number;
  /** sizes of the content and of the packed content behind the header [bytes] */
  bytes: number;
  packedBytes: number;
  crc: number | null;
  /** values of the page, missing ones included */
  values: number;
  encoding: string;
  levelEncoding: string;
  /** of a page of the second kind: sizes of its levels, and whether its values are packed */
  levelBytes: number;
  repeatBytes: number;
  packed: boolean;
}

const MOST_VALUES = 400;
const ENCODINGS = [
  'PLAIN',
  'GROUP_VAR_INT',
  'PLAIN_DICTIONARY',
  'RLE',
  'BIT_PACKED',
  'DELTA_BINARY_PACKED',
  'DELTA_LENGTH_BYTE_ARRAY',
  'DELTA_BYTE_ARRAY',
  'RLE_DICTIONARY',
  'BYTE_STREAM_SPLIT',
];
const KINDS = ['rows', 'other', 'dictionary', 'rowsV2'] as const;
/** Fields that hold the header of each kind. */
const FIELDS = { rows: 5, other: 6, dictionary: 7, rowsV2: 8 } as const;

/**
 * Reads the header that a page begins with.
 * @param bytes the page, or as much of it as a header may take
 * @throws PageError where there is none
 */
export function readPageHeader(bytes: Uint8Array): PageHeader {
  const reader = new ThriftReader(bytes, MOST_VALUES);
  const header = structOf(reader);
  const kind = KINDS[numberIn(header, 1)] ?? 'other';
  const own = header.get(FIELDS[kind]);
  const fields: ThriftStruct = own instanceof Map ? own : new Map();
  if (fields.size === 0 && kind !== 'other') throw new PageError('a page without its header');
  const second = kind === 'rowsV2';
  const crc = header.get(4);
  return {
    kind,
    headerBytes: reader.offset,
    bytes: numberIn(header, 2),
    packedBytes: numberIn(header, 3),
    crc: typeof crc === 'number' ? crc : null,
    values: kind === 'other' ? 0 : numberIn(fields, 1),
    encoding: kind === 'other' ? '' : encodingIn(fields, second ? 4 : 2),
    levelEncoding: kind === 'rows' ? encodingIn(fields, 3) : 'RLE',
    levelBytes: second ? numberIn(fields, 5) : 0,
    repeatBytes: second ? numberIn(fields, 6) : 0,
    packed: fields.get(7) !== false,
  };
}

function structOf(reader: ThriftReader): ThriftStruct {
  try {
    return reader.struct();
  } catch (error) {
    if (error instanceof ThriftError) throw new PageError('a page without a header');
    throw error;
  }
}

function numberIn(fields: ThriftStruct, id: number): number {
  const value = fields.get(id);
  if (typeof value !== 'number' || value < 0) throw new PageError('a page header without its numbers');
  return value;
}

function encodingIn(fields: ThriftStruct, id: number): string {
  const number = numberIn(fields, id);
  return ENCODINGS[number] ?? `number ${number}`;
}
