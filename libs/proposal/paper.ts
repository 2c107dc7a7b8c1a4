import type {} from 'pdfkit';
import { HAIR, SOFT, STROKE } from './ink.js';
import { BODY, type Line, type Piece, type Style, Typesetter } from './typesetter.js';

/** Sizes of paper [pt]. */
const SHEETS = { A4: [595.28, 841.89], Letter: [612, 792] } as const;
export type PaperSize = keyof typeof SHEETS;

const SIDE = 45;
const FOOT = 50;
/** Leading as a share of the type's size. */
const LEADING = 1.38;
/** From the top of a line to its baseline, as a share of the type's size. */
const RISE = 1.0;

export const NOTE: Style = { ...BODY, size: 8.6, ink: SOFT };
export const LABEL: Style = { ...BODY, size: 9, ink: SOFT };
export const STRONG: Style = { ...BODY, weight: 'semibold' };

/** How a paragraph stands on the page. */
export interface Setting {
  style?: Style;
  x?: number;
  width?: number;
  /** kind of structure element */
  tag?: string;
  after?: number;
}

/** What a reading program is told of an element; pdfkit's types leave out the last two. */
export interface ElementOptions {
  alt?: string;
  scope?: 'Column' | 'Row';
  bbox?: [number, number, number, number];
}

/** A heading that is drawn with what follows it. */
interface WaitingHeading {
  /** above it, unless it begins the page, and of itself with what is below it [pt] */
  space: number;
  height: number;
  /** that must follow on the same page [pt] */
  keep: number;
  draw: () => void;
}

/** The page being written: its edges, the cursor, and the tree that tells a reading program what each part is. */
export class Paper {
  readonly type: Typesetter;
  readonly left = SIDE;
  readonly right: number;
  readonly width: number;
  readonly bottom: number;
  /** where the content of every page begins [pt] */
  top = 0;
  private cursor = 0;
  /** headings that wait for what follows them, so that they stand on its page */
  private headings: WaitingHeading[] = [];
  private readonly parents: PDFKit.PDFStructureElement[];

  constructor(readonly doc: PDFKit.PDFDocument) {
    const { width, height } = doc.page;
    this.type = new Typesetter(doc);
    this.right = width - SIDE;
    this.width = this.right - SIDE;
    this.bottom = height - FOOT;
    const root = doc.struct('Document');
    doc.addStructure(root);
    this.parents = [root];
  }

  /** where the next block begins, from the top [pt]; whoever asks has what waited drawn above it */
  get y(): number {
    this.settle();
    return this.cursor;
  }

  set y(top: number) {
    this.cursor = top;
  }

  /** Sets where the content of every page begins, below the header. */
  begin(top: number): void {
    this.top = top;
    this.y = top;
  }

  /** Closes the tree. */
  end(): void {
    this.settle();
    for (const element of this.parents) element.end();
  }

  /** @returns height left on this page [pt] */
  get rest(): number {
    return this.bottom - this.y;
  }

  /** Begins a new page unless the height wanted is left on this one, below the headings that wait for it. */
  need(height: number): void {
    const waiting = this.headings;
    this.headings = [];
    const least = Math.max(height, waiting.at(-1)?.keep ?? 0);
    const above = waiting.reduce((sum, heading, n) => sum + heading.height + (n > 0 ? heading.space : 0), 0);
    const space = waiting[0]?.space ?? 0;
    if (this.cursor > this.top && space + above + least > this.bottom - this.cursor) this.turn();
    for (const heading of waiting) {
      if (this.cursor > this.top) this.cursor += heading.space;
      heading.draw();
      this.cursor += heading.height;
    }
  }

  turn(): void {
    this.doc.addPage();
    this.cursor = this.top;
  }

  /** Begins a new page for what may go out as a sheet of its own. */
  turnUnlessFresh(): void {
    if (this.y > this.top) this.turn();
  }

  private settle(): void {
    if (this.headings.length > 0) this.need(0);
  }

