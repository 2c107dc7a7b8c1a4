/** The part of an open font that lays text out, as pdfkit calls it. */
interface LaidOut {
  glyphs: Glyph[];
  positions: Position[];
  advanceWidth: number;
}

interface Glyph {
  advanceWidth: number;
}

interface Position {
  xAdvance: number;
  yAdvance: number;
  xOffset: number;
  yOffset: number;
}

/** The space between letters matters to the eye where one of them is a capital. */
const KERNED = /^(?:\p{Lu}\p{L}|\p{L}\p{Lu})$/u;

export interface OpenFont {
  layout(text: string, features?: string[]): LaidOut;
  hasGlyphForCodePoint(codePoint: number): boolean;
}

/** Letters, digits and signs that stand one after the other: Latin, Greek, Cyrillic, punctuation, mathematics. */
const PLAIN =
  /^[\u0020-\u007e\u00a0-\u024f\u0370-\u03ff\u0400-\u0482\u048a-\u04ff\u2010-\u205e\u2070-\u20bf\u2100-\u22ff]*$/;

/**
 * Makes an open font remember the glyph of every letter and the space between every pair it was asked for: general
 * shaping of each word anew takes most of a paper's time. Text of other scripts is shaped as before; ligatures are not
 * formed, so that every letter can be read back.
 * @param font an open font; its `layout` is replaced
 */
export function layOutQuickly(font: OpenFont): void {
  const shape = font.layout.bind(font);
  const glyphs = new Map<string, { glyph: Glyph; advance: number }>();
  const kerns = new Map<string, number>();

  const single = (letter: string, tabular: boolean) => {
    const key = tabular ? `${letter}#` : letter;
    let known = glyphs.get(key);
    if (known === undefined) {
      const run = shape(letter, tabular ? ['tnum'] : undefined);
      known = { glyph: run.glyphs[0]!, advance: run.advanceWidth };
      glyphs.set(key, known);
    }
    return known;
  };
  const kern = (pair: string): number => {
    if (!KERNED.test(pair)) return 0;
    let known = kerns.get(pair);
    if (known === undefined) {
      const run = shape(pair);
      const apart = single(pair[0]!, false).advance + single(pair[1]!, false).advance;
      known = run.glyphs.length === 2 ? run.advanceWidth - apart : 0;
      kerns.set(pair, known);
    }
    return known;
  };

  font.layout = (text, features) => {
    if (!PLAIN.test(text)) return shape(text, features);
    const tabular = features?.includes('tnum') === true;
    const run: LaidOut = { glyphs: [], positions: [], advanceWidth: 0 };
    for (let at = 0; at < text.length; at++) {
      const { glyph, advance } = single(text[at]!, tabular);
      const next = text[at + 1];
      const xAdvance = advance + (next === undefined || tabular ? 0 : kern(text[at]! + next));
      run.glyphs.push(glyph);
      run.positions.push({ xAdvance, yAdvance: 0, xOffset: 0, yOffset: 0 });
      run.advanceWidth += xAdvance;
    }
    return run;
  };
}
