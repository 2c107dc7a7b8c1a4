import PDFDocument from 'pdfkit';
import { describe, expect, it } from 'vitest';
import { MESSAGES } from '#libs/present/message-catalogue.js';
import { type Coverage, shippedFonts, splitRuns } from './fonts.js';

/** Signs the sections and charts print. */
const SIGNS = 'φΩµΔ√≤≥±×−²³₁₂→€–—’“”„·°λρπΣ№…\u00a0';

/** What the shipped fonts draw, asked of the fonts themselves. */
function openCoverage(): Coverage {
  const doc = new PDFDocument({ font: null as unknown as string });
  const open = new Map<string, { hasGlyphForCodePoint(codePoint: number): boolean }>();
  for (const { name, data } of Object.values(shippedFonts()).flat()) {
    doc.font(data as unknown as string);
    open.set(
      name,
      (doc as unknown as { _font: { font: { hasGlyphForCodePoint(codePoint: number): boolean } } })._font.font,
    );
  }
  return (name, codePoint) => open.get(name)!.hasGlyphForCodePoint(codePoint);
}

const covers = openCoverage();
const regular = shippedFonts().regular.map(({ name }) => name);

/** Letters of a text that none of the fonts draws. */
function missing(text: string, fonts: readonly string[], coverage: Coverage): string[] {
  return [...text].filter((letter) => !fonts.some((name) => coverage(name, letter.codePointAt(0)!)));
}

describe('the shipped fonts', () => {
  it('draw every sign of the paper, in both weights', () => {
    for (const weight of Object.values(shippedFonts())) {
      expect(
        missing(
          SIGNS,
          weight.map(({ name }) => name),
          covers,
        ),
      ).toEqual([]);
    }
  });

  it('draw every letter of every message', () => {
    for (const { text, consequence, subject } of Object.values(MESSAGES)) {
      expect(missing(text + consequence + (subject ?? ''), regular, covers)).toEqual([]);
    }
  });

  it('are caught where one lacks φ (control)', () => {
    const withoutPhi: Coverage = (name, codePoint) => codePoint !== 'φ'.codePointAt(0) && covers(name, codePoint);
    expect(missing(SIGNS, regular, withoutPhi)).toEqual(['φ']);
    expect(splitRuns('cos φ', regular, withoutPhi)).toEqual([{ font: regular[0], text: 'cos U+03C6' }]);
  });
});

describe('runs of one font', () => {
  it('take the family wherever it draws the letter', () => {
    expect(splitRuns('Łódź Ωμέγα Завод', regular, covers)).toEqual([{ font: regular[0], text: 'Łódź Ωμέγα Завод' }]);
  });

  it('take the fallback for another script, its words kept together with the gap between them', () => {
    expect(splitRuns('שלום עולם Steel', regular, covers)).toEqual([
      { font: regular[1], text: 'שלום עולם' },
      { font: regular[0], text: ' Steel' },
    ]);
  });

  it('keep a mark with the letter it stands on', () => {
    const runs = splitRuns(
      'e\u20dd',
      regular,
      (name, codePoint) => covers(name, codePoint) || (codePoint === 0x20dd && name === regular[1]),
    );
    expect(runs).toEqual([{ font: regular[1], text: 'e\u20dd' }]);
  });

  it('show by its code what no font draws, and never leave it blank', () => {
    expect(splitRuns('工場', regular, covers)).toEqual([{ font: regular[0], text: 'U+5DE5U+5834' }]);
  });
});
