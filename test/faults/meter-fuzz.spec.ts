// Damaged meter files: whatever is accepted has the values that an independent slow reading of the same damaged bytes
// finds, and whatever is not is refused as the caller's input, never with a fault of ours.
import { readFileSync } from 'node:fs';
import { expect, it } from 'vitest';
import { Question } from '#libs/contract/question.js';
import { InputProblem } from '#libs/engine/index.js';
import type { MeterReading } from '#libs/meter-files/meter-format.js';
import { readMeterText } from '../support/meter-text.js';
import { withFillers } from '../support/mutate-fillers.js';
import { Chance, mutate } from '../support/mutate-file.js';
import { DELIMITED_TEXTS as SAMPLES } from '../support/sample-delimited-texts.js';
import { type Dialect, readSlowly, SlowRefusal } from '../support/slow-meter-reading.js';
import { runs, SEED, tellTotals } from '../support/soak.js';
import { timed } from '../support/timed.js';

const FILES = runs(1_500, 20_000);
const LONGEST_MS = 2_000;

async function attempt(bytes: Uint8Array): Promise<MeterReading | InputProblem> {
  try {
    return await readMeterText(bytes);
  } catch (problem) {
    if (problem instanceof InputProblem) return problem;
    throw problem;
  }
}

/** Sets accepted values against the slow reading. */
function expectSame({ record }: MeterReading, bytes: Uint8Array, dialect: Dialect): void {
  // damage can take away what shows that stamps mark ends; the record then says that it takes beginnings
  const assumed = record.notes.some(({ code }) => code === 'stamps-assumed-beginnings');
  const slow = readSlowly(bytes, assumed ? { ...dialect, stamp: 'begin' } : dialect);
  expect(record.intervalS).toBe(slow.intervalS);
  const mine = Array.from(record.beginS, (beginS, i) => [
    beginS,
    record.activeKw[i],
    record.laggingKvar[i],
    record.leadingKvar[i],
  ]);
  expect(mine).toEqual([...slow.rows].map(([beginS, row]) => [beginS, ...row]).sort((a, b) => a[0]! - b[0]!));
  // nothing is passed over in silence: numbers that stand for none, what other channels hold, remarks between the rows
  const said = (code: string) => record.notes.find((note) => note.code === code)?.values;
  expect(said('fillers-left-out')?.values ?? 0).toBe(slow.fillers);
  expect(said('text-rows-left-out')?.rows ?? 0).toBe(slow.remarks);
  const unread = String(said('channels-left-out')?.channels ?? '');
  expect([...slow.leftOut].filter((channel) => !unread.includes(channel))).toEqual([]);
}

type Sample = (typeof SAMPLES)[0];

/** A damaged copy of a sample, the same for the same seed. */
function damagedFile({ name, text, dialect }: Sample, seed: number) {
  const chance = new Chance(seed);
  const { bytes, names } = mutate(new TextEncoder().encode(text), chance);
  const filled = chance.below(4) === 0;
  return {
    name: `seed ${seed} (${name}; ${[...names, ...(filled ? ['fillers'] : [])].join(', ')})`,
    bytes: filled ? withFillers(bytes, chance, dialect.decimal) : bytes,
    dialect,
  };
}

const hasGaps = ({ record }: MeterReading) => record.notes.some(({ code }) => code === 'fillers-left-out');

type Damaged = ReturnType<typeof damagedFile>;
type Fate = 'accepted' | 'withGaps' | 'asked' | 'refused';

/** What a file comes to. @throws Error where an accepted one has other values than the slow reading finds */
function fateOf(read: MeterReading | InputProblem, { bytes, dialect }: Pick<Damaged, 'bytes' | 'dialect'>): Fate {
  if (!(read instanceof InputProblem)) {
    expectSame(read, bytes, dialect);
    return hasGaps(read) ? 'withGaps' : 'accepted';
  }
  expect(read.problems.length).toBeGreaterThan(0);
  return read instanceof Question ? 'asked' : 'refused';
}

