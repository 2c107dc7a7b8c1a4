// Damaged meter files: whatever is accepted has the values that an independent slow reading of the same damaged bytes
// finds, and whatever is not is refused as the caller's input, never with a fault of ours.
import { expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import type { MeterReading } from '#libs/meter-files/meter-format.js';
import { readMeterText } from '../support/meter-text.js';
import { Chance, mutate } from '../support/mutate-file.js';
import { DELIMITED_TEXTS as SAMPLES } from '../support/sample-delimited-texts.js';
import { type Dialect, readSlowly, SlowRefusal } from '../support/slow-meter-reading.js';
import { runs, SEED } from '../support/soak.js';

const FILES = runs(1_500, 20_000);

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
  const theirs = [...slow.rows].map(([beginS, row]) => [beginS, ...row]).sort((a, b) => a[0]! - b[0]!);
  expect(mine).toEqual(withoutFillers(theirs, record, slow.intervalS));
}

/** The slow reading knows no numbers that stand for missing ones: of those that are said to be left out, as many rows go. */
function withoutFillers(rows: number[][], { notes }: MeterReading['record'], intervalS: number): number[][] {
  const left = notes.find(({ code }) => code === 'fillers-left-out')?.values as
    | { values: number; value: number }
    | undefined;
  if (left === undefined) return rows;
  const sizes = [Math.abs(left.value), Math.abs(left.value) * (3600 / intervalS)];
  const kept = rows.filter(([, ...powers]) => !powers.some((power) => sizes.includes(Math.abs(power))));
  expect(rows.length - kept.length).toBe(left.values);
  return kept;
}

it(`reads or refuses ${FILES} damaged files and changes no accepted value (seed ${SEED})`, async () => {
  const outcomes = { accepted: 0, refused: 0 };
  const failures: string[] = [];
  for (let n = 0; n < FILES; n++) {
    const chance = new Chance(SEED + n * 7919);
    const { name, text, dialect } = SAMPLES[n % SAMPLES.length]!;
    const damaged = mutate(new TextEncoder().encode(text), chance);
    const startMs = performance.now();
    try {
      const read = await attempt(damaged.bytes);
      if (read instanceof InputProblem) {
        outcomes.refused++;
        expect(read.problems.length).toBeGreaterThan(0);
      } else {
        outcomes.accepted++;
        expectSame(read, damaged.bytes, dialect);
      }
    } catch (error) {
      const why = error instanceof SlowRefusal ? `accepted, though: ${error.message}` : String(error).slice(0, 400);
      failures.push(`file ${n} (${name}; ${damaged.names.join(', ')}): ${why}`);
    }
    if (performance.now() - startMs > 2_000) failures.push(`file ${n} took more than two seconds`);
  }
  expect(failures.slice(0, 20)).toEqual([]);
  // both ways out are taken, else the damage would be too light or too heavy to show anything
  expect(outcomes.accepted).toBeGreaterThan(FILES / 10);
  expect(outcomes.refused).toBeGreaterThan(FILES / 10);
});

it('has a comparison that no changed value passes', async () => {
  const { text, dialect } = SAMPLES[0]!;
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
  ];
  for (const change of changed) {
    expect(() => expectSame({ ...reading, record: { ...record, ...change } }, bytes, dialect)).toThrow();
  }
});
