// Shapes in which meters and portals export, each with numbers that say by themselves which column was taken for what: active
// power 40, 41 …, lagging 20, 21 …, leading 5, 6 …, export 1. Words of the trade and column layouts are common practice;
// quadrants follow IEC 62053-23, identification codes IEC 62056-61.
import { describe, expect, it } from 'vitest';
import { lines, noteCodes, questionOf, readMeterText, refusalOf } from '../../../test/support/meter-text.js';

const ROWS = [0, 1, 2, 3];
const at = (i: number) => `14.03.2024 0${Math.floor(i / 4)}:${['00', '15', '30', '45'][i % 4]}`;
const file = (header: string, row: (i: number) => (number | string)[], rows: readonly number[] = ROWS) =>
  lines(header, ...rows.map((i) => row(i).join(';')));

const valuesOf = async (content: string) => {
  const { record } = await readMeterText(content);
  return {
    kw: Array.from(record.activeKw),
    lagging: Array.from(record.laggingKvar),
    leading: Array.from(record.leadingKvar),
  };
};
const from = (first: number) => ROWS.map((i) => first + i);
const zeros = ROWS.map(() => 0);

describe('words of a header', () => {
  it.each([
    'Tijdstip;Actief vermogen (kW);Blind inductief (kvar);Blind capacitief (kvar)',
    'Data e ora;Potenza attiva (kW);Potenza reattiva induttiva (kvar);Potenza reattiva capacitiva (kvar)',
    'Data/Hora;Potência ativa (kW);Potência reativa indutiva (kvar);Potência reativa capacitiva (kvar)',
    'Data i czas;Moc czynna [kW];Moc bierna indukcyjna [kvar];Moc bierna pojemnościowa [kvar]',
    'Tarih;Aktif (kW);Endüktif (kvar);Kapasitif (kvar)',
    'Tidpunkt;Aktiv effekt (kW);Reaktiv effekt induktiv (kvar);Reaktiv effekt kapacitiv (kvar)',
    'Horodatage;EA (kW);ER+ (kvar);ER- (kvar)',
    'Zeit;+A (kW);+R (kvar);-R (kvar)',
    'Zeitstempel;1-1:1.5.0*255 (kW);1-1:5.5.0*255 (kvar);1-1:8.5.0*255 (kvar)',
    'Time;P (kW);Quadrant I (kvar);Quadrant IV (kvar)',
  ])('%s', async (header) => {
    const content = file(header, (i) => [at(i), 40 + i, 20 + i, 5 + i]);
    expect(await valuesOf(content)).toEqual({ kw: from(40), lagging: from(20), leading: from(5) });
  });

  it.each([
    'Fecha y hora;AE (kW);AS (kW);R1 (kvar);R2 (kvar);R3 (kvar);R4 (kvar)',
    'Fecha y hora;AI (kW);AE (kW);R1 (kvar);R2 (kvar);R3 (kvar);R4 (kvar)',
    'Time;kW delivered;kW received;kvar Q1;kvar Q2;kvar Q3;kvar Q4',
    'Zeit;1.29.0 [kW];2.29.0 [kW];5.29.0 [kvar];6.29.0 [kvar];7.29.0 [kvar];8.29.0 [kvar]',
  ])('quadrants I and II lag, III and IV lead: %s', async (header) => {
    const content = file(header, (i) => [at(i), 41 + i, 1, 15 + i, 5, 2, 3 + i]);
    expect(await valuesOf(content)).toEqual({ kw: from(40), lagging: from(20), leading: from(5) });
    expect(noteCodes(await readMeterText(content))).toContain('quadrants-by-name');
  });

  it('takes the sum of reactive energy rather than its quadrants, where both are there', async () => {
    const header =
      'Zeit;1.29.0 [kW];3.29.0 [kvar];4.29.0 [kvar];5.29.0 [kvar];6.29.0 [kvar];7.29.0 [kvar];8.29.0 [kvar]';
    const content = file(header, (i) => [at(i), 40 + i, 20 + i, 5 + i, 1, 1, 1, 1]);
    expect(await valuesOf(content)).toEqual({ kw: from(40), lagging: from(20), leading: from(5) });
  });

  it('offers both directions where two columns of kvar say no more', async () => {
    const content = file('t;kW;kvar x;kvar y', (i) => [at(i), 40 + i, 20 + i, 5 + i]);
    const { questions } = await questionOf(content);
    expect(questions.map(({ id }) => id)).toEqual(['columns']);
    const answer = questions[0]!.readings.find(({ map }) => map.columns?.lagging === 3)!;
    const { record } = await readMeterText(content, { map: answer.map });
    expect([Array.from(record.laggingKvar), Array.from(record.leadingKvar)]).toEqual([from(20), from(5)]);
  });

  it('refuses names that say nothing by these names, and never takes a rate or a maximum for a total', async () => {
    const content = file('Zeit;1.8.1 (kWh);1.6.0 (kW);3.8.1 (kvarh)', (i) => [at(i), 10 + i, 40, 5 + i]);
    const { problems } = await refusalOf(content);
    expect(problems[0]).toMatchObject({ code: 'no-active-column', row: 1, found: expect.stringContaining('1.6.0') });
  });
});

