import type { ChartTable } from '#libs/present/chart.js';
import { inPoints } from '#libs/present/format-number.js';

/** Hands a text to the browser as a file. */
export function saveText(name: string, type: string, text: string): void {
  const address = URL.createObjectURL(new Blob([text], { type: `${type};charset=utf-8` }));
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(address), 10_000);
}

/** A table as CSV for any program: plain numbers without gaps, a true minus as a hyphen. */
export function csvOf({ columns, rows }: ChartTable): string {
  const plain = (text: string) =>
    inPoints(text)
      .replace(/(?<=\d)\u00a0(?=\d{3})/g, '')
      .replaceAll('\u2212', '-')
      .replaceAll('\u00a0', ' ');
  const cell = (text: string) => (/[",\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);
  return [columns.map(({ head }) => head), ...rows]
    .map((row) => row.map((text) => cell(plain(text))).join(','))
    .join('\n');
}

const SVG = 'http://www.w3.org/2000/svg';
/** Room around a drawing [px]. */
const EDGE = 12;

const DRAWN = [
  'fill',
  'stroke',
  'stroke-width',
  'stroke-dasharray',
  'stroke-linejoin',
  'paint-order',
  'font-family',
  'font-size',
  'font-weight',
  'opacity',
];

/** The drawing of a figure as a file of its own: what the style sheet gave it is written into it. */
export function svgOf(plot: HTMLElement | null, title: string): string {
  const drawn = plot?.querySelector('svg');
  if (drawn === null || drawn === undefined) return '<svg xmlns="http://www.w3.org/2000/svg"/>';
  const copy = drawn.cloneNode(true) as SVGSVGElement;
  const from = [drawn, ...drawn.querySelectorAll('*')];
  [copy, ...copy.querySelectorAll('*')].forEach((element, at) => {
    const style = getComputedStyle(from[at]!);
    for (const name of DRAWN) element.setAttribute(name, style.getPropertyValue(name));
    element.removeAttribute('class');
  });
  copy.setAttribute('xmlns', SVG);
  copy.removeAttribute('aria-hidden');
  const name = document.createElementNS(SVG, 'title');
  name.textContent = title;
  copy.prepend(name, groundOf(drawn, copy));
  return new XMLSerializer().serializeToString(copy);
}

/** The sheet under a drawing, as large as all that is drawn; without it a dark theme's ink stands on white. */
function groundOf(drawn: SVGSVGElement, copy: SVGSVGElement): SVGRectElement {
  const { x, y, width, height } = drawn.getBBox();
  const left = Math.min(0, x) - EDGE;
  const top = Math.min(0, y) - EDGE;
  const wide = Math.ceil(Math.max(drawn.clientWidth, x + width) + EDGE - left);
  const high = Math.ceil(Math.max(drawn.clientHeight, y + height) + EDGE - top);
  const ground = document.createElementNS(SVG, 'rect');
  const place = { x: left, y: top, width: wide, height: high };
  for (const [key, value] of Object.entries(place)) ground.setAttribute(key, String(value));
  ground.setAttribute('fill', getComputedStyle(drawn).getPropertyValue('--sheet'));
  copy.setAttribute('viewBox', `${left} ${top} ${wide} ${high}`);
  copy.setAttribute('width', String(wide));
  copy.setAttribute('height', String(high));
  return ground;
}
