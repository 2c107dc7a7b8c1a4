// Samples of the project's own invention in two formats of messages and read-outs; every number is worked out by hand from
// the file beside it. Which quadrants make lagging and leading: IEC 62053-23, annex on the geometric representation, and
// IEC 62056-61, value group C (3 is QI + QII, 4 is QIII + QIV).
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import type { ReadOptions } from '#libs/meter-files/meter-format.js';
import { noteCodes, questionOf, readMeterText, refusalOf } from '../../support/meter-text.js';

const sample = (name: string) => readFileSync(fileURLToPath(new URL(name, import.meta.url)));

async function read(name: string, options: ReadOptions = {}) {
  const reading = await readMeterText(sample(name), options);
  const { record, quality } = reading;
  return {
    format: quality.format,
    begins: Array.from(record.beginS, (beginS) => new Date(beginS * 1000).toISOString().slice(0, 16)),
    intervalS: record.intervalS,
    kw: Array.from(record.activeKw),
    lagging: Array.from(record.laggingKvar),
    leading: Array.from(record.leadingKvar),
    notes: noteCodes(reading),
  };
}

describe('MSCONS', () => {
  const plain = {
    format: 'mscons',
    begins: ['2024-05-05T22:00', '2024-05-05T22:15', '2024-05-05T22:30'],
    intervalS: 900,
    // kWh in a quarter of an hour are four times as many kW
    kw: [42, 44, 41],
    lagging: [21, 24, 0],
    leading: [0, 0, 6],
  };

  it('gives energies by identification code, at the times it states', async () => {
    expect(await read('mscons-plain.edi')).toMatchObject(plain);
  });

  it('may name its own marks, stand in one line, and write times two hours ahead', async () => {
    expect(await read('mscons-own-marks-single-line.edi')).toMatchObject(plain);
  });

  it('may split reactive power into quadrants: I and II lag, III and IV lead', async () => {
    const found = await read('mscons-quadrants.edi');
    expect(found).toMatchObject({ kw: [42, 44], lagging: [21, 22], leading: [0, 3] });
    expect(found.notes).toEqual(
      expect.arrayContaining(['values-substituted', 'values-unusable', 'channels-left-out', 'channels-added']),
    );
  });

  it('may hold readings of registers, whose differences are the energies', async () => {
    const found = await read('mscons-registers.edi');
    // 9.25 kWh; from 99 999.75 to 8.25 the register ran over, a gap; 10.25 and 10.5 kWh
    expect(found.kw).toEqual([37, 41, 42]);
    expect(found.lagging).toEqual([20.8, 20.4, 17.6]);
    expect(found.begins[1]).toBe('2024-05-05T22:30');
    expect(found.notes).toContain('register-fell');
  });

  it('with two metering points raises a question, and the map answers it', async () => {
    const { questions } = await questionOf(sample('mscons-two-points.edi'));
    expect(questions.map(({ id }) => id)).toEqual(['meter']);
    expect(questions[0]!.readings.map(({ map, maxKw, activeKwh }) => [map.meter, maxKw, activeKwh])).toEqual([
      ['SITE0001', 44, 21],
      ['SITE0002', 84, 41],
    ]);
    const second = await read('mscons-two-points.edi', { map: questions[0]!.readings[1]!.map });
    expect(second.lagging).toEqual([28, 32]);
  });

  it('without offsets is in the zone that is said, the doubled hour by order', async () => {
    const found = await read('mscons-local-autumn.edi', { timeZone: 'Europe/Berlin' });
    expect(found.begins).toEqual(
      ['23:30', '00:00', '00:30', '01:00', '01:30', '02:00'].map((clock, i) => `2024-10-2${i === 0 ? 6 : 7}T${clock}`),
    );
    expect(
      (await read('mscons-local-autumn.edi', { timeZone: '+01:00', map: { keepRow: 'first' } })).begins,
    ).toHaveLength(4);
  });

  it('that lost a segment is refused by its own count', async () => {
    const { problems } = await refusalOf(sample('mscons-segment-lost.edi'));
    // 26 segments are stated at the end of the message, 25 are there
    expect(problems[0]).toMatchObject({ code: 'unreadable', found: '25' });
  });

  it('that ends within a segment or a message is refused', async () => {
    const text = sample('mscons-plain.edi').toString();
    expect((await refusalOf(text.slice(0, -8))).problems[0]).toMatchObject({ found: 'the end of the file' });
    const message = text.slice(0, text.indexOf('UNT+'));
    expect((await refusalOf(message)).problems[0]).toMatchObject({ expected: 'the end of the message (UNT)' });
  });
});