describe('a column a phase', () => {
  it.each([
    'Time;P1 [kW];P2 [kW];P3 [kW];Q1 [kvar];Q2 [kvar];Q3 [kvar]',
    'Time;kW1;kW2;kW3;kvar1;kvar2;kvar3',
    'Time;kWa;kWb;kWc;kvara;kvarb;kvarc',
    'Time;Active power R (kW);Active power S (kW);Active power T (kW);Reactive power R (kvar);Reactive power S (kvar);Reactive power T (kvar)',
  ])('is a third of the whole: %s', async (header) => {
    const content = file(header, (i) => [at(i), 10, 20, 10 + i, 5, 5, 10 + i]);
    expect(await valuesOf(content)).toEqual({ kw: from(40), lagging: from(20), leading: zeros });
    expect(noteCodes(await readMeterText(content))).toContain('phases-added');
  });

  it('is passed over where the whole stands beside it', async () => {
    const header = 'Time;kW A;kW B;kW C;kW total;kvar A;kvar B;kvar C;kvar total';
    const content = file(header, (i) => [at(i), 1, 2, 3, 40 + i, 4, 5, 6, 20 + i]);
    expect(await valuesOf(content)).toEqual({ kw: from(40), lagging: from(20), leading: zeros });
  });

  it('is never taken alone for the whole: numbers that may count anything are asked about, the sum among the answers', async () => {
    const content = file('Time;kW 1;kW 2;kW 3;kvar', (i) => [at(i), 10, 20, 10 + i, 20 + i]);
    const { questions } = await questionOf(content);
    expect(questions[0]!.readings[0]!.map.columns).toMatchObject({ active: [2, 3, 4] });
    expect(questions[0]!.readings).toHaveLength(4);
  });

  it('is none of a feeder, a meter or a tariff', async () => {
    for (const name of ['Feeder', 'T', 'Meter']) {
      const content = file(`Time;${name}1 kW;${name}2 kW;${name}3 kW;kvar`, (i) => [at(i), 10, 20, 10 + i, 20 + i]);
      const { questions } = await questionOf(content);
      expect(questions[0]!.readings.map(({ map }) => map.columns?.active)).toEqual([2, 3, 4]);
    }
  });
});

