// Damaged messages and read-outs: whatever is accepted has the values that an independent slow reading of the same bytes
// finds, and comes back the same from the plain CSV it is exported to.
import { expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { writeRecordCsv } from '#libs/meter-files/write-record-csv.js';
import { readMeterText } from '../support/meter-text.js';
import { Chance, mutate } from '../support/mutate-file.js';
import { msconsText, profileText } from '../support/sample-messages.js';
import { SlowRefusal } from '../support/slow-meter-reading.js';
import { readMsconsSlowly, readProfileSlowly, type SlowRows } from '../support/slow-message-reading.js';
import { runs, SEED, tellTotals } from '../support/soak.js';

const FILES = runs(400, 6_000);
const SAMPLES: { format: string; text: string; slowly: (text: string) => SlowRows }[] = [
  { format: 'mscons', text: msconsText(), slowly: readMsconsSlowly },
  { format: 'profile-readout', text: profileText(), slowly: readProfileSlowly },
];

async function expectSame(format: string, bytes: Uint8Array, slowly: (text: string) => SlowRows): Promise<void> {
  const { record } = await readMeterText(bytes, { format });
  const slow = slowly(new TextDecoder('latin1').decode(bytes));
  expect(record.intervalS).toBe(slow.intervalS);
  const mine = Array.from(record.beginS, (beginS, i) => [
    beginS,
    record.activeKw[i],
    record.laggingKvar[i],
    record.leadingKvar[i],
  ]);
  expect(mine).toEqual([...slow.rows].map(([beginS, row]) => [beginS, ...row]).sort((a, b) => a[0]! - b[0]!));
  const again = (await readMeterText(writeRecordCsv(record), { siteTimeZone: 'UTC' })).record;
  expect([again.beginS, again.activeKw, again.laggingKvar, again.leadingKvar]).toEqual([
    record.beginS,
    record.activeKw,
    record.laggingKvar,
    record.leadingKvar,
  ]);
}

it.each(SAMPLES)(
  `reads or refuses ${FILES} damaged files of $format and changes no accepted value (seed ${SEED})`,
  async (sample) => {
    const bytes = new TextEncoder().encode(sample.text);
    await expectSame(sample.format, bytes, sample.slowly);
    const outcomes = { accepted: 0, refused: 0 };
    const failures: string[] = [];
    for (let n = 0; n < FILES; n++) {
      const damaged = mutate(bytes, new Chance(SEED + n * 7919));
      const startMs = performance.now();
      try {
        await expectSame(sample.format, damaged.bytes, sample.slowly);
        outcomes.accepted++;
      } catch (error) {
        if (error instanceof InputProblem) outcomes.refused++;
        else {
          const why = error instanceof SlowRefusal ? `accepted, though: ${error.message}` : String(error).slice(0, 300);
          failures.push(`file ${n} (${damaged.names.join(', ')}): ${why}`);
        }
      }
      if (performance.now() - startMs > 2_000) failures.push(`file ${n} took more than two seconds`);
    }
    tellTotals(sample.format, { files: FILES, ...outcomes, failures: failures.length });
    expect(failures.slice(0, 20)).toEqual([]);
    // both ways out are taken, else the damage would be too light or too heavy to show anything
    expect(outcomes.accepted).toBeGreaterThan(FILES / 40);
    expect(outcomes.refused).toBeGreaterThan(FILES / 10);
  },
);
