import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { readJson } from './input-file.js';

const dir = mkdtempSync(join(tmpdir(), 'varwright-input-'));
afterAll(() => rmSync(dir, { recursive: true }));

function fileWith(content: string | Uint8Array): string {
  const path = join(dir, 'file.json');
  writeFileSync(path, content);
  return path;
}

describe('a JSON file', () => {
  it('may begin with a byte order mark', async () => {
    expect(await readJson(fileWith('\ufeff{"a":1}'))).toEqual({ a: 1 });
  });

  it('that breaks off says at which row and column', async () => {
    await expect(readJson(fileWith('{\n  "a": 1,\n  "b"'))).rejects.toMatchObject({
      problems: [{ code: 'unreadable', row: 3, column: 6 }],
    });
  });

  it('with a mistake inside says at which row and column', async () => {
    await expect(readJson(fileWith('{\n  "a": 1,\n}'))).rejects.toMatchObject({
      problems: [{ code: 'unreadable', row: 3, column: 1, expected: 'a JSON document' }],
    });
  });

  it.each([
    ['empty', '', 'empty-file'],
    ['of blanks', ' \n', 'empty-file'],
    ['no UTF-8', Uint8Array.of(0x22, 0xff, 0x22), 'unreadable'],
    ['no JSON at all', 'name: Mill', 'unreadable'],
    ['far too large', `"${'x'.repeat(9 * 1024 * 1024)}"`, 'too-large'],
  ])('that is %s is refused', async (_what, content, code) => {
    await expect(readJson(fileWith(content))).rejects.toMatchObject({ problems: [{ code }] });
  });

  it('that is not there, or is a folder, is refused by its name', async () => {
    await expect(readJson(join(dir, 'none.json'))).rejects.toMatchObject({ problems: [{ code: 'not-found' }] });
    await expect(readJson(dir)).rejects.toMatchObject({ problems: [{ code: 'unreadable' }] });
  });
});
