import type {} from 'pdfkit';

/** Two places of decimals are finer than a printer's dot. */
const place = (value: number): string => String(Math.round(value * 100) / 100);
const NONE = 'none';

/** What is drawn next: widths, dashes and the clip of the present group. */
interface Pen {
  width: number;
  dash: string;
  join: string;
  fill: string;
  font: string;
  size: number;
}

/** Families as a reader of the figure may have them; text keeps its measured width whatever is taken. */
const FAMILIES = "'Sofia Sans Semi Condensed','Arial Narrow',sans-serif";

/**
 * Takes the strokes that a figure's drawing makes and writes them as SVG. The same functions draw on paper; fonts are
 * measured by the document this pen stands in for, so that both look alike.
 */
export class SvgPen {
  readonly #parts: string[] = [];
  readonly #kept: { pen: Pen; groups: number }[] = [];
  #pen: Pen = { width: 1, dash: '', join: 'miter', fill: '#000000', font: '', size: 10 };
  #path = '';
  #clips = 0;
  #groups = 0;

  /** @param name of the figure, so that several on one page keep their own clips */
  constructor(private readonly name: string) {}

  /** @returns what was drawn, as the inside of an svg element */
  get drawn(): string {
    return this.#parts.join('\n');
  }

  lineWidth(width: number): void {
    this.#pen.width = width;
  }

  lineJoin(join: string): void {
    this.#pen.join = join;
  }

  dash(length: number, { space = length }: { space?: number } = {}): void {
    this.#pen.dash = `${place(length)} ${place(space)}`;
  }

  undash(): void {
    this.#pen.dash = '';
  }

  moveTo(x: number, y: number): void {
    this.#path += `M${place(x)} ${place(y)}`;
  }

  lineTo(x: number, y: number): void {
    this.#path += `L${place(x)} ${place(y)}`;
  }

  bezierCurveTo(...[ax, ay, bx, by, x, y]: [number, number, number, number, number, number]): void {
    this.#path += `C${[ax, ay, bx, by, x, y].map(place).join(' ')}`;
  }

  rect(x: number, y: number, width: number, height: number): void {
    this.#path += `M${place(x)} ${place(y)}h${place(width)}v${place(height)}h${place(-width)}Z`;
  }

  circle(x: number, y: number, radius: number): void {
    const [r, d] = [place(radius), place(2 * radius)];
    this.#path += `M${place(x - radius)} ${place(y)}a${r} ${r} 0 1 0 ${d} 0a${r} ${r} 0 1 0 -${d} 0Z`;
  }

  polygon(...corners: [number, number][]): void {
    this.#path += `${corners.map(([x, y], at) => `${at === 0 ? 'M' : 'L'}${place(x)} ${place(y)}`).join('')}Z`;
  }

  stroke(colour = '#000000'): void {
    this.#put(NONE, colour);
  }

  fill(colour = '#000000'): void {
    this.#put(colour, NONE);
  }

  fillAndStroke(fill: string, stroke: string): void {
    this.#put(fill, stroke);
  }

  fillColor(colour: string): void {
    this.#pen.fill = colour;
  }

  /** What follows is cut to the present path, until the state before is restored. */
  clip(): void {
    const id = `${this.name}-clip-${++this.#clips}`;
    this.#parts.push(`<clipPath id="${id}"><path d="${this.#path}"/></clipPath>`, `<g clip-path="url(#${id})">`);
    this.#path = '';
    this.#groups++;
  }

  save(): void {
    this.#kept.push({ pen: { ...this.#pen }, groups: this.#groups });
  }

  restore(): void {
    const before = this.#kept.pop();
    if (before === undefined) throw new Error('restored more often than saved');
    for (; this.#groups > before.groups; this.#groups--) this.#parts.push('</g>');
    this.#pen = before.pen;
  }

  font(name: string, size: number): void {
    this.#pen.font = name;
    this.#pen.size = size;
  }

  text(text: string, x: number, y: number, { textWidth }: { textWidth?: number } = {}): void {
    if (text.trim() === '') return;
    const weight = this.#pen.font.startsWith('semibold') ? ' font-weight="600"' : '';
    const width = textWidth === undefined ? '' : ` textLength="${place(textWidth)}" lengthAdjust="spacingAndGlyphs"`;
    this.#parts.push(
      `<text x="${place(x)}" y="${place(y)}" font-size="${place(this.#pen.size)}"${weight}${width} fill="${this.#pen.fill}">${escaped(text)}</text>`,
    );
  }

  #put(fill: string, stroke: string): void {
    const { width, dash, join } = this.#pen;
    const line =
      stroke === NONE
        ? ''
        : ` stroke-width="${place(width)}"${dash === '' ? '' : ` stroke-dasharray="${dash}"`}${join === 'miter' ? '' : ` stroke-linejoin="${join}"`}`;
    this.#parts.push(`<path d="${this.#path}" fill="${fill}" stroke="${stroke}"${line}/>`);
    this.#path = '';
  }
}

/**
 * A drawing as an SVG file.
 * @param pen what was drawn
 * @param size width and height [pt]
 * @param words title and the whole in words, for who cannot see it
 * @returns the file's text
 */
export function svgFile(
  pen: SvgPen,
  size: { width: number; height: number },
  words: { title: string; sentence: string },
): string {
  const [width, height] = [place(size.width), place(size.height)];
  return `<svg xmlns="http://www.w3.org/2000/svg" width="${width}pt" height="${height}pt" viewBox="0 0 ${width} ${height}" font-family="${FAMILIES}" role="img">
<title>${escaped(words.title)}</title>
<desc>${escaped(words.sentence)}</desc>
<rect width="${width}" height="${height}" fill="#ffffff"/>
${pen.drawn}
</svg>
`;
}

function escaped(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;');
}

/**
 * A document that measures as its own fonts do and draws with the pen.
 * @param doc measures
 * @param pen draws
 * @returns what a figure's drawing takes for a document
 */
export function penned(doc: PDFKit.PDFDocument, pen: SvgPen): PDFKit.PDFDocument {
  const drawing: PDFKit.PDFDocument = new Proxy(doc, {
    get(target, name) {
      const own = name in SvgPen.prototype ? (pen as unknown as Record<PropertyKey, unknown>)[name] : undefined;
      const measured = (target as unknown as Record<PropertyKey, unknown>)[name];
      if (typeof own !== 'function') return typeof measured === 'function' ? measured.bind(target) : measured;
      return (...args: unknown[]) => {
        own.apply(pen, args);
        // the font is what texts are measured by
        if (name === 'font') (measured as (...given: unknown[]) => unknown).apply(target, args);
        return drawing;
      };
    },
  });
  return drawing;
}
