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

const DRAWN = [
  'fill',
  'stroke',
  'stroke-width',
  'stroke-dasharray',
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
  copy.setAttribute('xmlns', 'http://www.w3.org/2000/svg');
  copy.removeAttribute('aria-hidden');
  const name = document.createElementNS('http://www.w3.org/2000/svg', 'title');
  name.textContent = title;
  copy.prepend(name);
  return new XMLSerializer().serializeToString(copy);
}
