// Round trip: a record that goes out and comes back is the same to the bit, by the bytes it is hashed from.
import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { recordBytes } from '#libs/contract/record-hash.js';
import { createLoadRecord, InputProblem, type LoadRecord, remark } from '#libs/engine/index.js';
import { KEPT_FORMS, keptRecordChunks } from '#libs/meter-files/kept-record/write-kept-record.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';
import { chance } from '../support/chance.js';
import { Chance, mutate } from '../support/mutate-file.js';
import { runs, SEED } from '../support/soak.js';

function hashOf(record: LoadRecord): string {
  const hash = createHash('sha256');
  for (const chunk of recordBytes(record)) hash.update(chunk);
  return hash.digest('hex');
}

async function* chunked(bytes: Uint8Array, size = 7_001): AsyncGenerator<Uint8Array> {
  for (let at = 0; at < bytes.length; at += size) yield bytes.subarray(at, at + size);
}

function bytesOf(record: LoadRecord, form: (typeof KEPT_FORMS)[number]): Buffer {
  return Buffer.concat([...keptRecordChunks(record, form)]);
}

const AWKWARD = [0, 1e-7, 0.1 + 0.2, 1 / 3, 123_456.789, 5e-324, 1e21, 99_999_999.000_000_01];

/** A record of awkward numbers, with gaps, repairs, notes and whichever further columns the seed has; invented. */
function awkward(seed: number): LoadRecord {
  const random = chance(SEED + seed);
  const n = 40 + random.whole(0, 60);
  const column = (sign = 1) =>
    Float64Array.from(
      { length: n },
      () => sign * (random.next() < 0.3 ? random.oneOf(AWKWARD) % 1e6 : random.between(0, 900)),
    );
  let at = 1_735_689_600;
  const beginS = Float64Array.from({ length: n }, () => {
    at += random.next() < 0.1 ? 2700 : 900;
    return at;
  });
  return createLoadRecord({
    intervalS: 900,
    beginS,
    activeKw: Float64Array.from(column(), (value, i) => (i % 7 === 0 ? -value : value)),
    laggingKvar: column(),
    leadingKvar: column(),
    voltageV: random.next() < 0.5 ? Float64Array.from({ length: n }, () => random.between(380, 420)) : null,
    connectedKvar: random.next() < 0.3 ? column() : null,
    standby: random.next() < 0.3 ? Uint8Array.from({ length: n }, (_, i) => i % 2) : null,
    repaired: 2,
    duplicates: 1,
    notes: [
      remark('file-read-as', { format: 'csv', columns: '=1+1,"kW"; @x' }),
      remark('meter-chosen', { meter: "'-cmd|' /C calc'!A0", others: 2 }),
    ],
  });
}

describe.each(KEPT_FORMS)('a record kept as %s', (form) => {
  it('comes back with the same hash, whatever its numbers, columns and notes', async () => {
    for (let seed = 0; seed < runs(8, 160); seed++) {
      const record = awkward(seed);
      const { record: back, quality } = await readMeterFile(chunked(bytesOf(record, form)));
      expect(hashOf(back)).toBe(hashOf(record));
      expect(quality.format).toBe('kept record');
    }
  });

  it('is another record where one number was changed (control)', async () => {
    const record = awkward(1);
    const other = { ...record, activeKw: record.activeKw.with(3, record.activeKw[3]! + 1e-9) };
    expect(hashOf(other)).not.toBe(hashOf(record));
    const { record: back } = await readMeterFile(chunked(bytesOf(other, form)));
    expect(hashOf(back)).toBe(hashOf(other));
  });

  it('is refused or read, never a fault, however it was damaged', async () => {
    const whole = bytesOf(awkward(2), form);
    const random = new Chance(SEED);
    for (let n = 0; n < runs(60, 1200); n++) {
      const { bytes } = mutate(whole, random);
      try {
        await readMeterFile(chunked(bytes));
      } catch (error) {
        expect(error).toBeInstanceOf(InputProblem);
      }
    }
  });

  it('gives equal bytes twice', () => {
    expect(bytesOf(awkward(3), form).equals(bytesOf(awkward(3), form))).toBe(true);
  });
});
