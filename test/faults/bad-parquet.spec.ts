// Parquet files that are damaged or made to harm: each is refused within a second with the place and the reason, and a sound
// one beside them is read.
import { describe, expect, it } from 'vitest';
import { type MadeColumn, type MadeParquet, madeParquet } from '../support/made-parquet.js';
import { readMeterText, refusalOf } from '../support/meter-text.js';

const ROWS = 200;
const each = (of: (row: number) => number): number[] => Array.from({ length: ROWS }, (_, row) => of(row));
const columns: MadeColumn[] = [
  {
    name: 'time',
    type: 'INT64',
    values: each((row) => Date.UTC(2024, 4, 6) + row * 900_000),
    converted: 'TIMESTAMP_MILLIS',
  },
  { name: 'kW', type: 'DOUBLE', values: each((row) => row / 4) },
  { name: 'kvar', type: 'DOUBLE', values: each((row) => 1 + (row % 3)) },
];
const made = (more: Partial<MadeParquet> = {}) => madeParquet({ columns, ...more });
const sound = made();

/** The page header's own struct for pages of rows. */
const rowsOf = (header: Record<string, unknown>) => header.field_5 as Record<string, number>;
/** A first kW page that says something else of itself. */
const withPage = (change: (header: Record<string, unknown>) => void, more: Partial<MadeParquet> = {}) => {
  let page = 0;
  return made({ ...more, pageLie: (header) => (page++ === 3 ? change(header) : undefined) });
};
const kw = (metadata: Parameters<NonNullable<MadeParquet['lie']>>[0]) => metadata.row_groups[0]!.columns[1]!.meta_data!;
const lie = (change: NonNullable<MadeParquet['lie']>) => made({ lie: change });

/** Another number of rows in a row group, said everywhere. */
function restate(metadata: Parameters<NonNullable<MadeParquet['lie']>>[0], index: number, rows: bigint): void {
  const group = metadata.row_groups[index]!;
  metadata.num_rows += rows - group.num_rows;
  group.num_rows = rows;
  for (const { meta_data: meta } of group.columns) meta!.num_values = rows;
}

/** A footer of lists within lists, each as long as a number can say. */
function listsWithoutEnd(): Uint8Array {
  const footer = Buffer.from([0x29, ...Array.from({ length: 12 }, () => [0xf9, 0xff, 0xff, 0xff, 0x7f]).flat()]);
  const length = Buffer.alloc(4);
  length.writeUInt32LE(footer.length);
  return Buffer.concat([Buffer.from('PAR1'), footer, length, Buffer.from('PAR1')]);
}

/** Snappy whose literal has a length of four bytes with the highest bit set. */
const literalWithoutEnd = Uint8Array.of(0x90, 0x03, 0xfc, 0xf0, 0xff, 0xff, 0xff);

const withTail = (length: number) => {
  const bytes = Buffer.from(sound);
  bytes.writeUInt32LE(length, bytes.length - 8);
  return bytes;
};

