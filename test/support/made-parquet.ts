import { brotliCompressSync, crc32, gzipSync } from 'node:zlib';
import { ByteWriter } from 'hyparquet-writer';
import { writeMetadata } from 'hyparquet-writer/src/metadata.js';
import { snappyCompress } from 'hyparquet-writer/src/snappy.js';
import { serializeTCompactProtocol } from 'hyparquet-writer/src/thrift.js';

type FileMetaData = Parameters<typeof writeMetadata>[1];
type SchemaElement = FileMetaData['schema'][number];
type ParquetType = NonNullable<SchemaElement['type']>;

/** A column of pages of the first kind, which most programs write. */
export interface MadeColumn {
  name: string;
  type: ParquetType;
  /** null is a missing value and makes the column optional */
  values: readonly (number | bigint | string | Uint8Array | null)[];
  converted?: SchemaElement['converted_type'];
  logical?: SchemaElement['logical_type'];
  length?: number;
  scale?: number;
}

export interface MadeParquet {
  columns: readonly MadeColumn[];
  codec?: 'UNCOMPRESSED' | 'SNAPPY' | 'GZIP' | 'BROTLI' | 'ZSTD';
  rowsAPage?: number;
  rowsAGroup?: number;
  /** values as numbers of a dictionary */
  dictionary?: boolean;
  /** changes what the footer says */
  lie?: (metadata: FileMetaData) => void;
  /** changes what each page says, by the fields of its header */
  pageLie?: (header: Record<string, unknown>) => void;
}

const PACKED: Record<string, (bytes: Uint8Array) => Uint8Array> = {
  UNCOMPRESSED: (bytes) => bytes,
  SNAPPY: (bytes) => snappyCompress(bytes),
  GZIP: (bytes) => gzipSync(bytes),
  BROTLI: (bytes) => brotliCompressSync(bytes),
  ZSTD: (bytes) => bytes,
};

type Value = Exclude<MadeColumn['values'][number], null>;

const APPENDED: Record<string, (writer: ByteWriter, value: Value) => void> = {
  DOUBLE: (writer, value) => writer.appendFloat64(value as number),
  FLOAT: (writer, value) => writer.appendFloat32(value as number),
  INT32: (writer, value) => writer.appendInt32(value as number),
  INT64: (writer, value) => writer.appendInt64(BigInt(value as number)),
  INT96: (writer, value) => writer.appendBytes(value as Uint8Array),
  FIXED_LEN_BYTE_ARRAY: (writer, value) => writer.appendBytes(value as Uint8Array),
  BYTE_ARRAY: (writer, value) => {
    const bytes = typeof value === 'string' ? Buffer.from(value) : (value as Uint8Array);
    writer.appendUint32(bytes.length);
    writer.appendBytes(bytes);
  },
};

function plain(type: ParquetType, values: readonly Value[]): Uint8Array {
  const writer = new ByteWriter();
  for (const value of values) APPENDED[type]!(writer, value);
  return writer.getBytes();
}

/** Numbers of up to 16 bits, each as a run of its own: the simplest of the hybrid's forms. */
function runs(values: readonly number[], bits: number): Uint8Array {
  return Uint8Array.from(values.flatMap((value) => (bits > 8 ? [2, value & 255, value >> 8] : [2, value])));
}

function prefixed(bytes: Uint8Array): Uint8Array {
  const length = Buffer.alloc(4);
  length.writeUInt32LE(bytes.length);
  return Buffer.concat([length, bytes]);
}

class ColumnWriter {
  readonly #writer: ByteWriter;
  readonly #file: MadeParquet;
  readonly #column: MadeColumn;
  bytes = 0;

  constructor(writer: ByteWriter, file: MadeParquet, column: MadeColumn) {
    this.#writer = writer;
    this.#file = file;
    this.#column = column;
  }

