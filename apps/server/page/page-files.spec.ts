import { mkdirSync, mkdtempSync, rmSync, utimesSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { gunzipSync } from 'node:zlib';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { PageFiles } from './page-files.js';

let root = '';
const files = () => new PageFiles(pathToFileURL(`${root}/`));

beforeEach(() => {
  root = mkdtempSync(join(tmpdir(), 'varwright-page-'));
});
afterEach(() => rmSync(root, { recursive: true }));

function build(words: string, atS: number): void {
  mkdirSync(join(root, 'page'), { recursive: true });
  writeFileSync(join(root, 'page', 'main.js'), words);
  writeFileSync(join(root, 'page', 'notes.txt'), 'not of the page');
  writeFileSync(join(root, 'index.html'), `<p>${words}</p>`);
  utimesSync(join(root, 'index.html'), atS, atS);
}

describe('the files of the page', () => {
  it('are not there before the page is built, and are once it is', () => {
    const page = files();
    expect(page.find('index.html')).toBeNull();
    build('one', 1000);
    expect(page.find('index.html')?.plain.toString()).toBe('<p>one</p>');
    build('two', 2000);
    expect(page.find('index.html')?.plain.toString()).toBe('<p>two</p>');
    expect(page.find('page/main.js')?.plain.toString()).toBe('two');
  });

  it('hold the same compressed', () => {
    build('one', 1000);
    expect(gunzipSync(files().find('page/main.js')!.gzip!).toString()).toBe('one');
  });

  it('are those of the page and no others, whatever the address says', () => {
    build('one', 1000);
    const page = files();
    for (const name of [
      'page/notes.txt',
      '../secret.html',
      'page/../index.html',
      'page/../../etc/passwd',
      'constructor',
    ]) {
      expect(page.find(name), name).toBeNull();
    }
  });
});
