// Of a file of several meters so many rows are kept while it is open which of them is meant. Beyond that the question says
// so, and whatever is answered is read whole: a record is never made of the rows that were kept.
import { describe, expect, it } from 'vitest';
import { Question } from '#libs/contract/question.js';
import { lines, streamOf } from '../../../test/support/meter-text.js';
import { SOAKED } from '../../../test/support/soak.js';
import { MeterBytes } from '../meter-bytes.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { MOST_SHOWN } from './meter-rows.js';
import { readCsv, type Ways } from './read-csv.js';

const ROWS = 2500;
const stamp = (i: number) => new Date(Date.UTC(2024, 4, 6) + i * 900_000).toISOString().slice(0, 16).replace('T', ' ');
const all = Array.from({ length: ROWS }, (_, i) => i);
/** Rows of a meter, greater at the end than anywhere before, so that what is cut shows in the peak. */
const rowsOf = (meter: string, level: number) => all.map((i) => `${meter},${stamp(i)},${level + i / 8},${1 + i / 16}`);
const TURNS = all.flatMap((i) => [rowsOf('Press', 100)[i]!, rowsOf('Oven', 5000)[i]!]);

const LAYOUTS: Record<string, string> = {
  'a row a moment, meters one after the other': lines(
    'meter id,begin,kW,kvar',
    ...rowsOf('Press', 100),
    ...rowsOf('Oven', 5000),
  ),
  'a row a moment, meters in turns': lines('meter id,begin,kW,kvar', ...TURNS),
  'a row a channel and moment': lines(
    'meter id,begin,channel,value',
    ...TURNS.flatMap((row) => {
      const [meter, at, kw, kvar] = row.split(',');
      return [`${meter},${at},kW,${kw}`, `${meter},${at},kvar,${kvar}`];
    }),
  ),
};

async function outcomeOf(text: string, options: ReadOptions, ways: Partial<Ways>): Promise<MeterReading | Question> {
  try {
    return await readCsv(await MeterBytes.open(streamOf(text)), options, ways);
  } catch (problem) {
    if (problem instanceof Question) return problem;
    throw problem;
  }
}

async function asked(text: string, mostShown: number) {
  const outcome = await outcomeOf(text, {}, { mostShown });
  if (!(outcome instanceof Question)) throw new Error(`a record of ${outcome.record.beginS.length} intervals`);
  const [question] = outcome.questions;
  return { about: question!.about, peaks: question!.readings.map(({ map, maxKw }) => [map.meter, maxKw]) };
}

const [press, oven] = [100 + (ROWS - 1) / 8, 5000 + (ROWS - 1) / 8];

describe.each(Object.entries(LAYOUTS))('a file of several meters, %s', (_, text) => {
  it('beyond what is kept is asked about, with the row up to which it was looked at', async () => {
    const { about, peaks } = await asked(text, 2000);
    const upTo =
      /^which of the 2 meters in the file is read; what it would give is worked out from the rows up to (\d+)$/;
    expect(about).toMatch(upTo);
    expect(Number(upTo.exec(about)![1])).toBeLessThan(text.split('\n').length - 1);
    expect(peaks.map(([meter]) => meter)).toEqual(['Press', 'Oven']);
    // it is the end of the file that was not kept, with the greatest values of the meter that ends there
    expect(peaks[1]![1]).toBeLessThan(oven);
  });

  it('within it is asked about by all its rows', async () => {
    const { about, peaks } = await asked(text, MOST_SHOWN);
    expect(about).toBe('which of the 2 meters in the file is read');
    expect(peaks).toEqual([
      ['Press', press],
      ['Oven', oven],
    ]);
  });

  it.each(['Press', 'Oven'])('gives every row of the meter that is chosen, kept or not: %s', async (meter) => {
    for (const mostShown of [10, 2000, MOST_SHOWN]) {
      const outcome = await outcomeOf(text, { map: { meter } }, { mostShown });
      if (outcome instanceof Question) throw outcome;
      expect(outcome.record.beginS).toHaveLength(ROWS);
      expect(Math.max(...outcome.record.activeKw)).toBe(meter === 'Press' ? press : oven);
    }
  });
});

it('a file of one meter is read whole, however many rows it has and whether it names the meter', async () => {
  const named = lines('meter id,begin,kW,kvar', ...rowsOf('Press', 100));
  const nameless = named.replaceAll(/^[^,]*,/gm, '');
  for (const text of [named, nameless]) {
    const outcome = await outcomeOf(text, {}, { mostShown: 10 });
    if (outcome instanceof Question) throw outcome;
    expect(outcome.record.beginS).toHaveLength(ROWS);
  }
});

/** Minutes of two meters in turns, so many of each. */
async function* longFile(minutes: number): AsyncGenerator<Uint8Array> {
  yield Buffer.from('meter,time UTC,kW,kvar\n');
  for (let from = 0; from < minutes; from += 1440) {
    const day = new Date(Date.UTC(2020, 0, 1 + from / 1440)).toISOString().slice(0, 10);
    const rows: string[] = [];
    for (let i = 0; i < Math.min(1440, minutes - from); i++) {
      const clock = `${String(Math.floor(i / 60)).padStart(2, '0')}:${String(i % 60).padStart(2, '0')}`;
      rows.push(`A,${day} ${clock},${from + i},1\nB,${day} ${clock},7,1\n`);
    }
    yield Buffer.from(rows.join(''));
  }
}

// some ten seconds each
it.runIf(SOAKED).each([
  { minutes: MOST_SHOWN / 2 + 1440, upTo: MOST_SHOWN + 1 },
  { minutes: MOST_SHOWN / 2, upTo: null },
])('of $minutes minutes of two meters those up to row $upTo are kept, where nothing else is said', async (file) => {
  const question = await readCsv(await MeterBytes.open(longFile(file.minutes)), {}).catch((error: unknown) => error);
  if (!(question instanceof Question)) throw new Error('no question');
  const [{ about, readings }] = question.questions as [(typeof question.questions)[0]];
  expect(/up to (\d+)$/.exec(about)?.[1] ?? null).toBe(file.upTo === null ? null : String(file.upTo));
  expect(readings.map(({ maxKw }) => maxKw)).toEqual([Math.min(file.minutes, MOST_SHOWN / 2) - 1, 7]);
});