  dictionary(values: readonly Value[]): void {
    const content = plain(this.#column.type, values);
    this.#page({ field_1: 2, field_7: { field_1: values.length, field_2: 0 } }, content);
  }

  rows(values: MadeColumn['values'], known: readonly Value[] | null): void {
    const present = values.filter((value): value is Value => value !== null);
    const levels = prefixed(
      runs(
        values.map((value) => (value === null ? 0 : 1)),
        1,
      ),
    );
    const places =
      known === null
        ? null
        : runs(
            present.map((value) => known.indexOf(value)),
            16,
          );
    const content = places === null ? plain(this.#column.type, present) : Uint8Array.from([16, ...places]);
    const header = { field_1: values.length, field_2: known === null ? 0 : 8, field_3: 3, field_4: 3 };
    this.#page({ field_1: 0, field_5: header }, isOptional(this.#column) ? Buffer.concat([levels, content]) : content);
  }

  #page(fields: Record<string, unknown>, content: Uint8Array): void {
    const packed = PACKED[this.#file.codec ?? 'UNCOMPRESSED']!(content);
    const header: Record<string, unknown> = {
      field_1: fields.field_1,
      field_2: content.length,
      field_3: packed.length,
      field_4: crc32(packed) | 0,
      ...fields,
    };
    this.#file.pageLie?.(header);
    const before = this.#writer.offset;
    serializeTCompactProtocol(this.#writer, header as Parameters<typeof serializeTCompactProtocol>[1]);
    this.#writer.appendBytes(packed);
    this.bytes += this.#writer.offset - before;
  }
}

const isOptional = ({ values }: MadeColumn) => values.includes(null);

function elementOf(column: MadeColumn): SchemaElement {
  const { name, type, converted, logical, length, scale } = column;
  return {
    name,
    type,
    repetition_type: isOptional(column) ? 'OPTIONAL' : 'REQUIRED',
    ...(converted === undefined ? {} : { converted_type: converted }),
    ...(logical === undefined ? {} : { logical_type: logical }),
    ...(length === undefined ? {} : { type_length: length }),
    ...(scale === undefined ? {} : { scale, precision: 18 }),
  };
}

/** A Parquet file with pages of the first kind (data page header, levels and values packed together). */
export function madeParquet(file: MadeParquet): Uint8Array {
  const { columns, codec = 'UNCOMPRESSED', rowsAPage = 50, rowsAGroup = 120 } = file;
  const writer = new ByteWriter();
  writer.appendBytes(Buffer.from('PAR1'));
  const count = columns[0]!.values.length;
  const groups: FileMetaData['row_groups'] = [];
  for (let from = 0; from < count; from += rowsAGroup) {
    const rows = Math.min(rowsAGroup, count - from);
    const chunks = columns.map((column) => writeColumn({ writer, file, rowsAPage }, column, { from, rows }));
    groups.push({ columns: chunks, num_rows: BigInt(rows), total_byte_size: BigInt(0) });
  }
  const metadata: FileMetaData = {
    version: 2,
    schema: [{ name: 'root', num_children: columns.length }, ...columns.map(elementOf)],
    num_rows: BigInt(count),
    row_groups: groups,
    created_by: `made up, ${codec}`,
    metadata_length: 0,
  };
  file.lie?.(metadata);
  writeMetadata(writer, metadata);
  writer.appendBytes(Buffer.from('PAR1'));
  return writer.getBytes();
}

function writeColumn(
  { writer, file, rowsAPage }: { writer: ByteWriter; file: MadeParquet; rowsAPage: number },
  column: MadeColumn,
  { from, rows }: { from: number; rows: number },
) {
  const values = column.values.slice(from, from + rows);
  const start = writer.offset;
  const pages = new ColumnWriter(writer, file, column);
  const known = file.dictionary ? [...new Set(values.filter((value): value is Value => value !== null))] : null;
  if (known !== null) pages.dictionary(known);
  const first = writer.offset;
  for (let at = 0; at < rows; at += rowsAPage) pages.rows(values.slice(at, at + rowsAPage), known);
  return {
    file_offset: BigInt(start),
    meta_data: {
      type: column.type,
      encodings: ['PLAIN' as const],
      path_in_schema: [column.name],
      codec: file.codec ?? 'UNCOMPRESSED',
      num_values: BigInt(rows),
      total_uncompressed_size: BigInt(pages.bytes),
      total_compressed_size: BigInt(pages.bytes),
      data_page_offset: BigInt(first),
      ...(known === null ? {} : { dictionary_page_offset: BigInt(start) }),
    },
  };
}