it(`reads or refuses ${FILES} damaged files and changes no accepted value (seed ${SEED})`, async () => {
  const fates = { accepted: 0, withGaps: 0, asked: 0, refused: 0 };
  const failures: string[] = [];
  for (let n = 0; n < FILES; n++) {
    const damaged = damagedFile(SAMPLES[n % SAMPLES.length]!, SEED + n * 7919);
    try {
      const { outcome, ms } = await timed(() => attempt(damaged.bytes));
      if (ms > LONGEST_MS) failures.push(`${damaged.name} took ${ms} ms`);
      fates[fateOf(outcome, damaged)]++;
    } catch (error) {
      const why = error instanceof SlowRefusal ? `accepted, though: ${error.message}` : String(error).slice(0, 400);
      failures.push(`${damaged.name}: ${why}`);
    }
  }
  tellTotals('delimited text', { files: FILES, ...fates, failures: failures.length });
  expect(failures.slice(0, 20)).toEqual([]);
  // every way out is taken, else the damage would be too light or too heavy to show anything
  expect(fates.accepted).toBeGreaterThan(FILES / 10);
  expect(fates.refused).toBeGreaterThan(FILES / 10);
  expect(fates.asked).toBeGreaterThan(FILES / 100);
  expect(fates.withGaps).toBeGreaterThan(FILES / 50);
});

/** Files that once had a fate they should not have. */
const KEPT: { sample: string; seed: number; why: string }[] = JSON.parse(
  readFileSync(new URL('../golden/meter-files/corpus/delimited-seeds.json', import.meta.url), 'utf8'),
);

it.each(KEPT)('reads or refuses a file that once was trouble: $why ($sample, seed $seed)', async ({ sample, seed }) => {
  const damaged = damagedFile(SAMPLES.find(({ name }) => name === sample)!, seed);
  expect(['accepted', 'withGaps', 'asked', 'refused']).toContain(fateOf(await attempt(damaged.bytes), damaged));
});

it.each(SAMPLES)('has a comparison that no changed value passes: $name', async ({ text, dialect }) => {
  const bytes = new TextEncoder().encode(text);
  const reading = await readMeterText(bytes);
  expect(() => expectSame(reading, bytes, dialect)).not.toThrow();
  const { record } = reading;
  const changed = [
    { activeKw: record.activeKw.with(7, record.activeKw[7]! * (1 + Number.EPSILON)) },
    { laggingKvar: record.leadingKvar, leadingKvar: record.laggingKvar },
    { beginS: record.beginS.map((beginS) => beginS + 3600) },
    { beginS: record.beginS.subarray(1), activeKw: record.activeKw.subarray(1) },
    { intervalS: 1800 },
    { notes: hasGaps(reading) ? [] : [{ ...record.notes[0]!, code: 'fillers-left-out', values: { values: 1 } }] },
    ...(dialect.long?.unit ? [{ notes: [] }] : []),
  ];
  for (const change of changed) {
    expect(() => expectSame({ ...reading, record: { ...record, ...change } }, bytes, dialect)).toThrow();
  }
});

it('has a slow reading that leaves out, keeps and refuses numbers such as 9999 by the rule alone', () => {
  const slow = (...kw: number[]) => {
    const text = `interval begin,kW,kvar\n${kw.map((one, i) => `2024-05-06 0${i}:00,${one},1\n`).join('')}`;
    const { rows, fillers } = readSlowly(new TextEncoder().encode(text), SAMPLES[0]!.dialect);
    return { kw: [...rows.values()].map(([one]) => one), fillers };
  };
  expect(slow(40, -9999, 41, 42)).toEqual({ kw: [40, 41, 42], fillers: 1 });
  expect(slow(980, 999, 1010, 1020)).toEqual({ kw: [980, 999, 1010, 1020], fillers: 0 });
  expect(slow(998, 999, 999, 999, 1000)).toEqual({ kw: [998, 999, 999, 999, 1000], fillers: 0 });
  expect(slow(40, -9998, 41, 42)).toEqual({ kw: [40, -9998, 41, 42], fillers: 0 });
  // something else is below zero; not three times the others; above zero; coming back from where it went
  for (const kw of [
    [40, -9999, -41, 42],
    [400, -999, 410, 420],
    [40, 9999, 41, 42],
    [950, 999, 999, 999, 960],
  ]) {
    expect(() => slow(...kw)).toThrow(SlowRefusal);
  }
});