const BAD: [name: string, bytes: () => Uint8Array, problem: object][] = [
  ['a file cut off in the middle', () => sound.subarray(0, sound.length >> 1), { code: 'unreadable', path: 'file' }],
  ['a file of four bytes', () => sound.subarray(0, 4), { code: 'unreadable', path: 'file' }],
  [
    'an encrypted footer',
    () => Buffer.concat([sound.subarray(0, -4), Buffer.from('PARE')]),
    { code: 'not-supported-yet', found: 'an encrypted one' },
  ],
  ['a footer longer than the file', () => withTail(sound.length), { code: 'unreadable', path: 'footer' }],
  ['a footer of four gigabytes', () => withTail(0xffffffff), { code: 'unreadable', path: 'footer' }],
  ['a footer that begins elsewhere', () => withTail(99), { code: 'unreadable', path: 'footer' }],
  ['a footer of lists without end', listsWithoutEnd, { code: 'unreadable', path: 'footer' }],
  [
    'another number of rows',
    () =>
      lie((metadata) => {
        metadata.num_rows = 5n;
      }),
    { code: 'unreadable', path: 'footer' },
  ],
  [
    'rows without end',
    () =>
      lie((metadata) => {
        metadata.num_rows = 2n ** 40n;
        metadata.row_groups = [{ ...metadata.row_groups[0]!, num_rows: 2n ** 40n }];
      }),
    { code: 'too-large', path: 'footer' },
  ],
  [
    'a column of fewer values than rows, as it says itself',
    () =>
      lie((metadata) => {
        kw(metadata).num_values = 119n;
      }),
    { code: 'unreadable', path: 'row group 1, column "kW"', found: '119' },
  ],
  [
    'fewer values than rows',
    () =>
      lie((metadata) => {
        restate(metadata, 1, 90n);
      }),
    { code: 'unreadable', row: 202, column: 1, found: 'fewer values than rows' },
  ],
  [
    'more values than rows',
    () =>
      lie((metadata) => {
        restate(metadata, 0, 50n);
      }),
    { code: 'unreadable', row: 52, column: 1, found: 'more values than rows' },
  ],
  [
    'a column that is not in the file',
    () =>
      lie((metadata) => {
        kw(metadata).data_page_offset = 2n ** 40n;
      }),
    { code: 'unreadable', path: 'row group 1, column "kW"' },
  ],
  [
    'a column that begins before the file',
    () =>
      lie((metadata) => {
        kw(metadata).data_page_offset = -8n;
      }),
    { code: 'unreadable' },
  ],
  [
    'a column without end',
    () =>
      lie((metadata) => {
        kw(metadata).total_compressed_size = 2n ** 50n;
      }),
    { code: 'unreadable' },
  ],
  [
    'a column of another type',
    () =>
      lie((metadata) => {
        kw(metadata).type = 'INT64';
      }),
    { code: 'unreadable', path: 'row group 1, column "kW"' },
  ],
  [
    'columns that changed places',
    () => lie((metadata) => void metadata.row_groups[0]!.columns.reverse()),
    { code: 'unreadable' },
  ],
  [
    'a codec that is not read',
    () => made({ codec: 'ZSTD' }),
    { code: 'not-supported-yet', path: 'row group 1, column "time"', found: 'ZSTD' },
  ],
  [
    'an encoding that is not read',
    () =>
      withPage((header) => {
        rowsOf(header).field_2 = 7;
      }),
    { code: 'unreadable', row: 2, column: 2, found: 'values in the encoding DELTA_BYTE_ARRAY, which is not read' },
  ],
  [
    'a page of two gigabytes',
    () =>
      withPage((header) => {
        header.field_2 = 2_147_483_647;
      }),
    { code: 'unreadable', row: 2, column: 2 },
  ],
  [
    'a page that goes beyond its column',
    () =>
      withPage((header) => {
        header.field_3 = 60_000_000;
      }),
    { code: 'unreadable', row: 2, column: 2, found: 'a page that goes beyond its column' },
  ],
  [
    'a page of fewer bytes than it says',
    () =>
      withPage((header) => {
        header.field_2 = 4000;
      }),
    { code: 'unreadable', row: 2, column: 2 },
  ],
  [
    'a page of more values than bytes',
    () =>
      withPage((header) => {
        rowsOf(header).field_1 = 110;
      }),
    { code: 'unreadable', row: 2, column: 2, found: 'values that are cut off' },
  ],
  [
    'a page of two thousand million values',
    () =>
      withPage((header) => {
        rowsOf(header).field_1 = 2_000_000_000;
      }),
    { code: 'unreadable', row: 2, column: 2, found: 'more values than rows' },
  ],
  [
    'a page of less than no values',
    () =>
      withPage((header) => {
        rowsOf(header).field_1 = -5;
      }),
    { code: 'unreadable', row: 2, column: 2 },
  ],
  [
    'a page with another check sum',
    () =>
      withPage((header) => {
        header.field_4 = 1;
      }),
    { code: 'unreadable', row: 2, column: 2, found: 'a page with another check sum' },
  ],
  [
    'a page of a dictionary that is missing',
    () =>
      withPage((header) => {
        rowsOf(header).field_2 = 8;
      }),
    { code: 'unreadable', row: 2, column: 2 },
  ],
  [
    'a dictionary of more values than bytes',
    () => {
      let page = 0;
      return made({
        dictionary: true,
        pageLie: (header) => {
          if (page++ === 0) (header.field_7 as Record<string, number>).field_1 = 2_000_000_000;
        },
      });
    },
    { code: 'unreadable', row: 2, column: 1 },
  ],
  [
    'packed bytes that are none',
    () =>
      withPage(
        (header) => {
          header.field_2 = 399;
        },
        { codec: 'GZIP' },
      ),
    { code: 'unreadable', row: 2, column: 2 },
  ],
  [
    'a literal without end',
    () => {
      const bytes = Buffer.from(
        made({
          codec: 'SNAPPY',
          columns: columns.map((column) => ({ ...column, values: column.values.map(() => 0) })),
        }),
      );
      const at = bytes.indexOf(Uint8Array.of(0x90, 0x03));
      bytes.set(literalWithoutEnd, at);
      return bytes;
    },
    { code: 'unreadable', row: 2, column: 1 },
  ],
];

describe('a Parquet file with', () => {
  it.each(BAD)('%s is refused within a second, and the next one is read', async (_, bytes, problem) => {
    const harmful = bytes();
    const startMs = performance.now();
    const refusal = await refusalOf(harmful);
    expect(performance.now() - startMs).toBeLessThan(1000);
    expect(refusal.problems).toMatchObject([problem]);
    expect((await readMeterText(sound)).record.beginS).toHaveLength(ROWS);
  });

  it('nothing wrong is read, so that it is the change that is refused', async () => {
    const untouched = [made({ codec: 'GZIP' }), made({ dictionary: true }), withPage(() => {}), lie(() => {})];
    for (const bytes of untouched) expect((await readMeterText(bytes)).record.activeKw[7]).toBe(1.75);
  });
});