describe('stamps', () => {
  const hours = Array.from({ length: 24 }, (_, i) => i);
  it.each([
    ['hours from 1', (i: number) => i + 1],
    ['hours from 0', (i: number) => i],
    ['clock times without a mark', (i: number) => i * 100],
  ])('may be a date and %s', async (_, count) => {
    const content = file('Date;Hour;kWh;kvarh', (i) => ['14/03/2024', count(i), 40 + i, 20], hours);
    const { record } = await readMeterText(content);
    expect([record.firstS, record.intervalS]).toEqual([Date.UTC(2024, 2, 14) / 1000, 3600]);
    expect(Array.from(record.activeKw)).toEqual(hours.map((i) => 40 + i));
  });

  it('may count half hours from 1 to 48, and so shows how long an interval is', async () => {
    const halves = Array.from({ length: 96 }, (_, i) => i);
    const row = (i: number) => [`${14 + Math.floor(i / 48)}/03/2024`, (i % 48) + 1, 40 + i, 20];
    const reading = await readMeterText(file('Settlement Date;Settlement Period;kWh;kvarh', row, halves));
    expect([reading.record.intervalS, reading.record.missing]).toEqual([1800, 0]);
    expect(noteCodes(reading)).toContain('intervals-counted');
  });

  // on 31 March the clocks of Madrid go from 2 to 3, on 27 October from 3 to 2
  const day = (date: string, count: number) => Array.from({ length: count }, (_, i) => `${date};${i + 1};${40 + i};20`);
  it('count the time passed where a day has a 25th hour', async () => {
    const content = lines(
      'Fecha;Hora;kWh;kvarh',
      ...day('26/10/2024', 24),
      ...day('27/10/2024', 25),
      ...day('28/10/2024', 24),
    );
    const { record } = await readMeterText(content, { timeZone: 'Europe/Madrid' });
    expect([record.activeKw.length, record.missing]).toEqual([73, 0]);
    // the third hour of that day, by the first pass of the clock, begins at 0 UTC
    expect(record.activeKw[26]).toBe(42);
    expect(record.firstS + 26 * 3600).toBe(Date.UTC(2024, 9, 27) / 1000);
  });

  it('count the time passed where by the clock an hour that was skipped would hold a value', async () => {
    const content = lines('Fecha;Hora;kWh;kvarh', ...day('30/03/2024', 24), ...day('31/03/2024', 23));
    const { record } = await readMeterText(content, { timeZone: 'Europe/Madrid' });
    expect([record.activeKw.length, record.missing]).toEqual([47, 0]);
  });

  it('are asked about where neither reading fails', async () => {
    const gap = day('27/10/2024', 24).filter((_, i) => i < 20);
    const content = lines('Fecha;Hora;kWh;kvarh', ...day('26/10/2024', 24), ...gap);
    const { questions } = await questionOf(content, { timeZone: 'Europe/Madrid' });
    expect(questions.map(({ id, readings }) => [id, readings.length])).toEqual([['dayColumns', 2]]);
  });

  it('are refused with row and column where the counts are no hours', async () => {
    const content = file('Date;Hour;kWh;kvarh', (i) => ['14/03/2024', i + 1, 40 + i, 20]);
    expect((await refusalOf(content)).problems).toEqual([
      expect.objectContaining({ code: 'bad-time', row: 2, column: 2, found: '1 to 4' }),
    ]);
  });

  it('are refused where several rows share a date and nothing says the hour', async () => {
    const content = file('Date;kWh;kvarh', (i) => ['14/03/2024', 40 + i, 20]);
    expect((await refusalOf(content)).problems[0]).toMatchObject({ code: 'bad-time', row: 2, column: 1 });
  });

  it.each([
    ['seconds', 1],
    ['milliseconds', 1000],
  ])('may count %s since 1970', async (_, times) => {
    const firstS = Date.UTC(2024, 2, 14) / 1000;
    const { record } = await readMeterText(
      file('timestamp;kW;kvar', (i) => [(firstS + 900 * i) * times, 40 + i, 20 + i]),
    );
    expect([record.firstS, record.intervalS, Array.from(record.activeKw)]).toEqual([firstS, 900, from(40)]);
  });

  it('may have the day of the week before the date', async () => {
    const { record } = await readMeterText(file('Zeit;kW;kvar', (i) => [`Do. ${at(i)}`, 40 + i, 20 + i]));
    expect(record.firstS).toBe(Date.UTC(2024, 2, 14) / 1000);
  });
});

describe('rows that hold no interval', () => {
  const data = (...tail: string[]) => file('Zeit;kW;kvar', (i) => [at(i), 40 + i, 20 + i]) + lines(...tail);

  it('are left out where they are lines of text, and it is said', async () => {
    const reading = await readMeterText(data('', 'End of report', '* estimated value'));
    expect(Array.from(reading.record.activeKw)).toEqual(from(40));
    expect(reading.record.notes).toContainEqual(
      expect.objectContaining({
        code: 'text-rows-left-out',
        values: { rows: 2, first: 7 },
      }),
    );
  });

  it('are left out where their numbers are the sums of the columns', async () => {
    expect(noteCodes(await readMeterText(data(';166;86')))).toContain('total-rows-left-out');
  });

  it.each(['14.03', ';165;86', 'January', '2024 kW'])('"%s" is refused: it may be data cut off', async (row) => {
    expect((await refusalOf(data(row))).problems[0]).toMatchObject({ row: 6 });
  });

  it('hold none where their quality says that the value is bad', async () => {
    const content = file('Zeit;kW;kvar;Status', (i) => [at(i), 40 + i, 20 + i, i === 1 ? 'Bad' : 'Good']);
    const reading = await readMeterText(content);
    expect([reading.record.missing, Array.from(reading.record.activeKw)]).toEqual([1, [40, 42, 43]]);
  });
});

describe('a greatest value', () => {
  it('stands for the mean only where there is no other, and it is said', async () => {
    const only = await readMeterText(file('Zeit;Peak kW;kvar', (i) => [at(i), 40 + i, 20 + i]));
    expect(noteCodes(only)).toContain('extremes-taken');
    const minutes = await readMeterText(file('Zeit;kW (15 min);kvar', (i) => [at(i), 40 + i, 20 + i]));
    expect(noteCodes(minutes)).not.toContain('extremes-taken');
  });
});