  /** Runs `fill` with its blocks inside a structure element. */
  within(tag: string, fill: () => void): void {
    this.settle();
    const element = this.doc.struct(tag);
    this.parents.at(-1)!.add(element);
    this.parents.push(element);
    fill();
    this.parents.pop();
    element.end();
  }

  /** Marks what `draw` puts on this page as one structure element. */
  tagged(tag: string, draw: () => void, options: ElementOptions = {}): void {
    this.settle();
    this.parents.at(-1)!.add(this.doc.struct(tag, options, [draw]));
  }

  /** Marks what `draw` puts on the page as decoration, which a reading program leaves out. */
  artifact(draw: () => void): void {
    this.settle();
    this.doc.markContent('Artifact', { type: 'Layout' });
    draw();
    this.doc.endMarkedContent();
  }

  /** A paragraph, broken over pages between its lines. */
  paragraph(pieces: readonly Piece[], setting: Setting = {}): void {
    const style = setting.style ?? BODY;
    const lines = this.type.wrap(pieces, style, setting.width ?? this.width);
    this.need(Math.min(lines.length, 2) * leading(style));
    this.within(setting.tag ?? 'P', () => {
      let from = 0;
      while (from < lines.length) {
        const fitting = Math.max(1, Math.floor((this.rest + 0.01) / leading(style)));
        const page = lines.slice(from, from + fitting);
        this.spanOf(page, style, setting.x ?? this.left);
        from += page.length;
        if (from < lines.length) this.turn();
      }
    });
    this.y += setting.after ?? 6;
  }

  private spanOf(lines: readonly Line[], style: Style, x: number): void {
    const element = this.parents.at(-1)!;
    element.add(() => this.lines(lines, style, { x, y: this.y }));
    this.y += lines.length * leading(style);
  }

  /** Draws lines under each other from a top edge; moves no cursor. */
  lines(lines: readonly Line[], style: Style, at: { x: number; y: number }): void {
    lines.forEach((line, n) => {
      this.type.draw(line, at.x, at.y + n * leading(style) + RISE * style.size);
    });
  }

  /**
   * A numbered heading that stays with what follows it.
   * @param keep height that must follow on the same page where more is not asked for [pt]
   */
  heading(number: string, text: string, options: { level?: 2 | 3; keep?: number } = {}): void {
    const level = options.level ?? 2;
    const style: Style = { ...STRONG, size: level === 2 ? 13 : 10.6 };
    const indent = level === 2 ? 26 : 30;
    const lines = this.type.wrap([text], style, this.width - indent);
    const draw = () => {
      if (level === 2) this.doc.outline.addItem(`${number} ${text}`);
      this.tagged(`H${level}`, () => {
        this.type.put([{ text: number, weight: 'regular', ink: SOFT }], style, this.left, this.y + RISE * style.size);
        this.lines(lines, style, { x: this.left + indent, y: this.y });
      });
    };
    const height = lines.length * leading(style) + (level === 2 ? 6 : 3);
    this.headings.push({ space: level === 2 ? 16 : 9, height, keep: options.keep ?? 54, draw });
  }

  /** A horizontal rule at the cursor or at `y`. */
  rule(options: { y?: number; from?: number; to?: number; width?: number; ink?: string } = {}): void {
    const y = options.y ?? this.y;
    this.artifact(() => {
      this.doc
        .lineWidth(options.width ?? STROKE.hair)
        .moveTo(options.from ?? this.left, y)
        .lineTo(options.to ?? this.right, y)
        .stroke(options.ink ?? HAIR);
    });
  }
}

/** Height of one line of text [pt]. */
export function leading(style: Style): number {
  return LEADING * style.size;
}

/** From the top of a line to its baseline [pt]. */
export function rise(style: Style): number {
  return RISE * style.size;
}

/** Width and height of a sheet [pt]. */
export function sheet(size: PaperSize): [number, number] {
  return [...SHEETS[size]];
}
