import type { CellFill, Chart } from '#libs/present/chart.js';

const WIDE = 46;
const HIGH = 18;
const LEFT = 52;

const FILLS: Record<CellFill, { fill: string; ink: string }> = {
  blank: { fill: '#ffffff', ink: '#14202b' },
  quiet: { fill: '#dfe6e3', ink: '#14202b' },
  hatch: { fill: 'url(#near)', ink: '#14202b' },
  solid: { fill: '#8e0f45', ink: '#ffffff' },
};

/** A margin map as a picture of its own, for a file. */
export function marginPicture(chart: Chart): string {
  const { columns, rows } = chart.table;
  const text = (x: number, y: number, words: string, ink = '#14202b') =>
    `<text x="${x}" y="${y}" fill="${ink}" text-anchor="${x < LEFT ? 'end' : 'middle'}">${escaped(words)}</text>`;
  const heads = columns.map(({ head }, at) =>
    at === 0 ? text(LEFT - 8, 14, head, '#505e69') : text(LEFT + (at - 0.5) * WIDE, 14, head),
  );
  const names = rows.map((row, at) => text(LEFT - 8, 20 + at * HIGH + 13, row[0] ?? '', '#505e69'));
  const cells = chart.marks.map((mark) => {
    if (mark.kind !== 'cell') return '';
    const { fill, ink } = FILLS[mark.fill];
    const [x, y] = [LEFT + mark.column * WIDE, 20 + mark.row * HIGH];
    const plate =
      mark.fill === 'hatch'
        ? `<rect x="${x + 10}" y="${y + 2}" width="${WIDE - 20}" height="${HIGH - 4}" fill="#ffffff"/>`
        : '';
    const box = `<rect x="${x}" y="${y}" width="${WIDE}" height="${HIGH}" fill="${fill}" stroke="#c3cccb" stroke-width="0.6"/>`;
    return `${box}${plate}${text(x + WIDE / 2, y + 13, mark.text, ink)}`;
  });
  const width = LEFT + (columns.length - 1) * WIDE + 2;
  const height = 24 + rows.length * HIGH;
  const near =
    '<pattern id="near" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)"><rect width="5" height="5" fill="#fcf1d8"/><path d="M0 0V5" stroke="#916200" stroke-width="2.4"/></pattern>';
  return `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" font-family="Sofia Sans Semi Condensed, sans-serif" font-size="12.5"><title>${escaped(chart.finding)}</title><defs>${near}</defs>${heads.join('')}${names.join('')}${cells.join('')}</svg>`;
}

function escaped(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;');
}
