import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** Runs a program of poppler-utils on a file's bytes. */
export function readPdf(bytes: Uint8Array, program: 'pdftotext' | 'pdffonts' | 'pdfinfo', options: string[]): string {
  const folder = mkdtempSync(join(tmpdir(), 'paper-'));
  const file = join(folder, 'paper.pdf');
  try {
    writeFileSync(file, bytes);
    const target = program === 'pdftotext' ? [file, '-'] : [file];
    return execFileSync(program, [...options, ...target], {
      encoding: 'utf8',
      maxBuffer: 64 << 20,
      stdio: ['ignore', 'pipe', 'ignore'],
    });
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** The text in the order it was drawn, pages apart by form feeds. */
export function textOf(bytes: Uint8Array): string {
  return readPdf(bytes, 'pdftotext', ['-raw']);
}

/** Text without any space: plain, no-break and thin ones alike, and line and page ends. */
export function squeezed(text: string): string {
  return text.normalize('NFC').replace(/[\s\u00a0\u2009\u202f]+/g, '');
}

/** A word and where it stands [pt]. */
export interface PlacedWord {
  text: string;
  xMin: number;
  xMax: number;
  yMin: number;
  yMax: number;
}

/** Every page's size and words. */
export function wordsOf(bytes: Uint8Array): { width: number; height: number; words: PlacedWord[] }[] {
  const html = readPdf(bytes, 'pdftotext', ['-bbox']);
  return html
    .split('<page ')
    .slice(1)
    .map((page) => {
      const [, width, height] = /width="([\d.]+)" height="([\d.]+)"/.exec(page)!;
      const words = [
        ...page.matchAll(/<word xMin="([-\d.]+)" yMin="([-\d.]+)" xMax="([-\d.]+)" yMax="([-\d.]+)">(.*?)<\/word>/g),
      ];
      return {
        width: Number(width),
        height: Number(height),
        words: words.map(([, xMin, yMin, xMax, yMax, text]) => ({
          text: text!,
          xMin: Number(xMin),
          xMax: Number(xMax),
          yMin: Number(yMin),
          yMax: Number(yMax),
        })),
      };
    });
}

/** A number as it is printed, and half a unit of its last digit. */
export function printedNumber(text: string): { value: number; half: number } {
  const plain = text.replace(/[\s\u00a0\u2009\u202f]/g, '').replace('\u2212', '-');
  const decimals = plain.includes('.') ? plain.length - plain.indexOf('.') - 1 : 0;
  return { value: Number(plain), half: 0.5 * 10 ** -decimals };
}
