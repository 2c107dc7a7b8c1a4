// Damaged NEM12 files: whatever is accepted has the values that an independent slow reading of the same bytes finds.
import { expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { readMeterText } from '../support/meter-text.js';
import { Chance, mutate } from '../support/mutate-file.js';
import { nem12Text } from '../support/sample-messages.js';
import { SlowRefusal } from '../support/slow-meter-reading.js';
import { readNem12Slowly } from '../support/slow-nem12-reading.js';
import { runs, SEED, tellTotals } from '../support/soak.js';

const FILES = runs(500, 6_000);

it(`reads or refuses ${FILES} damaged NEM12 files and changes no accepted value (seed ${SEED})`, async () => {
  const bytes = new TextEncoder().encode(nem12Text());
  const outcomes = { accepted: 0, refused: 0 };
  const failures: string[] = [];
  for (let n = 0; n < FILES; n++) {
    const damaged = mutate(bytes, new Chance(SEED + n * 7919));
    try {
      // bytes that no longer begin like the format are another format's business
      const { record } = await readMeterText(damaged.bytes, { format: 'nem12' });
      outcomes.accepted++;
      const slow = readNem12Slowly(new TextDecoder('windows-1252').decode(damaged.bytes));
      expect(record.intervalS).toBe(slow.intervalS);
      const mine = Array.from(record.beginS, (beginS, i) => [
        beginS,
        record.activeKw[i],
        record.laggingKvar[i],
        record.leadingKvar[i],
      ]);
      expect(mine).toEqual([...slow.rows].map(([beginS, row]) => [beginS, ...row]).sort((a, b) => a[0]! - b[0]!));
    } catch (error) {
      if (error instanceof InputProblem) outcomes.refused++;
      else {
        const why = error instanceof SlowRefusal ? `accepted, though: ${error.message}` : String(error).slice(0, 300);
        failures.push(`file ${n} (${damaged.names.join(', ')}): ${why}`);
      }
    }
  }
  tellTotals('nem12', { files: FILES, ...outcomes, failures: failures.length });
  expect(failures.slice(0, 20)).toEqual([]);
  expect(outcomes.accepted).toBeGreaterThan(FILES / 10);
  expect(outcomes.refused).toBeGreaterThan(FILES / 10);
});
