import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { open } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { fileChunks } from './file-chunks.js';

describe('the chunks of a file', () => {
  let dir: string;
  const written = (name: string, length: number) => {
    const bytes = Uint8Array.from({ length }, (_, i) => (i * 31 + (i >> 8)) & 255);
    const path = join(dir, name);
    writeFileSync(path, bytes);
    return { path, bytes };
  };

  beforeAll(() => {
    dir = mkdtempSync(join(tmpdir(), 'varwright-chunks-'));
  });
  afterAll(() => rmSync(dir, { recursive: true, force: true }));

  it.each([0, 1, 262_143, 262_144, 262_145, 1_000_000])('are its %d bytes in their order', async (length) => {
    const { path, bytes } = written(`of-${length}`, length);
    const read: Buffer[] = [];
    for await (const chunk of fileChunks(path)) read.push(Buffer.from(chunk));
    expect(Buffer.concat(read).equals(bytes)).toBe(true);
  });

  it('take turns in two buffers, so that a chunk kept for longer is overwritten', async () => {
    const { path } = written('long', 1_000_000);
    const buffers = new Set<ArrayBufferLike>();
    for await (const chunk of fileChunks(path)) buffers.add(chunk.buffer);
    expect(buffers.size).toBe(2);
  });

  it('leave the file closed when nobody wants the rest', async () => {
    const handle = await open(written('half', 1_000_000).path, 'r');
    for await (const chunk of fileChunks(handle)) if (chunk.length > 0) break;
    await expect(handle.read(new Uint8Array(1))).rejects.toThrow(/EBADF|closed/);
  });

  it('end in an error where there is no such file', async () => {
    const chunks = fileChunks(join(dir, 'none'));
    await expect(chunks.next()).rejects.toThrow(/ENOENT/);
  });
});
