import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { extname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { gzipSync } from 'node:zlib';

/** A file of the page as it is sent. */
export interface PageFile {
  type: string;
  plain: Buffer;
  /** null where compressing gains nothing */
  gzip: Buffer | null;
}

const TYPES: Record<string, string> = {
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.css': 'text/css; charset=utf-8',
  '.woff2': 'font/woff2',
};

/** The built page, read as a whole: a name that is not in it leads nowhere. */
export class PageFiles {
  readonly #root: string;
  #files = new Map<string, PageFile>();
  #builtMs = 0;

  /** @param folder what the build wrote; absent, the page is not there and the plain one stands in */
  constructor(folder: URL) {
    this.#root = fileURLToPath(folder);
    this.#readAgain();
  }

  /** @param name path from the page's root, without a leading slash */
  find(name: string): PageFile | null {
    if (name === 'index.html') this.#readAgain();
    return this.#files.get(name) ?? null;
  }

  /** A page that was built anew is served at the next visit. */
  #readAgain(): void {
    const index = join(this.#root, 'index.html');
    const builtMs = existsSync(index) ? statSync(index).mtimeMs : 0;
    if (builtMs === this.#builtMs) return;
    this.#builtMs = builtMs;
    const inside = existsSync(join(this.#root, 'page')) ? readdirSync(join(this.#root, 'page')) : [];
    const names = builtMs === 0 ? [] : ['index.html', ...inside.map((file) => `page/${file}`)];
    this.#files = new Map(
      names.flatMap((name) => {
        const file = readPageFile(join(this.#root, name));
        return file === null ? [] : [[name, file]];
      }),
    );
  }
}

function readPageFile(path: string): PageFile | null {
  const type = TYPES[extname(path)];
  if (type === undefined) return null;
  const plain = readFileSync(path);
  return { type, plain, gzip: type.startsWith('font') ? null : gzipSync(plain) };
}
