import type {} from 'pdfkit';
import { hyphenParts } from '#libs/present/language.js';
import { printable } from '#libs/present/plain-name.js';
import { type Run, shippedFonts, splitRuns, type Weight } from './fonts.js';
import { INK } from './ink.js';
import { layOutQuickly, type OpenFont } from './quick-layout.js';

/** How a piece of text looks. */
export interface Style {
  size: number;
  weight: Weight;
  ink: string;
  /** digits of equal width, for columns */
  tabular: boolean;
}

export const BODY: Style = { size: 9.75, weight: 'regular', ink: INK, tabular: false };

/** A piece that ends its line. */
export const NEW_LINE = '\n';
/** A stretch of text; an object changes the look of its stretch only. */
export type Piece = string | (Partial<Style> & { text: string });

/** Text of one look, ready to be drawn by one font. */
export interface Segment {
  text: string;
  font: string;
  style: Style;
  width: number;
}

export interface Line {
  segments: Segment[];
  width: number;
}

/** Right-to-left scripts are shaped as one run, so that their words keep their order. */
const RIGHT_TO_LEFT = /[\u0590-\u08ff\ufb1d-\ufdff\ufe70-\ufefc]/u;
/** A word too long for its line breaks after one of these, else where the language parts it, else anywhere. */
const SOFT_BREAK = /(?<=[-/_.,;:@+&])/u;

/** Part of a word, and the hyphen that a line takes where it ends behind it. */
interface WordPart {
  part: Line;
  hyphen: Line | null;
}

/** Measures, breaks and draws text on a document; the only place that calls pdfkit's text. */
export class Typesetter {
  private readonly widths = new Map<string, number>();
  private readonly covered = new Map<string, boolean>();
  private readonly open = new Map<string, OpenFont>();
  private readonly fonts: Record<Weight, string[]>;

  constructor(private readonly doc: PDFKit.PDFDocument) {
    const shipped = shippedFonts();
    this.fonts = { regular: [], semibold: [] };
    for (const weight of ['regular', 'semibold'] as const) {
      for (const { name, data } of shipped[weight]) {
        doc.registerFont(name, data as unknown as PDFKit.Mixins.PDFFontSource);
        this.fonts[weight].push(name);
      }
    }
  }

  /** @returns width of the text on one line [pt] */
  width(pieces: readonly Piece[], style: Style): number {
    return this.segments(pieces, style).reduce((sum, segment) => sum + segment.width, 0);
  }

  /**
   * Breaks text into lines that fit a width.
   * @returns at least one line, none wider than `width` unless a single character is
   */
  wrap(pieces: readonly Piece[], style: Style, width: number): Line[] {
    const end = pieces.indexOf(NEW_LINE);
    if (end < 0) return this.wrapped(pieces, style, width);
    return [...this.wrapped(pieces.slice(0, end), style, width), ...this.wrap(pieces.slice(end + 1), style, width)];
  }

  private wrapped(pieces: readonly Piece[], style: Style, width: number): Line[] {
    const lines: Line[] = [];
    let line: Line = { segments: [], width: 0 };
    for (const word of this.words(pieces, style)) {
      const gap = line.segments.length === 0 ? 0 : this.measure(' ', word.segments[0]!.font, word.segments[0]!.style);
      if (line.width + gap + word.width <= width) {
        append(line, word, gap);
        continue;
      }
      if (line.segments.length > 0) lines.push(line);
      const parts = word.width <= width ? [word] : this.breakWord(word, width);
      lines.push(...parts.slice(0, -1));
      line = { segments: [...parts.at(-1)!.segments], width: parts.at(-1)!.width };
    }
    lines.push(line);
    return lines;
  }

  /** Draws a line with its baseline at y. */
  draw(line: Line, x: number, y: number): void {
    let at = x;
    for (const segment of merged(line.segments)) {
      const { text, font, style, width } = segment;
      this.doc.font(font, style.size).fillColor(style.ink);
      this.doc.text(text, at, y, {
        lineBreak: false,
        baseline: 'alphabetic',
        ...shaping(text, style),
        // given, so that pdfkit need not measure again
        ...{ textWidth: width, wordCount: 1 },
      });
      at += width;
    }
  }

  /** One line of text, its baseline at y. */
  put(pieces: readonly Piece[], style: Style, x: number, y: number): void {
    this.draw(this.line(pieces, style), x, y);
  }

  /** All pieces on one line, unbroken. */
  line(pieces: readonly Piece[], style: Style): Line {
    const segments = this.segments(pieces, style);
    return { segments, width: segments.reduce((sum, segment) => sum + segment.width, 0) };
  }

  private segments(pieces: readonly Piece[], style: Style): Segment[] {
    return this.runs(pieces, style).map(({ run, own }) => this.segment(run, own));
  }

  /** Not measured: of what is broken into words only the words are. */
  private runs(pieces: readonly Piece[], style: Style): { run: Run; own: Style }[] {
    return pieces.flatMap((piece) => {
      const own = typeof piece === 'string' ? style : { ...style, ...piece };
      const text = tidy(typeof piece === 'string' ? piece : piece.text);
      return splitRuns(text, this.fonts[own.weight], this.covers).map((run) => ({ run, own }));
    });
  }