describe('a load profile of a read-out', () => {
  it('gives the end of its first interval, and the rows follow', async () => {
    expect(await read('profile-readout-plain.txt', { siteTimeZone: '+01:00' })).toMatchObject({
      format: 'profile-readout',
      begins: ['2024-05-05T23:00', '2024-05-05T23:15', '2024-05-05T23:30'],
      intervalS: 900,
      kw: [40.5, 41.5, 0.75],
      lagging: [20.25, 21, 0],
      leading: [0, 0, 0],
    });
  });

  it('may split reactive power into quadrants, which lag in I and II and lead in III and IV', async () => {
    expect(await read('profile-readout-quadrants.txt', { siteTimeZone: 'UTC' })).toMatchObject({
      begins: ['2024-05-06T00:00', '2024-05-06T00:15', '2024-05-06T00:30', '2024-05-06T00:45'],
      kw: [40, 41, 0, 0],
      lagging: [20, 0, 2.25, 0],
      leading: [0, 3.5, 0, 1.75],
    });
  });

  it('repeats its head behind a gap; intervals cut short and blanks are left out', async () => {
    const found = await read('profile-readout-gap-and-status.txt');
    expect(found).toMatchObject({
      begins: ['2024-05-06T00:00', '2024-05-06T00:15', '2024-05-06T01:00', '2024-05-06T01:30'],
      kw: [40, 44, 48, 52],
      lagging: [20, 22, 0, 0],
      leading: [0, 0, 10, 12],
    });
    expect(found.notes).toEqual(
      expect.arrayContaining(['status-words', 'partial-intervals-left-out', 'intervals-without-value']),
    );
  });

  it('says by its season which pass of the doubled hour is meant', async () => {
    const found = await read('profile-readout-seasons.txt', { timeZone: 'Europe/Berlin' });
    // summer time ends at 01:00 UTC: 02:30 and 03:00 in summer time, then 02:30 and 03:00 again in standard time
    expect(found.begins).toEqual(['2024-10-27T00:00', '2024-10-27T00:30', '2024-10-27T01:00', '2024-10-27T01:30']);
    expect(found.kw).toEqual([10, 11, 12, 13]);
  });

  it('whose season contradicts the zone is refused: no clock in Berlin shows summer time in January', async () => {
    const january = (season: 0 | 1) => `P.01(${season}240115001500)(00)(15)(2)(1.5)(kW)(3.5)(kvar)\n(1)(1)\n(2)(1)\n`;
    const options = { timeZone: 'Europe/Berlin' };
    expect((await refusalOf(january(1), options)).problems[0]).toMatchObject({ code: 'bad-time', row: 1 });
    expect((await readMeterText(january(0), options)).record.firstS).toBe(Date.UTC(2024, 0, 14, 23) / 1000);
  });

  it('with a transformer ratio raises a question, because the values may or may not hold it', async () => {
    const { questions } = await questionOf(sample('profile-readout-ratio.txt'));
    expect(questions[0]!.readings.map(({ map, maxKw }) => [map.multiplier, maxKw])).toEqual([
      [1, 0.525],
      [80, 42],
    ]);
    const found = await read('profile-readout-ratio.txt', { map: { multiplier: 80 } });
    expect(found).toMatchObject({ kw: [40, 42], lagging: [20, 16] });
  });

  it.each([
    ['a time that is none', '0240506001500', '0241306001500', 'bad-time'],
    ['a value that is none', '(41.5)', '(4l.5)', 'bad-number'],
    ['a value too few', '(41.5)(21)', '(41.5)', 'wrong-length'],
    ['a unit that is none', '(kW)', '(kJ)', 'wrong-unit'],
    ['a length that is none', '(15)', '(0)', 'out-of-range'],
  ])('with %s is refused, naming the row', async (_what, from, to, code) => {
    const text = sample('profile-readout-plain.txt').toString().replace(from, to);
    expect((await refusalOf(text)).problems[0]).toMatchObject({ code, row: expect.any(Number) });
  });
});
