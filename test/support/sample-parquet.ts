import { parquetWriteBuffer } from 'hyparquet-writer';
import { type MadeColumn, madeParquet } from './made-parquet.js';
import { loadAt, type SampleFile } from './sample-workbooks.js';

const ROWS = 150;
const FIRST_MS = Date.UTC(2024, 4, 6);
const UTC = { type: 'TIMESTAMP', isAdjustedToUTC: true, unit: 'MILLIS' } as const;

const each = <T>(of: (row: number) => T): T[] => Array.from({ length: ROWS }, (_, row) => of(row));
const loads: MadeColumn[] = [
  { name: 'active power [kW]', type: 'DOUBLE', values: each((row) => loadAt(row).kw) },
  { name: 'reactive power [kvar]', type: 'DOUBLE', values: each((row) => loadAt(row).kvar) },
];
const stamps: MadeColumn = {
  name: 'interval begin',
  type: 'INT64',
  values: each((row) => FIRST_MS + row * 900_000),
  logical: UTC,
};
const gaps = loads.map((column) => ({
  ...column,
  values: column.values.map((value, row) => (row % 11 === 5 ? null : value)),
}));

/** Parquet files of the usual kinds: pages of both kinds, codecs, dictionaries, missing values, texts and decimals. */
export function sampleParquet(): SampleFile[] {
  const written = parquetWriteBuffer({
    columnData: [
      { name: 'time', data: each((row) => new Date(FIRST_MS + row * 900_000)), type: 'TIMESTAMP' },
      { name: 'kW', data: each((row) => loadAt(row).kw), type: 'DOUBLE' },
      { name: 'kvar', data: each((row) => (row % 13 === 3 ? null : loadAt(row).kvar)), type: 'DOUBLE' },
      { name: 'feeder', data: each(() => 'F7'), type: 'STRING' },
    ],
    rowGroupSize: 64,
  });
  const decimals = loads.map((column) => ({
    ...column,
    type: 'INT64' as const,
    converted: 'DECIMAL' as const,
    scale: 3,
    values: column.values.map((value) => BigInt(Math.round((value as number) * 1000))),
  }));
  const texts = {
    ...stamps,
    type: 'BYTE_ARRAY' as const,
    converted: 'UTF8' as const,
    logical: undefined,
    values: stamps.values.map((ms) => new Date(ms as number).toISOString().slice(0, 16)),
  };
  const mark: MadeColumn = {
    name: 'mark',
    type: 'FIXED_LEN_BYTE_ARRAY',
    length: 2,
    values: each((row) => Uint8Array.of(row, 0)),
  };
  return [
    { name: 'a column of marks, left out', bytes: madeParquet({ columns: [mark, stamps, ...loads] }) },
    { name: 'pages of the second kind, packed', bytes: new Uint8Array(written) },
    { name: 'plain pages of the first kind', bytes: madeParquet({ columns: [stamps, ...loads] }) },
    {
      name: 'packed with a dictionary',
      bytes: madeParquet({ columns: [stamps, ...gaps], codec: 'SNAPPY', dictionary: true }),
    },
    { name: 'deflated, values missing', bytes: madeParquet({ columns: [stamps, ...gaps], codec: 'GZIP' }) },
    { name: 'texts and decimals', bytes: madeParquet({ columns: [texts, ...decimals], codec: 'BROTLI' }) },
  ].map(({ name, bytes }) => ({ name, bytes: Uint8Array.from(bytes) }));
}
