// Samples of the project's own invention with a row for each channel and moment; every number stands in the file beside it,
// kWh of half an hour twice as large as kW.
import { describe, expect, it } from 'vitest';
import { expectRecord, sample } from '../../support/expect-sample.js';
import { lines, noteCodes, questionOf, readMeterText, refusalOf } from '../../support/meter-text.js';

const quarters = { begin: '2024-05-06T00:00', intervalS: 900 };

describe('a row for each channel and moment', () => {
  it('joins channels that stand in turns, in any order, and leaves out what no record needs', async () => {
    const reading = await expectRecord(
      'long-by-turns',
      {},
      { ...quarters, kw: [40, 41, 42], lagging: [20, 0, 22], leading: [0, 3, 0], notes: ['channels-left-out'] },
    );
    const left = reading.record.notes.find(({ code }) => code === 'channels-left-out');
    expect(left?.values).toEqual({ channels: 'Room' });
  });

  it('joins channels that follow each other, each with both passes of the doubled hour', async () => {
    await expectRecord(
      'long-by-channel',
      { timeZone: 'Europe/Berlin' },
      {
        begin: '2024-10-26T23:30',
        intervalS: 1800,
        kw: [21, 23, 25, 27, 29, 31],
        lagging: [2, 4, 6, 8, 10, 12],
        notes: ['doubled-hour-by-order'],
      },
    );
  });

  it('leaves a moment out that one channel lacks, and shifts nothing into it', async () => {
    const expected = { ...quarters, kw: [40, 43], lagging: [20, 23], missing: 2, notes: ['intervals-without-value'] };
    await expectRecord('long-gaps', {}, expected);
  });

  it('is refused without a channel of kvar', async () => {
    const { problems } = await refusalOf(sample('long-without-reactive'));
    expect(problems).toMatchObject([{ code: 'no-reactive-column' }]);
  });

  it('asks which of several meters is meant', async () => {
    const [asked] = (await questionOf(sample('long-two-meters'))).questions;
    expect(asked!.readings.map(({ map, maxKw }) => ({ map, maxKw }))).toEqual([
      { map: { meter: 'Press' }, maxKw: 41 },
      { map: { meter: 'Oven' }, maxKw: 11 },
    ]);
    const oven = await readMeterText(sample('long-two-meters'), { map: { meter: 'Oven' } });
    expect(Array.from(oven.record.laggingKvar)).toEqual([5, 6]);
  });

  it('asks where one channel has two values for a moment', async () => {
    const twice = lines(
      'Time,Quantity,Value',
      '2024-05-06 00:00,kW,40',
      '2024-05-06 00:00,kvar,20',
      '2024-05-06 00:15,kW,41',
      '2024-05-06 00:15,kvar,21',
      '2024-05-06 00:15,kW,51',
      '2024-05-06 00:15,kvar,21',
      '2024-05-06 00:30,kW,42',
      '2024-05-06 00:30,kvar,22',
    );
    expect((await questionOf(twice)).questions.map(({ id }) => id)).toEqual(['keepRow']);
  });

  it('asks which columns are meant, where one of two has rows that disagree', async () => {
    const text = (first: string, repeated: string) =>
      lines(
        'Time,Channel,Value,Unit',
        `2024-05-06 00:00,${first},40,kW`,
        '2024-05-06 00:00,Reactive power,20,kvar',
        ...[1, 2, 3].flatMap((i) => [
          `2024-05-06 0${i}:00,Active power,${40 + i},kW`,
          `2024-05-06 0${i}:00,Reactive power,20,kvar`,
        ]),
        repeated,
      );
    const twice = '2024-05-06 02:00,Active power,99,kW';
    const ids = async (file: string) => (await questionOf(file)).questions.map(({ id }) => id);
    // the one interval of the tower would otherwise be the record, since nothing in it disagrees
    expect(await ids(text('Active tower', twice))).toContain('columns');
    expect(await ids(text('Active power', twice))).toEqual(['keepRow']);
    expect(await ids(text('Active tower', ''))).toEqual(['columns']);
    expect((await readMeterText(text('Active power', ''))).record.beginS).toHaveLength(4);
  });

  it('names a channel that measures something and is left for another', async () => {
    const text = lines(
      'Time,Channel,Value,Unit',
      ...[0, 1, 2, 3].flatMap((i) => [
        `2024-05-06 0${i}:00,Active power,${40 + i},kW`,
        `2024-05-06 0${i}:00,Reactive power,20,${i === 2 ? 'kvar;' : 'kvar'}`,
      ]),
    );
    const { record } = await readMeterText(text);
    expect(Array.from(record.activeKw)).toEqual([40, 41, 43]);
    expect(record.notes.find(({ code }) => code === 'channels-left-out')?.values).toEqual({
      channels: 'Reactive power',
    });
    const sound = await readMeterText(text.replace('kvar;', 'kvar'));
    expect(noteCodes(sound)).not.toContain('channels-left-out');
  });

  it('is refused at a name that is no channel’s, which would fill the notes', async () => {
    const text = (name: string) =>
      lines(
        'Time,Channel,Value',
        ...[0, 1, 2].flatMap((i) => [`2024-05-06 0${i}:00,kW,40`, `2024-05-06 0${i}:00,kvar,2`]),
        `2024-05-06 02:00,${name},1`,
      );
    expect((await refusalOf(text('x'.repeat(301)))).problems).toMatchObject([
      { code: 'too-large', row: 8, column: 2, expected: 'a channel of at most 300 characters, its unit among them' },
    ]);
    expect((await readMeterText(text('x'.repeat(300)))).record.beginS).toHaveLength(3);
  });

  it('is refused at a number that is none, with row and column', async () => {
    const text = 'Time,Quantity,Value\n2024-05-06 00:00,kW,40\n2024-05-06 00:00,kvar,2024-05-07\n';
    expect((await refusalOf(text)).problems).toMatchObject([{ code: 'bad-number', row: 3, column: 3 }]);
  });

  it('stays a file of one row a moment where its columns name quantities', async () => {
    const text = lines(
      'Time,Type,kW,kvar',
      '2024-05-06 00:00,kWh import,40,20',
      '2024-05-06 00:15,kWh import,41,21',
      '2024-05-06 00:30,kWh import,42,22',
    );
    const reading = await readMeterText(text);
    expect(Array.from(reading.record.activeKw)).toEqual([40, 41, 42]);
    expect(noteCodes(reading)).not.toContain('channels-left-out');
  });

  it('reads channels that follow each other and lack some hundred rows of each other', async () => {
    const stamp = (i: number) =>
      new Date(Date.UTC(2024, 4, 6) + i * 900_000).toISOString().slice(0, 16).replace('T', ' ');
    const all = Array.from({ length: 1000 }, (_, i) => i);
    const kw = all.filter((i) => i < 300 || i >= 500).map((i) => `${stamp(i)},kW,${i}`);
    const kvar = all.filter((i) => i < 700 || i >= 800).map((i) => `${stamp(i)},kvar,${2 * i}`);
    const { record } = await readMeterText(lines('Time,Quantity,Value', ...kw, ...kvar));
    const both = all.filter((i) => (i < 300 || i >= 500) && (i < 700 || i >= 800));
    expect(Array.from(record.activeKw)).toEqual(both);
    expect(Array.from(record.laggingKvar)).toEqual(both.map((i) => 2 * i));
    expect(record.missing).toBe(300);
  });
});
