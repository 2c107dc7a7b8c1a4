// What a question tells of a reading is gathered part by part; the record that the answer gives is made as a whole. Both are
// the same, over several parts and whatever is special about a row at their seams.
import { describe, expect, it } from 'vitest';
import { lines, questionOf, readMeterText } from '../../../test/support/meter-text.js';
import { shownReading } from '../record/reading-shown.js';

/** Enough for three parts. */
const ROWS = 20_000;
const minute = (row: number) =>
  new Date(Date.UTC(2024, 0, 1) + row * 60_000).toISOString().slice(0, 16).replace('T', ' ');

function fileOf(header: string, cells: (row: number) => string, delimiter = ','): string {
  const rows = Array.from({ length: ROWS }, (_, row) => `${minute(row)}${delimiter}${cells(row)}`);
  return lines(`begin${delimiter}${header}`, ...rows);
}

/** Missing about where one part ends and the next begins, and elsewhere. */
const gap = (row: number, value: number | string) => (row % 2731 === 0 || (row > 8189 && row < 8195) ? '' : value);

const FILES: Record<string, string> = {
  'registers that may be energies': fileOf('kWh,lagging kvarh', (row) =>
    [gap(row, (8 + row * 1.1).toFixed(1)), row === 8192 ? 0 : 5 + row].join(','),
  ),
  'a decimal mark that may divide thousands': fileOf(
    'kW;kvar',
    (row) => `${1 + (row % 997)}.${100 + (row % 700)};${gap(row, `${1 + (row % 300)}.500`)}`,
    ';',
  ),
  'a power factor of two signs': fileOf('kW,power factor', (row) =>
    [row % 500, `${row > 9000 && row % 3 === 0 ? '-' : ''}0.${70 + (row % 29)}`].join(','),
  ),
  'kVA beside a power factor of two signs': fileOf('kVA,power factor', (row) =>
    [gap(row, (row % 500) + 0.25), `${row > 9000 && row % 3 === 0 ? '-' : ''}${70 + (row % 29)}`].join(','),
  ),
  'two columns of kW': fileOf('kW A,kW B,kvar', (row) => [row % 500, gap(row, row % 77), row % 31].join(',')),
  'rows that disagree': `${fileOf('kW,kvar', (row) => [row % 500, row % 31].join(','))}${minute(8192)},1,1\n`,
  'a quality of two meanings': fileOf('kW,quality,kvar', (row) => [row % 500, row % 9 === 0 ? 'M' : 'A', 1].join(',')),
};

describe('what a question tells of a file with', () => {
  it.each(Object.entries(FILES))('%s is what its answers give', async (_, file) => {
    const { questions } = await questionOf(file);
    const [{ readings }] = questions as [(typeof questions)[0]];
    expect(readings.length).toBeGreaterThan(1);
    for (const { map, ...told } of readings) {
      const { record } = await readMeterText(file, { map });
      expect({ map, ...told }).toEqual(shownReading(map, record));
    }
    expect(new Set(readings.map(({ map: _, ...told }) => JSON.stringify(told))).size).toBeGreaterThan(1);
  });
});
