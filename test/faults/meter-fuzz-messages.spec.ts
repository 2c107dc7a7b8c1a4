// Damaged messages and read-outs: whatever is accepted has the values that an independent slow reading of the same bytes
// finds, and comes back the same from the plain CSV it is exported to.
import { expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { writeRecordCsv } from '#libs/meter-files/write-record-csv.js';
import { readMeterText } from '../support/meter-text.js';
import { Chance, mutate } from '../support/mutate-file.js';
import { SlowRefusal } from '../support/slow-meter-reading.js';
import { readMsconsSlowly, readProfileSlowly, type SlowRows } from '../support/slow-message-reading.js';
import { runs, SEED } from '../support/soak.js';

const FILES = runs(400, 6_000);
const START = Date.UTC(2024, 4, 5, 22) / 1000;
const stamp = (momentS: number) => new Date(momentS * 1000).toISOString().replace(/\D/g, '').slice(0, 12);

/** Invented loads of two columns. */
const value = (i: number, k: number) => String((k === 0 ? 10 : 4) + ((i * 37 + k * 11) % 29) / 8);

function mscons(): string {
  const items = ['1-1:1.29.0', '1-1:5.29.0', '1-1:8.29.0'].flatMap((code, k) => [
    `LIN+${k + 1}`,
    `PIA+5+${code.replace(':', '?:')}:SRW`,
    ...Array.from({ length: 40 }, (_, i) => [
      `QTY+${i % 13 === 5 ? 67 : 220}:${k === 2 ? 0 : value(i, k)}:${k === 0 ? 'KWH' : 'K3'}`,
      `DTM+163:${stamp(START + i * 900)}?+00:303`,
      `DTM+164:${stamp(START + (i + 1) * 900)}?+00:303`,
    ]).flat(),
  ]);
  const body = ['UNH+1+MSCONS:D:04B:UN:2.3c', 'BGM+7+D1+9', 'UNS+D', 'NAD+DP', 'LOC+172+SITE', ...items];
  const all = ['UNB+UNOC:3+A+B+240506:0012+R', ...body, `UNT+${body.length + 1}+1`, 'UNZ+1+R'];
  return `UNA:+.? '\n${all.join("'\n")}'\n`;
}

function profile(): string {
  const head = (i: number) =>
    `P.01(2${stamp(START + (i + 1) * 900).slice(2)}00)(00)(15)(3)(1.5)(kW)(3.5)(kvar)(9.5)(kVA)`;
  const row = (i: number) => `(${value(i, 0)})(${value(i, 1)})(14.5)`;
  const day = (from: number) => [head(from), ...Array.from({ length: 32 }, (_, i) => row(from + i))];
  return ['0.0.0(10000001)', ...day(0), ...day(40), ...day(80), '!', ''].join('\r\n');
}

const SAMPLES: { format: string; text: string; slowly: (text: string) => SlowRows }[] = [
  { format: 'mscons', text: mscons(), slowly: readMsconsSlowly },
  { format: 'profile-readout', text: profile(), slowly: readProfileSlowly },
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
    expect(failures.slice(0, 20)).toEqual([]);
    // both ways out are taken, else the damage would be too light or too heavy to show anything
    expect(outcomes.accepted).toBeGreaterThan(FILES / 40);
    expect(outcomes.refused).toBeGreaterThan(FILES / 10);
  },
);
