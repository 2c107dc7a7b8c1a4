// Damaged NEM12 files: whatever is accepted has the values that an independent slow reading of the same bytes finds.
import { expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { readMeterText } from '../support/meter-text.js';
import { Chance, mutate } from '../support/mutate-file.js';
import { SlowRefusal } from '../support/slow-meter-reading.js';
import { readNem12Slowly } from '../support/slow-nem12-reading.js';
import { runs, SEED } from '../support/soak.js';

const FILES = runs(500, 6_000);

/** Three invented days of one meter, active and reactive, with substitutes on the second. */
function sample(): string {
  const days = [0, 1, 2].flatMap((day) =>
    [
      ['E1', 'KWH', 20],
      ['Q1', 'KVARH', 12],
    ].flatMap(([suffix, unit, base]) => {
      const values = Array.from({ length: 48 }, (_, i) => (Number(base) + ((i * 37 + day * 11) % 29) / 4).toFixed(3));
      const rows = [
        `200,6100000042,E1Q1,${suffix},${suffix},N1,00042,${unit},30,`,
        `300,2024050${6 + day},${values.join(',')},${day === 1 ? 'V' : 'A'},,,20240601120000,`,
      ];
      return day === 1 ? [...rows, '400,1,20,A,,', '400,21,24,N,,', '400,25,48,F14,32,'] : rows;
    }),
  );
  return ['100,NEM12,202406010900,INVENTED,PLANNER', ...days, '900'].join('\r\n');
}

it(`reads or refuses ${FILES} damaged NEM12 files and changes no accepted value (seed ${SEED})`, async () => {
  const bytes = new TextEncoder().encode(sample());
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
  expect(failures.slice(0, 20)).toEqual([]);
  expect(outcomes.accepted).toBeGreaterThan(FILES / 10);
  expect(outcomes.refused).toBeGreaterThan(FILES / 10);
});
