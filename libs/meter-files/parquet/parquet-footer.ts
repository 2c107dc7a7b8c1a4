import { type FileMetaData, parquetMetadata, type RowGroup, type SchemaElement } from 'hyparquet';
import { InputProblem } from '#libs/engine/index.js';
import { damaged } from '../sheet/read-sheet-text.js';
import type { SpooledFile } from '../spooled-file.js';
import { CODECS } from './inflate-page.js';
import { ThriftReader } from './thrift.js';

/** A column under the root. */
export interface NamedColumn {
  element: SchemaElement;
  /** its place among the columns of every row group; −1 where it is a list or a group and has no single value a row */
  leaf: number;
}

/** What the end of a file says of its rows. */
export interface Footer {
  columns: NamedColumn[];
  groups: RowGroup[];
  /** where the last column may end */
  dataEnd: number;
}

const MAGIC = 'PAR1';
const ENCRYPTED = 'PARE';
const TAIL_BYTES = 8;
const MOST_FOOTER_BYTES = 16_777_216;
const MOST_VALUES = 1_000_000;
const MOST_COLUMNS = 1000;
/** More than twice the longest record; what stands beyond would be refused anyway. */
const MOST_ROWS = 12_000_000;
const PART = 'footer';

/**
 * Reads the footer (Parquet's FileMetaData): columns and row groups, every claim checked against the file.
 * @param file the file
 * @throws InputProblem where it is damaged, lies, or is of a kind that is not read
 */
export async function readFooter(file: SpooledFile): Promise<Footer> {
  const tail = await file.read(file.sizeBytes - TAIL_BYTES, TAIL_BYTES);
  const magic = Buffer.from(tail.subarray(4)).toString('latin1');
  if (magic === ENCRYPTED) {
    throw new InputProblem([
      { code: 'not-supported-yet', expected: 'a Parquet file in the clear', found: 'an encrypted one' },
    ]);
  }
  if (tail.length < TAIL_BYTES || magic !== MAGIC) {
    throw damaged('file', `the end of a Parquet file, ${MAGIC}`, 'a file that is cut off or damaged');
  }
  const length = Buffer.from(tail).readUInt32LE(0);
  const dataEnd = file.sizeBytes - TAIL_BYTES - length;
  if (dataEnd < MAGIC.length) throw damaged(PART, `at most ${file.sizeBytes} bytes`, `${length}, as the file says`);
  if (length > MOST_FOOTER_BYTES) {
    throw new InputProblem([
      { code: 'too-large', path: PART, expected: `at most ${MOST_FOOTER_BYTES} bytes`, found: String(length) },
    ]);
  }
  const metadata = metadataOf(await file.read(dataEnd, length + TAIL_BYTES));
  const footer = { columns: columnsOf(metadata.schema), groups: metadata.row_groups, dataEnd };
  refuseRows(metadata);
  for (const [index, group] of footer.groups.entries()) checkGroup(group, index, footer);
  return footer;
}

/** The structure is read within bounds first: the package that knows its fields allocates what a length says. */
function metadataOf(bytes: Uint8Array): FileMetaData {
  try {
    new ThriftReader(bytes, MOST_VALUES).struct();
    return parquetMetadata(bytes, { geoparquet: false });
  } catch {
    throw damaged(PART, 'a description of columns and rows', 'damaged bytes');
  }
}

/** The columns right under the root; what is in groups is passed over. */
function columnsOf(schema: readonly SchemaElement[]): NamedColumn[] {
  const columns: NamedColumn[] = [];
  let leaf = 0;
  let open = 0;
  for (const element of schema.slice(1)) {
    const top = open === 0;
    const children = element.num_children ?? 0;
    if (open > 0) open--;
    open += children;
    const single = children === 0 && element.repetition_type !== 'REPEATED';
    if (top) columns.push({ element, leaf: single ? leaf : -1 });
    if (children === 0) leaf++;
  }
  const names = columns.map(({ element }) => element.name);
  if (names.some((name) => typeof name !== 'string')) throw damaged(PART, 'a name for every column', 'none');
  if (columns.length > MOST_COLUMNS) {
    const found = String(columns.length);
    throw new InputProblem([{ code: 'too-large', path: PART, expected: `at most ${MOST_COLUMNS} columns`, found }]);
  }
  return columns;
}

function refuseRows({ num_rows: said, row_groups: groups }: FileMetaData): void {
  let sum = 0n;
  for (const { num_rows: rows } of groups) {
    if (typeof rows !== 'bigint' || rows < 0n) throw damaged(PART, 'a number of rows in every row group', 'none');
    sum += rows;
  }
  if (sum !== said) throw damaged(PART, `${said} rows in the row groups, as the file says`, `${sum}`);
  if (sum <= BigInt(MOST_ROWS)) return;
  throw new InputProblem([{ code: 'too-large', path: PART, expected: `at most ${MOST_ROWS} rows`, found: `${sum}` }]);
}

function checkGroup(group: RowGroup, index: number, { columns, dataEnd }: Footer): void {
  for (const { element, leaf } of columns.filter((column) => column.leaf >= 0)) {
    const path = `row group ${index + 1}, column ${JSON.stringify(element.name.slice(0, 60))}`;
    const meta = group.columns?.[leaf]?.meta_data;
    if (meta === undefined) throw damaged(path, 'a place in the file', 'none');
    if (meta.type !== element.type || meta.path_in_schema?.[0] !== element.name) {
      throw damaged(
        path,
        `values of ${element.type ?? 'a type'}`,
        `${meta.path_in_schema?.[0]}, ${meta.type ?? 'none'}`,
      );
    }
    if (meta.num_values !== group.num_rows) {
      throw damaged(path, `${group.num_rows} values, one a row`, String(meta.num_values));
    }
    if (!CODECS.includes(meta.codec)) {
      const expected = `a codec that is read: ${CODECS.join(', ')}`;
      throw new InputProblem([{ code: 'not-supported-yet', path, expected, found: String(meta.codec) }]);
    }
    const { from, to } = rangeOf(group, leaf);
    if (!(from >= MAGIC.length && to > from && to <= dataEnd)) {
      throw damaged(path, `bytes between ${MAGIC.length} and ${dataEnd}`, `${from} to ${to}`);
    }
  }
}

/**
 * Where the pages of a column stand in the file.
 * @param group the row group
 * @param leaf the column's place in it
 */
export function rangeOf(group: RowGroup, leaf: number): { from: number; to: number } {
  const meta = group.columns[leaf]!.meta_data!;
  const data = Number(meta.data_page_offset);
  const dictionary = Number(meta.dictionary_page_offset ?? 0);
  const from = dictionary > 0 && dictionary < data ? dictionary : data;
  return { from, to: from + Number(meta.total_compressed_size) };
}