  private segment(run: Run, style: Style): Segment {
    const { size, weight, ink, tabular } = style;
    const own = { size, weight, ink, tabular };
    return { text: run.text, font: run.font, style: own, width: this.measure(run.text, run.font, own) };
  }

  /** Splits at plain spaces only; a no-break space stays inside its word. */
  private words(pieces: readonly Piece[], style: Style): Line[] {
    const words: Line[] = [];
    let open = false;
    for (const { run, own } of this.runs(pieces, style)) {
      run.text.split(' ').forEach((text, at) => {
        if (at > 0) open = false;
        if (text === '') return;
        const part = this.segment({ text, font: run.font }, own);
        if (!open) words.push({ segments: [], width: 0 });
        append(words.at(-1)!, { segments: [part], width: part.width }, 0);
        open = true;
      });
    }
    return words;
  }

  private breakWord(word: Line, width: number): Line[] {
    const lines: Line[] = [{ segments: [], width: 0 }];
    let before: Line | null = null;
    for (const { part, hyphen } of word.segments.flatMap((segment) => this.parts(segment, width))) {
      const last = lines.at(-1)!;
      if (last.segments.length > 0 && last.width + part.width + (hyphen?.width ?? 0) > width) {
        if (before !== null) append(last, before, 0);
        lines.push(part);
      } else append(last, part, 0);
      before = hyphen;
    }
    return lines;
  }

  /** Parts of a word that may part company; letter by letter where even a part is too long. */
  private parts({ text, font, style }: Segment, width: number): WordPart[] {
    const lineOf = (part: string): Line => {
      const segment = this.segment({ text: part, font }, style);
      return { segments: [segment], width: segment.width };
    };
    return text.split(SOFT_BREAK).flatMap((chunk) => {
      const all = hyphenParts(chunk);
      const hyphened = all.map((part, at) => ({
        part: lineOf(part),
        hyphen: at < all.length - 1 ? lineOf('-') : null,
      }));
      if (hyphened.every(({ part, hyphen }) => part.width + (hyphen?.width ?? 0) <= width)) return hyphened;
      return (chunk.match(/\P{M}\p{M}*/gsu) ?? []).map((letter) => ({ part: lineOf(letter), hyphen: null }));
    });
  }

  private measure(text: string, font: string, style: Style): number {
    const key = `${font}${style.tabular ? '#' : ' '}${text}`;
    let perPoint: number | undefined = this.widths.get(key);
    if (perPoint === undefined) {
      this.doc.font(font, 1);
      perPoint = this.doc.widthOfString(text, shaping(text, style)) as number;
      this.widths.set(key, perPoint);
    }
    return perPoint * style.size;
  }

  private readonly covers = (font: string, codePoint: number): boolean => {
    const key = `${font} ${codePoint}`;
    let answer = this.covered.get(key);
    if (answer === undefined) {
      answer = this.openFont(font).hasGlyphForCodePoint(codePoint);
      this.covered.set(key, answer);
    }
    return answer;
  };

  /** The font behind a name, opened on first use and made to lay out quickly. */
  private openFont(name: string): OpenFont {
    let font = this.open.get(name);
    if (font === undefined) {
      this.doc.font(name);
      // pdfkit's types leave out the open font, which alone knows its glyphs
      font = (this.doc as unknown as { _font: { font: OpenFont } })._font.font;
      layOutQuickly(font);
      this.open.set(name, font);
    }
    return font;
  }
}

/** What the thin spaces of other hands become, so that one gap stands everywhere. */
function tidy(text: string): string {
  return printable(text).replace(/[\u2009\u202f\u2007\u2008\u200a]/gu, '\u00a0');
}

function shaping(text: string, style: Style): { features?: PDFKit.Mixins.OpenTypeFeatures[] } {
  if (style.tabular) return { features: ['tnum'] };
  return RIGHT_TO_LEFT.test(text) ? { features: [] } : {};
}

function append(line: Line, more: Line, gap: number): void {
  const first = more.segments[0];
  if (gap > 0 && first !== undefined) line.segments.push({ ...first, text: ' ', width: gap });
  line.segments.push(...more.segments);
  line.width += gap + more.width;
}

/** Neighbours of one look and font become one stretch; a gap joins only where the same goes on after it. */
function merged(segments: readonly Segment[]): Segment[] {
  const out: Segment[] = [];
  segments.forEach((segment, at) => {
    const last = out.at(-1);
    const goesOn = segment.text !== ' ' || alike(segment, segments[at + 1]);
    if (last !== undefined && goesOn && alike(last, segment)) {
      last.text += segment.text;
      last.width += segment.width;
    } else out.push({ ...segment });
  });
  return out;
}

function alike(a: Segment, b: Segment | undefined): boolean {
  return b !== undefined && a.font === b.font && sameStyle(a.style, b.style);
}

function sameStyle(a: Style, b: Style): boolean {
  return a.size === b.size && a.weight === b.weight && a.ink === b.ink && a.tabular === b.tabular;
}
