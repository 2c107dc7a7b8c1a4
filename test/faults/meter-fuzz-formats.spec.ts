// Damaged files of every format: each is read or refused as the caller's input within two seconds and with bounded memory.
// What is accepted is finite, comes back to the bit from the CSV it is exported to, and has the values that an independent
// slow reading of the same bytes finds. Files that once failed are kept and read in every run.
import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { setFlagsFromString } from 'node:v8';
import { runInNewContext } from 'node:vm';
import { describe, expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { FORMATS } from '#libs/meter-files/formats.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';
import { answered, attempt, exportDifference, recordDifference, slowDifference } from '../support/accepted-file.js';
import { type DamagedFile, type FormatSample, formatSamples } from '../support/format-samples.js';
import { readMeterText } from '../support/meter-text.js';
import { Chance } from '../support/mutate-file.js';
import { runs, SEED } from '../support/soak.js';
import { SlowRefusal } from '../support/slow-meter-reading.js';
import { SlowUnsure } from '../support/slow-xml-reading.js';

const FILES = runs(1_000, 20_000);
const LONGEST_MS = 2_000;
const MOST_GROWTH = 150 << 20;

const SAMPLES = formatSamples();
const JUDGED = SAMPLES.filter(({ slowly }) => slowly !== null);

setFlagsFromString('--expose-gc');
const collect = runInNewContext('gc') as () => void;

function heldBytes(): number {
  collect();
  const { heapUsed, external } = process.memoryUsage();
  return heapUsed + external;
}

/** Every second file is of a sample with an independent reading. */
function sampleOf(n: number): FormatSample {
  const of = n % 2 === 0 ? JUDGED : SAMPLES;
  return of[Math.floor(n / 2) % of.length]!;
}

type Fate = 'refused' | 'accepted' | 'judged' | 'answered';

/** Reads a damaged file and holds it against what it may come to. @throws Error saying what is wrong */
async function fateOf({ bytes, slowly }: DamagedFile, { options }: FormatSample): Promise<Fate> {
  const startMs = performance.now();
  let outcome = await attempt(bytes, options);
  let ms = performance.now() - startMs;
  for (let again = 0; ms > LONGEST_MS && again < 2; again++) {
    // another process may have had the processor
    const retryMs = performance.now();
    await attempt(bytes, options);
    ms = Math.min(ms, performance.now() - retryMs);
  }
  if (ms > LONGEST_MS) throw new Error(`took ${ms} ms`);
  const asked = outcome instanceof InputProblem;
  if (outcome instanceof InputProblem) outcome = await answered(bytes, options, outcome);
  if (outcome instanceof InputProblem) return 'refused';
  const wrong = await exportDifference(outcome.record);
  if (wrong !== null) throw new Error(wrong);
  if (asked) return 'answered';
  if (slowly === null) return 'accepted';
  return (await isJudged(outcome.record, slowly)) ? 'judged' : 'accepted';
}

type Record = Parameters<typeof slowDifference>[0];

async function isJudged(record: Record, slowly: NonNullable<DamagedFile['slowly']>): Promise<boolean> {
  try {
    const difference = slowDifference(record, await slowly(record.notes.map(({ code }) => code)));
    if (difference !== null) throw new Error(difference);
    return true;
  } catch (error) {
    if (error instanceof SlowUnsure) return false;
    if (error instanceof SlowRefusal) throw new Error(`accepted, though: ${error.message}`);
    throw error;
  }
}

const seedOf = (n: number) => SEED + n * 7919;

describe('damaged files', () => {
  it(`${FILES} of all formats are read as they are or refused, in time and in bounded memory (seed ${SEED})`, async () => {
    const fates = { refused: 0, accepted: 0, judged: 0, answered: 0 };
    const failures: string[] = [];
    const beforeBytes = heldBytes();
    let growth = 0;
    for (let n = 0; n < FILES; n++) {
      const sample = sampleOf(n);
      const damaged = sample.damage(new Chance(seedOf(n)));
      try {
        fates[await fateOf(damaged, sample)]++;
      } catch (error) {
        failures.push(`seed ${seedOf(n)}, ${sample.name} (${damaged.names.join(', ')}): ${String(error).slice(0, 400)}`);
      }
      if (n % 250 === 249) growth = Math.max(growth, heldBytes() - beforeBytes);
    }
    if (process.env.FUZZ_LOG) console.log(fates, growth / 2 ** 20, failures.length);
    expect(failures.slice(0, Number(process.env.FUZZ_LOG ?? 20))).toEqual([]);
    expect(Math.max(growth, heldBytes() - beforeBytes)).toBeLessThan(MOST_GROWTH);
    // every way out is taken, else the damage would be too light or too heavy to show anything
    expect(fates.refused).toBeGreaterThan(FILES / 10);
    expect(fates.judged).toBeGreaterThan(FILES / 10);
    expect(fates.accepted).toBeGreaterThan(FILES / 20);
    expect(fates.answered).toBeGreaterThan(FILES / 200);
  });

  it('have sound samples of every format, which the independent readings agree with', async () => {
    const formats = new Set<string>();
    for (const { name, bytes, options, slowly } of JUDGED) {
      const { record, quality } = await readMeterText(bytes, options);
      expect(await isJudged(record, slowly!), name).toBe(true);
      formats.add(quality.format);
    }
    expect([...formats].sort()).toEqual(FORMATS.map(({ name }) => name).sort());
  });
});
