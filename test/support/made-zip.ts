import { crc32, deflateRawSync } from 'node:zlib';

/** A file of an archive, and what its headers say that is not so. */
export interface ZipPart {
  name: string;
  content: string | Uint8Array;
  /** kept as it is instead of deflated */
  stored?: boolean;
  /** sizes and sums that the directory states instead of the true ones */
  statedBytes?: number;
  statedCrc?: number;
  encrypted?: boolean;
  method?: number;
}

const bytesOf = (content: string | Uint8Array) => (typeof content === 'string' ? Buffer.from(content) : content);

/**
 * A ZIP archive (APPNOTE 6.3.10): local headers and data, the directory, its end.
 * @param parts in order
 * @param statedEntries number of entries that the end of the directory states instead of the true one
 */
export function madeZip(parts: readonly ZipPart[], statedEntries = parts.length): Uint8Array {
  const local: Uint8Array[] = [];
  const directory: Uint8Array[] = [];
  let at = 0;
  for (const part of parts) {
    const content = bytesOf(part.content);
    const packed = part.stored ? content : deflateRawSync(content);
    const fields = Buffer.alloc(26);
    fields.writeUInt16LE(20, 0);
    fields.writeUInt16LE(part.encrypted ? 0x0801 : 0x0800, 2);
    fields.writeUInt16LE(part.method ?? (part.stored ? 0 : 8), 4);
    fields.writeUInt32LE(0x5a215a21, 6);
    fields.writeUInt32LE(part.statedCrc ?? crc32(content), 10);
    fields.writeUInt32LE(packed.length, 14);
    fields.writeUInt32LE(part.statedBytes ?? content.length, 18);
    const name = Buffer.from(part.name);
    fields.writeUInt16LE(name.length, 22);
    local.push(Buffer.from([0x50, 0x4b, 3, 4]), fields, name, packed);
    const rest = Buffer.alloc(14);
    rest.writeUInt32LE(at, 10);
    directory.push(Buffer.from([0x50, 0x4b, 1, 2, 20, 0]), fields, rest, name);
    at += 30 + name.length + packed.length;
  }
  const size = directory.reduce((sum, piece) => sum + piece.length, 0);
  const end = Buffer.alloc(22);
  end.set([0x50, 0x4b, 5, 6]);
  end.writeUInt16LE(statedEntries & 0xffff, 8);
  end.writeUInt16LE(statedEntries & 0xffff, 10);
  end.writeUInt32LE(size, 12);
  end.writeUInt32LE(at, 16);
  return new Uint8Array(Buffer.concat([...local, ...directory, end]));
}
