// Damaged files of every format: each is read or refused as the caller's input within two seconds and with bounded memory.
// What is accepted is finite, comes back to the bit from the CSV it is exported to, and has the values that an independent
// slow reading of the same bytes finds. Files that once failed are kept and read in every run.
import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { setFlagsFromString } from 'node:v8';
import { runInNewContext } from 'node:vm';
import { describe, expect, it } from 'vitest';
import { InputProblem, type LoadRecord } from '#libs/engine/index.js';
import { FORMATS } from '#libs/meter-files/formats.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';
import { answered, attempt, exportDifference, recordDifference, slowDifference } from '../support/accepted-file.js';
import { type DamagedFile, type FormatSample, formatSamples } from '../support/format-samples.js';
import { readMeterText } from '../support/meter-text.js';
import { Chance } from '../support/mutate-file.js';
import { runs, SEED, tellTotals } from '../support/soak.js';
import { SlowRefusal } from '../support/slow-meter-reading.js';
import { timed } from '../support/timed.js';
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
async function fateOf({ bytes, slowly }: DamagedFile, { options }: Pick<FormatSample, 'options'>): Promise<Fate> {
  const { outcome: first, ms } = await timed(() => attempt(bytes, options));
  if (ms > LONGEST_MS) throw new Error(`took ${ms} ms`);
  const asked = first instanceof InputProblem;
  const outcome = asked ? await answered(bytes, options, first) : first;
  if (outcome instanceof InputProblem) return 'refused';
  const wrong = await exportDifference(outcome.record);
  if (wrong !== null) throw new Error(wrong);
  if (asked) return 'answered';
  if (slowly === null) return 'accepted';
  return (await isJudged(outcome.record, slowly)) ? 'judged' : 'accepted';
}

/** @returns false where the independent reading has no verdict. @throws Error where it has another */
async function isJudged(record: LoadRecord, slowly: NonNullable<DamagedFile['slowly']>): Promise<boolean> {
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
        failures.push(
          `seed ${seedOf(n)}, ${sample.name} (${damaged.names.join(', ')}): ${String(error).slice(0, 400)}`,
        );
      }
      if (n % 250 === 249) growth = Math.max(growth, heldBytes() - beforeBytes);
    }
    growth = Math.max(growth, heldBytes() - beforeBytes);
    tellTotals('all formats', { files: FILES, ...fates, failures: failures.length, growthMb: growth / 1e6 });
    expect(failures.slice(0, 20)).toEqual([]);
    expect(growth).toBeLessThan(MOST_GROWTH);
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

const CORPUS = fileURLToPath(new URL('../golden/meter-files/corpus/', import.meta.url));
const kept: { sample: string; seed: number; why: string }[] = JSON.parse(readFileSync(`${CORPUS}seeds.json`, 'utf8'));
const keptFiles = readdirSync(CORPUS).filter((name) => !name.endsWith('.json'));

describe('a file that once was trouble', () => {
  it.each(kept)('is read as it is or refused: $why ($sample, seed $seed)', async ({ sample: wanted, seed }) => {
    const sample = SAMPLES.find(({ name }) => name === wanted)!;
    expect(['refused', 'accepted', 'judged', 'answered']).toContain(
      await fateOf(sample.damage(new Chance(seed)), sample),
    );
  });

  it.each(keptFiles)('is read as it is or refused: %s', async (name) => {
    const bytes = new Uint8Array(readFileSync(CORPUS + name));
    const sample = { options: {} };
    expect(['refused', 'accepted', 'answered']).toContain(await fateOf({ bytes, names: [], slowly: null }, sample));
  });
});

const TEXTS = JUDGED.filter(({ name }) => !/^(?:xlsx|parquet)/.test(name));

/** Where the first number of the second half of a text ends. */
function withinNumber(bytes: Uint8Array): number {
  const half = bytes.length >> 1;
  return half + 1 + Buffer.from(bytes.subarray(half)).toString('latin1').search(/\d\D/);
}

describe('a number in', () => {
  it.each(TEXTS)(
    '$name of 10⁹ digits is refused before much of it is read, and the next file is read',
    async (sample) => {
      const { bytes, options } = sample;
      const at = withinNumber(bytes);
      let sent = 0;
      async function* digits() {
        yield bytes.slice(0, at);
        for (; sent < 1e9; sent += 65_536) yield new Uint8Array(65_536).fill(0x39);
        yield bytes.slice(at);
      }
      const reading = () => readMeterFile(digits(), options).catch((error: unknown) => error);
      const { outcome, ms } = await timed(reading);
      expect(outcome).toBeInstanceOf(InputProblem);
      expect((outcome as InputProblem).problems.length).toBeGreaterThan(0);
      expect(sent).toBeLessThan(16e6);
      expect(ms).toBeLessThan(LONGEST_MS);
      expect((await readMeterText(bytes, options)).record.beginS.length).toBeGreaterThan(30);
    },
  );
});

describe('a line of 10 MB in', () => {
  it.each(TEXTS)('$name is refused or passed over in time', async (sample) => {
    const at = withinNumber(sample.bytes);
    const bytes = Buffer.concat([
      sample.bytes.subarray(0, at),
      Buffer.alloc(10_000_000, 'x'),
      sample.bytes.subarray(at),
    ]);
    expect(await fateOf({ bytes, names: ['longLine'], slowly: sample.slowly }, sample)).toBe('refused');
  });
});

describe('the comparisons', () => {
  it('with the export and with the slow reading let no changed or dropped value pass', async () => {
    const { bytes, options, slowly } = JUDGED[0]!;
    const { record } = await readMeterText(bytes, options);
    const slow = await slowly!([]);
    expect([slowDifference(record, slow), recordDifference(record, record), await exportDifference(record)]).toEqual([
      null,
      null,
      null,
    ]);
    const at = record.activeKw.findIndex((kw) => kw !== 0);
    const sabotaged: LoadRecord[] = [
      { ...record, activeKw: record.activeKw.with(at, record.activeKw[at]! * (1 + Number.EPSILON)) },
      { ...record, laggingKvar: record.leadingKvar, leadingKvar: record.laggingKvar },
      { ...record, beginS: record.beginS.map((beginS) => beginS + 60) },
      {
        ...record,
        beginS: record.beginS.subarray(1),
        activeKw: record.activeKw.subarray(1),
        laggingKvar: record.laggingKvar.subarray(1),
        leadingKvar: record.leadingKvar.subarray(1),
      },
      { ...record, intervalS: 2 * record.intervalS },
    ];
    for (const wrong of sabotaged) {
      expect(recordDifference(record, wrong)).not.toBeNull();
      expect(slowDifference(wrong, slow)).not.toBeNull();
    }
    expect(await exportDifference({ ...record, activeKw: record.activeKw.with(at, Number.NaN) })).not.toBeNull();
    await expect(isJudged(sabotaged[0]!, slowly!)).rejects.toThrow('slowly');
  });
});
