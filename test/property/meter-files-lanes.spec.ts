// The quick lane and the general one read every file alike, to the bit and to the last word of a refusal, whatever the
// size of the chunks; and both agree with a CSV library's reading.
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { type Lane, readCsv } from '#libs/meter-files/csv/read-csv.js';
import { MeterBytes } from '#libs/meter-files/meter-bytes.js';
import { streamOf } from '../support/meter-text.js';
import { readSlowly } from '../support/slow-meter-reading.js';
import { runs, SEED } from '../support/soak.js';

async function readBy(lane: Lane, content: string, chunkBytes: number) {
  try {
    return await readCsv(await MeterBytes.open(streamOf(content, chunkBytes)), {}, { lane });
  } catch (problem) {
    if (problem instanceof InputProblem) return problem.problems;
    throw problem;
  }
}

/** How a number may be written; plain ones are the commonest. */
const number = fc.oneof(
  { weight: 12, arbitrary: fc.integer({ min: 0, max: 9_999_999 }).map((n) => (n / 1000).toFixed(n % 4)) },
  { weight: 3, arbitrary: fc.double({ min: 0, max: 1e5, noNaN: true }).map(String) },
  {
    weight: 1,
    arbitrary: fc.constantFrom(
      '0',
      '00.5',
      '.25',
      '7.',
      '+3.5',
      ' 4.5',
      '4.5 ',
      '1e2',
      '123456789012.25',
      '0.1234567890123',
    ),
  },
);
const odd = fc.constantFrom('', 'NA', '?', '-0', '-0.000', '"12.5"', '1,5', 'x', '12.5x', '1.2.3', '""');

const table = fc.record({
  delimiter: fc.constantFrom(',', ';', '\t', '|'),
  rowEnd: fc.constantFrom('\n', '\r\n'),
  mark: fc.constantFrom('\ufeff', ''),
  stamps: fc.constantFrom('iso', 'isoZ', 'slashed', 'dotted', 'offset', 'seconds'),
  columns: fc.constantFrom(
    ['time', 'kW', 'kvar'],
    ['note', 'time', 'reactive kvar', 'kW'],
    ['time', 'kWh', 'x', 'lagging kvarh', 'leading kvarh', ''],
  ),
  rows: fc.array(fc.tuple(number, number, number, fc.nat(999)), { minLength: 3, maxLength: 60 }),
  odd: fc.array(fc.tuple(fc.nat(59), fc.nat(5), odd), { maxLength: 2 }),
  lastRowEnds: fc.boolean(),
});

type Table = typeof table extends fc.Arbitrary<infer T> ? T : never;

function stampOf(kind: Table['stamps'], momentS: number): string {
  const iso = new Date(momentS * 1000).toISOString();
  const [date, clock] = [iso.slice(0, 10), iso.slice(11, 16)];
  const [year, month, day] = date.split('-');
  switch (kind) {
    case 'iso':
      return `${date} ${clock}`;
    case 'isoZ':
      return `${date}T${clock}:00Z`;
    case 'slashed':
      return `${day}/${month}/${year} ${clock}`;
    case 'dotted':
      return `${day}.${month}.${year} ${clock}`;
    case 'offset':
      return `${date}T${clock}+01:00`;
    case 'seconds':
      return `${date} ${clock}:00`;
  }
}

function write(made: Table): string {
  const rows = made.rows.map((numbers, i) => {
    const stamp = stampOf(made.stamps, Date.UTC(2024, 4, 13, 20) / 1000 + i * 900);
    let next = 0;
    return made.columns.map((name) => {
      if (name === 'time') return stamp;
      if (name === 'note') return ['', 'say', '3/4', 'a b'][i % 4]!;
      return name === '' ? '' : numbers[next++]!.toString();
    });
  });
  for (const [row, column, text] of made.odd) {
    const cells = rows[row % rows.length]!;
    cells[column % cells.length] = text;
  }
  const lines = [made.columns, ...rows].map((cells) => cells.join(made.delimiter));
  return made.mark + lines.join(made.rowEnd) + (made.lastRowEnds ? made.rowEnd : '');
}

describe('the two lanes', () => {
  it('give one record or one refusal', async () => {
    let read = 0;
    await fc.assert(
      fc.asyncProperty(table, fc.integer({ min: 1, max: 400 }), async (made, chunkBytes) => {
        const content = write(made);
        const quick = await readBy('quick', content, chunkBytes);
        expect(quick).toEqual(await readBy('general', content, 65_536));
        if (!('record' in quick)) return;
        read++;
        const dates = made.stamps === 'slashed' || made.stamps === 'dotted' ? 'dmy' : 'ymd';
        const slow = readSlowly(new TextEncoder().encode(content), {
          delimiter: made.delimiter,
          decimal: '.',
          dates,
          stamp: 'begin',
        });
        const { record } = quick;
        expect(
          Array.from(record.beginS, (beginS, i) => [
            beginS,
            record.activeKw[i],
            record.laggingKvar[i],
            record.leadingKvar[i],
          ]),
        ).toEqual([...slow.rows].map(([beginS, row]) => [beginS, ...row]));
      }),
      { seed: SEED, numRuns: runs(500, 5000) },
    );
    // refusals alone would show nothing
    expect(read).toBeGreaterThan(150);
  });
});
