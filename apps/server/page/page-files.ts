import { existsSync, readdirSync, readFileSync } from 'node:fs';
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

/** The built page, read once: a name that is not in it leads nowhere. */
export class PageFiles {
  readonly #files = new Map<string, PageFile>();

  /** @param folder what the build wrote; absent, the page is not there and the plain one stands in */
  constructor(folder: URL) {
    const root = fileURLToPath(folder);
    if (!existsSync(join(root, 'page'))) return;
    for (const name of ['index.html', ...readdirSync(join(root, 'page')).map((file) => `page/${file}`)]) {
      const type = TYPES[extname(name)];
      if (type === undefined) continue;
      const plain = readFileSync(join(root, name));
      this.#files.set(name, { type, plain, gzip: type.startsWith('font') ? null : gzipSync(plain) });
    }
  }

  /** @param name path from the page's root, without a leading slash */
  find(name: string): PageFile | null {
    return this.#files.get(name) ?? null;
  }
}
