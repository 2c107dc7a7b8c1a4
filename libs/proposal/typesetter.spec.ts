import fc from 'fast-check';
import PDFDocument from 'pdfkit';
import { describe, expect, it } from 'vitest';
import { GERMAN } from '#libs/present/german/german.js';
import { inLanguage } from '#libs/present/language.js';
import { BODY, NEW_LINE, Typesetter } from './typesetter.js';

const SEED = 20_260_131;

function typesetter(): Typesetter {
  return new Typesetter(new PDFDocument({ font: null as unknown as string }));
}

function textOfLines(lines: ReturnType<Typesetter['wrap']>): string[] {
  return lines.map(({ segments }) => segments.map(({ text }) => text).join(''));
}

describe('breaking text into lines', () => {
  const type = typesetter();

  it('breaks at plain spaces only, so that a number stays with its unit', () => {
    const lines = textOfLines(type.wrap(['needed 1\u00a0250\u00a0kvar at the bus'], BODY, 60));
    expect(lines.some((line) => line.includes('1\u00a0250\u00a0kvar'))).toBe(true);
  });

  it('breaks a word too long for its line, first where it may part company', () => {
    const lines = textOfLines(type.wrap(['Zweigniederlassung-Ybbs/Donau'], BODY, 96));
    expect(lines[0]).toBe('Zweigniederlassung-');
    expect(lines.join('')).toBe('Zweigniederlassung-Ybbs/Donau');
  });

  it('parts a compound by a hyphen where the language has a place for it, else as ever', () => {
    const parted = (width: number) =>
      inLanguage(GERMAN, () => textOfLines(type.wrap(['Verdrosselungsgrad,'], BODY, width)));
    expect(parted(200)).toEqual(['Verdrosselungsgrad,']);
    expect(parted(74)).toEqual(['Verdrosselungs-', 'grad,']);
    expect(parted(58)).toEqual(['Ver-', 'drosselungs-', 'grad,']);
    for (const width of [58, 74]) {
      const lines = inLanguage(GERMAN, () => type.wrap(['Verdrosselungsgrad,'], BODY, width));
      for (const line of lines) expect(line.width).toBeLessThanOrEqual(width);
    }
    expect(textOfLines(type.wrap(['Verdrosselungsgrad,'], BODY, 74)).join('')).toBe('Verdrosselungsgrad,');
  });

  it('loses no letter and passes no width, whatever the text', () => {
    const letters = fc
      .string({ unit: 'grapheme', maxLength: 120 })
      .map((text) => text.replace(/[^\p{L}\p{N}\p{P} ]/gu, 'x'));
    fc.assert(
      fc.property(letters, fc.double({ min: 40, max: 400, noNaN: true }), (text, width) => {
        const lines = type.wrap([text], BODY, width);
        for (const line of lines) {
          const letterCount = line.segments.reduce((sum, segment) => sum + [...segment.text].length, 0);
          if (letterCount > 1) expect(line.width).toBeLessThanOrEqual(width + 1e-6);
        }
        const kept = lines.flatMap(({ segments }) => segments.map((segment) => segment.text)).join('');
        const whole = type
          .line([text], BODY)
          .segments.map((segment) => segment.text)
          .join('');
        expect(kept.replaceAll(' ', '')).toBe(whole.replaceAll(' ', ''));
      }),
      { seed: SEED, numRuns: 200 },
    );
  });

  it('ends a line where it is told to', () => {
    expect(textOfLines(type.wrap(['formula', NEW_LINE, '= working'], BODY, 200))).toEqual(['formula', '= working']);
  });

  it('has at least one line', () => {
    expect(type.wrap([''], BODY, 100)).toHaveLength(1);
  });

  it('draws thin spaces of other hands as the one gap', () => {
    expect(textOfLines(type.wrap(['1\u2009250\u202fkvar'], BODY, 200))).toEqual(['1\u00a0250\u00a0kvar']);
  });

  it('gives digits of a column one width', () => {
    const tabular = { ...BODY, tabular: true };
    expect(type.width(['111'], tabular)).toBeCloseTo(type.width(['888'], tabular), 9);
    expect(type.width(['111'], BODY)).toBeLessThan(type.width(['888'], BODY));
  });
});
