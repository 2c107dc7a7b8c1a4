import { describe, expect, it } from 'vitest';
import { lines, noteCodes, questionOf, readMeterText, refusalOf } from '../../../test/support/meter-text.js';

const stampAt = (i: number) => new Date(Date.UTC(2024, 4, 6) + i * 900_000).toISOString();
const rows = (count: number, row: (i: number) => string) =>
  Array.from({ length: count }, (_, i) => `${stampAt(i)},${row(i)}`);
const kw = async (content: string | Uint8Array) => Array.from((await readMeterText(content)).record.activeKw);

describe('delimited text', () => {
  it('may be UTF-16 of either order, with or without its mark, or an 8-bit code', async () => {
    const content = lines(
      'Zeit;Wirkleistung (kW);Blindleistung für Q (kvar)',
      '06.05.2024 00:00;1,5;2',
      '06.05.2024 00:15;2,5;2',
    );
    const little = Buffer.from(content, 'utf16le');
    const big = Buffer.from(little).swap16();
    const mark = (code: Buffer, ...bytes: number[]) => Uint8Array.from([...bytes, ...code]);
    for (const bytes of [
      mark(little),
      mark(little, 0xff, 0xfe),
      mark(big),
      mark(big, 0xfe, 0xff),
      mark(Buffer.from(content, 'latin1')),
    ]) {
      expect(await kw(bytes)).toEqual([1.5, 2.5]);
    }
  });

  it('may end its rows with LF, CR LF or CR, and its last row with nothing', async () => {
    const content = ['time,kW,kvar', ...rows(3, (i) => `${i},1`)];
    for (const end of ['\n', '\r\n', '\r']) expect(await kw(content.join(end))).toEqual([0, 1, 2]);
  });

  it('keeps a delimiter, a quotation mark and a row end inside quoted cells', async () => {
    const content = lines(
      '"active\npower, ""P"" [kW]",time,kvar',
      ...rows(2, () => '').map((_, i) => `"${i}",${stampAt(i)},1`),
    );
    expect(await kw(content)).toEqual([0, 1]);
  });

  it('refuses text behind a closing quotation mark and a mark that is never closed', async () => {
    expect(
      (await refusalOf(lines('time,kW,kvar', ...rows(3, (i) => (i === 1 ? '"1"0,1' : '1,1'))))).problems,
    ).toMatchObject([{ code: 'unreadable', row: 3, column: 2 }]);
    expect(
      (await refusalOf(lines('time,kW,kvar', ...rows(3, (i) => (i === 1 ? '"1,1' : '1,1'))))).problems,
    ).toMatchObject([{ code: 'unreadable', row: 3 }]);
  });

  it('finds the header behind a preamble longer than anything looked at once', async () => {
    const preamble = Array.from({ length: 40_000 }, (_, i) => `line ${i} of a very long remark`);
    const reading = await readMeterText(
      lines(...preamble, 'time,kW,kvar', ...rows(3, () => 'x,1')).replaceAll(',x,', ',7,'),
    );
    expect(Array.from(reading.record.activeKw)).toEqual([7, 7, 7]);
    expect(reading.record.notes).toContainEqual(
      expect.objectContaining({ code: 'rows-before-header', values: { rows: 40_000 } }),
    );
    const problem = await refusalOf(lines(...preamble, 'time,kW,kvar', ...rows(3, (i) => (i === 2 ? 'x,1' : '1,1'))));
    expect(problem.problems).toMatchObject([{ code: 'bad-number', row: 40_004, column: 2 }]);
  });

  it('refuses a row that outgrows every meter file', async () => {
    const content = lines('time,kW,kvar', ...rows(2, (i) => (i === 1 ? `1,${'1'.repeat(1_200_000)}` : '1,1')));
    expect((await refusalOf(content)).problems).toMatchObject([{ code: 'too-large', row: 3 }]);
  });

  it('refuses rows of data above the header, which a preamble would hide', async () => {
    const [first = '', ...others] = rows(4, () => '1,1');
    expect((await refusalOf(lines(first, 'time,kW,kvar', ...others))).problems).toMatchObject([
      { code: 'unreadable', row: 1 },
    ]);
  });

  it('names everything that is wrong in one reading, up to what a person reads', async () => {
    const few = await refusalOf(lines('time,kW,kvar', ...rows(5, (i) => (i % 2 === 0 ? 'x,y' : '1,1'))));
    expect(few.problems.map(({ row, column }) => [row, column])).toEqual([
      [2, 2],
      [2, 3],
      [4, 2],
      [4, 3],
      [6, 2],
      [6, 3],
    ]);
    expect((await refusalOf(lines('time,kW,kvar', ...rows(500, () => 'x,y')))).problems).toHaveLength(20);
  });

  it('refuses a file of names alone, of data alone, and of neither', async () => {
    expect((await refusalOf('time,kW,kvar')).code).toBe('empty-file');
    expect((await refusalOf(lines(...rows(3, () => '1,1')))).code).toBe('no-active-column');
    expect((await refusalOf('a letter\nwithout figures\n')).code).toBe('unknown-format');
    expect((await refusalOf(lines('a,kW,kvar', '1,2,3', '2,3,4'))).code).toBe('no-time-column');
  });

  it('refuses numbers that contradict the decimal mark of the rows before', async () => {
    const problem = await refusalOf(
      lines(
        'time;kW;kvar',
        ...rows(3, (i) => `${i === 2 ? '2,5' : '2.5'},1`).map((row) =>
          row.replace(/,(?=\d)/, ';').replace(/,1$/, ';1'),
        ),
      ),
    );
    expect(problem.problems).toMatchObject([{ code: 'bad-number', row: 4, column: 2, found: '"2,5"' }]);
  });

  it('takes a bare dot in a comma-delimited file as decimal mark: a decimal comma could not stand there unquoted', async () => {
    expect(await kw(lines('time,kW,kvar', ...rows(2, () => '1.234,5.678')))).toEqual([1.234, 1.234]);
  });

  it('refuses negative kvar in a column that lags or leads', async () => {
    const problem = await refusalOf(
      lines('time,kW,lagging kvar,leading kvar', ...rows(3, (i) => `1,${i === 1 ? -1 : 1},0`)),
    );
    expect(problem.problems).toMatchObject([{ code: 'out-of-range', row: 3, column: 3 }]);
  });

  it('takes a column of energy that only rises, in steps far smaller than itself, for a register', async () => {
    const file = (energies: (i: number) => string) => lines('time,kWh,kvarh', ...rows(300, energies));
    expect(await kw(file((i) => `${100_000 + 3 * i},${7000 + i}`))).toEqual(Array(299).fill(12));
    expect(await kw(lines('time,kW,kvar', ...rows(300, (i) => `${100_000 + 3 * i},1`)))).toHaveLength(300);
    // backwards too, and with the small sums that binary fractions leave
    const backwards = rows(300, (i) => `${(5000 + i / 10).toFixed(1)},${(7000 + i / 5).toFixed(1)}`).toReversed();
    expect(await kw(lines('time,kWh,kvarh', ...backwards))).toEqual(Array(299).fill(0.4));
  });

  it('asks about a column of energy that rises from nothing, and about one beside a register that stands still', async () => {
    const rising = lines('time,kWh,kvarh', ...rows(300, (i) => `${3 * i},${i % 5}`));
    const { questions } = await questionOf(rising);
    expect(questions.map(({ id, readings }) => [id, readings.map(({ maxKw }) => maxKw)])).toEqual([
      ['energy', [3 * 299 * 4, 12]],
    ]);
    const still = lines('time,kWh,kvarh', ...rows(300, (i) => `${100_000 + 3 * i},40`));
    expect((await questionOf(still)).questions.map(({ id }) => id)).toEqual(['energy']);
    const { record } = await readMeterText(still, { map: { energy: 'register' } });
    expect([record.activeKw[0], record.laggingKvar[0]]).toEqual([12, 0]);
  });

  it('refuses a column that is called a register and falls like none', async () => {
    const problem = await refusalOf(lines('time,kWh register,kvarh', ...rows(300, (i) => `${i % 7},${i % 5}`)));
    expect(problem.problems).toMatchObject([{ code: 'inconsistent', column: 2 }]);
    expect(await kw(lines('time,kWh reading,kvarh', ...rows(300, (i) => `${i % 7},${i % 5}`)))).toHaveLength(300);
  });

  it('asks which of two reactive columns counts, and takes the map’s word', async () => {
    const content = lines('time,kW,kvar,kvar net', ...rows(2, (i) => `1,${i},9`));
    const { questions } = await questionOf(content);
    expect(questions[0]!.readings.map(({ map }) => map.columns)).toEqual([
      { active: 2, reactive: 3 },
      { active: 2, reactive: 4 },
      { active: 2, lagging: 3, leading: 4 },
      { active: 2, lagging: 4, leading: 3 },
    ]);
    const { record } = await readMeterText(content, { map: { columns: { reactive: 'kvar net' } } });
    expect(Array.from(record.laggingKvar)).toEqual([9, 9]);
  });

  it('asks about everything that is open at once', async () => {
    const { questions } = await questionOf(
      lines('time;kW;kvar', '03/04/2024 00:00;1,234;1,100', '03/04/2024 00:15;1,235;1,100'),
    );
    expect(questions.map(({ id }) => id)).toEqual(['decimal', 'dateOrder']);
  });

  it('does not pass over a leading column because its unit can’t be read', async () => {
    const problem = await refusalOf(lines('time,kW,lagging (kvar),leading (kvra)', ...rows(2, () => '1,1,1')));
    expect(problem.problems).toMatchObject([{ code: 'wrong-unit', row: 1, column: 4 }]);
  });

  it('refuses a date alone in a file that writes its midnights out, and takes it as midnight where it does not', async () => {
    const dropped = lines('time,kW,kvar', '2024-05-06 23:45,1,1', '2024-05-07,2,1', '2024-05-07 00:15,3,1');
    expect(await kw(dropped)).toEqual([1, 2, 3]);
    const broken = lines('time,kW,kvar', '2024-05-06 00:00,1,1', '2024-05-06 00:15,2,1', '2024-05-07,3,1');
    expect((await refusalOf(broken)).problems).toMatchObject([{ code: 'bad-time', row: 4 }]);
  });

  it('refuses stamps of which some carry an offset and some do not', async () => {
    const problem = await refusalOf(lines('time,kW,kvar', '2024-05-06T00:00Z,1,1', '2024-05-06T00:15,2,1'));
    expect(problem.problems).toMatchObject([{ code: 'bad-time', row: 3, column: 1 }]);
  });

  it('reads local stamps in the zone of the command line, else the map’s, else the header’s, else the site’s', async () => {
    const content = (name: string) => lines(`${name},kW,kvar`, '2024-05-06 12:00,1,1', '2024-05-06 12:15,2,1');
    const hour = async (name: string, options: object) => {
      const { record } = await readMeterText(content(name), options);
      return new Date(record.firstS * 1000).getUTCHours();
    };
    const site = { siteTimeZone: 'Asia/Kolkata' };
    expect(await hour('time', {})).toBe(12);
    expect(await hour('time', site)).toBe(6);
    expect(await hour('time [UTC]', site)).toBe(12);
    expect(await hour('time [UTC]', { ...site, map: { timeZone: '+02:00' } })).toBe(10);
    expect(await hour('time [UTC]', { ...site, map: { timeZone: '+02:00' }, timeZone: 'Europe/Dublin' })).toBe(11);
    expect(noteCodes(await readMeterText(content('time')))).toContain('zone-assumed-utc');
    expect(noteCodes(await readMeterText(content('time'), site))).not.toContain('zone-assumed-utc');
  });

  it('refuses a zone that is none, and a map that names a column that is not there', async () => {
    const content = lines('time,kW,kvar', '2024-05-06 12:00,1,1', '2024-05-06 12:15,2,1');
    expect((await refusalOf(content, { timeZone: 'Mars/Olympus' })).problems).toMatchObject([{ path: 'timeZone' }]);
    expect((await refusalOf(content, { map: { columns: { active: 'kWh' } } })).problems).toMatchObject([
      { path: 'columns.active' },
    ]);
  });

  it('finds the header by the names that the map gives', async () => {
    const content = lines('Report,of,invention', 'when,one,two', ...rows(3, (i) => `${i},1`));
    const map = { columns: { time: 'when', active: 'one', reactive: 'two' }, quantity: 'power' as const };
    const { record } = await readMeterText(content, { map });
    expect(Array.from(record.activeKw)).toEqual([0, 1, 2]);
  });

  it('reads a file without a header where the map numbers its columns', async () => {
    const map = { headerRow: 0, columns: { time: 1, active: 2, reactive: 3 }, quantity: 'power' as const };
    const { record } = await readMeterText(lines(...rows(3, (i) => `${i},1`)), { map });
    expect(Array.from(record.activeKw)).toEqual([0, 1, 2]);
  });

  it('takes the other sign as lagging where the map says so', async () => {
    const content = lines('time,kW,kvar', ...rows(2, (i) => `1,${i === 0 ? 2 : -3}`));
    const { record } = await readMeterText(content, { map: { sign: 'leadingPositive' } });
    expect([Array.from(record.laggingKvar), Array.from(record.leadingKvar)]).toEqual([
      [0, 3],
      [2, 0],
    ]);
  });
});

