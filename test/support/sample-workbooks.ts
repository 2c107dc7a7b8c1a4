import { FIRST_OWN_STYLE, type MadeCell, madeWorkbook, STYLES, serialOf } from './made-workbook.js';

/** A valid file, for tests that damage files. */
export interface SampleFile {
  name: string;
  bytes: Uint8Array;
}

/** Invented loads: kW in quarters, kvar that leads in every ninth row. */
export function loadAt(row: number): { kw: number; kvar: number } {
  const kvar = 20 + ((row * 53) % 89) / 4;
  return { kw: 40 + ((row * 37) % 101) / 8, kvar: row % 9 === 0 ? -kvar : kvar };
}

const HEADER = ['interval begin', 'active power [kW]', 'reactive power [kvar]'];
const FIRST = serialOf('2024-05-06 00:00');

function rows(count: number, stamp: (day: number, row: number) => readonly MadeCell[]): MadeCell[][] {
  return Array.from({ length: count }, (_, row) => {
    const { kw, kvar } = loadAt(row);
    return [...stamp(FIRST + row / 96, row), kw, kvar];
  });
}

const isoAt = (row: number) => new Date(Date.UTC(2024, 4, 6) + row * 900_000).toISOString().slice(0, 16);

/** Workbooks as meters' programs write them: one a way of storing stamps and values. */
export function sampleWorkbooks(): SampleFile[] {
  const serials = rows(96, (serial) => [{ serial, style: STYLES.stamp }]);
  const texts = rows(60, (_, row) => [isoAt(row).replace('T', ' ')]);
  const split = rows(60, (serial) => [
    { serial: Math.floor(serial + 1e-9), style: STYLES.date },
    { serial: (serial + 1e-9) % 1, style: STYLES.clock },
  ]);
  const own = rows(60, (serial) => [{ serial: serial - 1462, style: FIRST_OWN_STYLE }]);
  const formulas = rows(60, (serial, row) => [{ formula: `A${row + 1}+1/96`, value: serial }]).map(
    ([stamp, ...rest]) => [
      { serial: (stamp as { value: number }).value, style: STYLES.stamp },
      ...rest.map((value) => ({ formula: 'ROUND(1,2)', value: value as number })),
    ],
  );
  const book = (name: string, sheet: MadeCell[][], more: object = {}) => ({
    name,
    bytes: madeWorkbook({ sheets: [{ name: 'Load', rows: sheet }], ...more }),
  });
  return [
    book('serial stamps', [HEADER, ...serials]),
    book('stamps as shared texts under a preamble', [['Feeder 7'], [], HEADER, ...texts]),
    book('date and clock apart', [['date', 'time', 'kW', 'kvar'], ...split]),
    book('own format, days from 1904', [HEADER, ...own], { since1904: true, formats: ['dd/mm/yyyy\\ hh:mm'] }),
    book('formulas with stored values', [HEADER, ...formulas]),
    {
      name: 'a hidden sheet of notes',
      bytes: madeWorkbook({
        sheets: [
          { name: 'Notes', rows: [['made up', { rich: ['by ', 'hand'] }]], state: 'hidden' },
          { name: 'Load', rows: [HEADER, ...serials] },
        ],
      }),
    },
  ];
}