describe('gaps', () => {
  const content = lines('time,kW,kvar', ...rows(9, (i) => (i === 3 || i === 4 || i === 7 ? ',' : `${10 * i},${i}`)));
  const repaired = async (repair: 'hold' | 'interpolate' | 'typicalDay', upToS: number) => {
    const reading = await readMeterText(content, { map: { repair, upToS } });
    return { kw: Array.from(reading.record.activeKw), record: reading.record, quality: reading.quality };
  };

  it('stay gaps unless the map asks for a repair', async () => {
    const { record, quality } = await readMeterText(content);
    expect({ missing: record.missing, repaired: record.repaired, intervals: record.beginS.length }).toEqual({
      missing: 3,
      repaired: 0,
      intervals: 6,
    });
    expect(quality.missingSpans).toEqual([
      { beginS: Date.parse(stampAt(3)) / 1000, endS: Date.parse(stampAt(5)) / 1000, intervals: 2 },
      { beginS: Date.parse(stampAt(7)) / 1000, endS: Date.parse(stampAt(8)) / 1000, intervals: 1 },
    ]);
  });

  it('are filled up to the length that is said, and counted', async () => {
    const held = await repaired('hold', 1800);
    expect(held.kw).toEqual([0, 10, 20, 20, 20, 50, 60, 60, 80]);
    expect(held.record).toMatchObject({ missing: 0, repaired: 3 });
    expect(held.record.notes).toContainEqual(
      expect.objectContaining({ code: 'intervals-repaired', values: { method: 'hold', intervals: 3, upToS: 1800 } }),
    );
    const short = await repaired('hold', 900);
    expect(short.kw).toEqual([0, 10, 20, 50, 60, 60, 80]);
    expect(short.record).toMatchObject({ missing: 2, repaired: 1 });
  });

  it('are filled along a line where that is asked for', async () => {
    expect((await repaired('interpolate', 1800)).kw).toEqual([0, 10, 20, 30, 40, 50, 60, 70, 80]);
  });

  it('are filled with the mean of the same local time on like days', async () => {
    // three days, the first two whole, noon of the third missing; Monday to Wednesday are like days
    const day = (i: number) => [100, 120, 0][Math.floor(i / 4)]!;
    const file = lines(
      'time,kW,kvar',
      ...Array.from({ length: 12 }, (_, i) => {
        const stamp = new Date(Date.UTC(2024, 4, 6) + i * 6 * 3_600_000).toISOString();
        return i === 10 ? `${stamp},,` : `${stamp},${day(i) + (i % 4)},1`;
      }),
    );
    const { record } = await readMeterText(file, { map: { repair: 'typicalDay', upToS: 86_400 } });
    expect(record.activeKw[10]).toBe((102 + 122) / 2);
  });

  it('are not repaired without a longest span', async () => {
    expect((await refusalOf(content, { map: { repair: 'hold' } })).problems).toMatchObject([
      { code: 'missing', path: 'upToS' },
    ]);
  });
});
