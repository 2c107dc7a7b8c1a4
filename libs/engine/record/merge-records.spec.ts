import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { FIRST_S, madeRecord } from '../../../test/support/made-record.js';
import { runs, SEED } from '../../../test/support/soak.js';
import { InputProblem, remark } from '../problem.js';
import { createLoadRecord, type LoadRecord } from './load-record.js';
import { mergeRecords, overlapOf, type RecordSeries } from './merge-records.js';

const SERIES: RecordSeries[] = ['activeKw', 'laggingKvar', 'leadingKvar', 'voltageV', 'connectedKvar', 'standby'];

/** Values by slot; a reading holds kW, net kvar, V, kvar of an old bank, standby. */
type Readings = Map<number, [number, number, number, number, number]>;
interface Has {
  voltage: boolean;
  connected: boolean;
  standby: boolean;
}

function recordOf(readings: Readings, has: Has): LoadRecord {
  const slots = [...readings.keys()].sort((a, b) => a - b);
  const column = (at: number) => slots.map((slot) => readings.get(slot)![at]!);
  return madeRecord({
    activeKw: column(0),
    reactiveKvar: column(1),
    slots: slots.map((slot) => slot - slots[0]!),
    firstS: FIRST_S + slots[0]! * 900,
    ...(has.voltage ? { voltageV: column(2) } : {}),
    ...(has.connected ? { connectedKvar: column(3) } : {}),
    ...(has.standby ? { standby: column(4) } : {}),
  });
}

const reading = fc.tuple(
  fc.integer({ min: -3, max: 3 }),
  fc.integer({ min: -3, max: 3 }),
  fc.integer({ min: 398, max: 400 }),
  fc.integer({ min: 0, max: 1 }),
  fc.integer({ min: 0, max: 1 }),
);
const has = fc.record({ voltage: fc.boolean(), connected: fc.boolean(), standby: fc.boolean() });
const readings = fc
  .array(fc.tuple(fc.integer({ min: -20, max: 20 }), reading), { minLength: 1, maxLength: 25 })
  .map((entries): Readings => new Map(entries));

/** The second method: objects by moment, no columns, no two pointers. */
function rowsOf(record: LoadRecord): Map<number, Partial<Record<RecordSeries, number>>> {
  const rows = new Map<number, Partial<Record<RecordSeries, number>>>();
  record.beginS.forEach((beginS, i) => {
    const row: Partial<Record<RecordSeries, number>> = {};
    for (const name of SERIES) {
      const values = record[name];
      if (values !== null) row[name] = values[i]!;
    }
    rows.set(beginS, row);
  });
  return rows;
}

function slowMerge(earlier: LoadRecord, later: LoadRecord, keep: 'earlier' | 'later') {
  const [a, b] = [rowsOf(earlier), rowsOf(later)];
  const conflicts = [...a.keys()].filter((beginS) =>
    SERIES.some((name) => {
      const [x, y] = [a.get(beginS)?.[name], b.get(beginS)?.[name]];
      return x !== undefined && y !== undefined && x !== y;
    }),
  );
  const moments = [...new Set([...a.keys(), ...b.keys()])].sort((x, y) => x - y);
  const rows = moments.map((beginS) => {
    const taken = keep === 'later' && conflicts.includes(beginS) ? [a, b] : [b, a];
    return { ...taken[0]!.get(beginS), ...taken[1]!.get(beginS) };
  });
  const columns = SERIES.map((name) => {
    const values = rows.map((row) => row[name]);
    return values.some((value) => value === undefined) ? null : values;
  });
  return { conflicts, moments, columns };
}

const columnsOf = (record: LoadRecord) =>
  SERIES.map((name) => (record[name] === null ? null : Array.from(record[name])));

describe('two records of one meter', () => {
  it('make the union that a table by moment makes, and disagree where it says so', () => {
    fc.assert(
      fc.property(readings, has, readings, has, fc.constantFrom('earlier', 'later'), (a, hasA, b, hasB, keep) => {
        const [earlier, later] = [recordOf(a, hasA), recordOf(b, hasB)];
        const slow = slowMerge(earlier, later, keep);
        const overlap = overlapOf(earlier, later);
        expect(overlap.disagreed).toBe(slow.conflicts.length);
        const inSpans = overlap.spans.flatMap(({ beginS, endS }) =>
          Array.from({ length: (endS - beginS) / 900 }, (_, i) => beginS + i * 900),
        );
        expect(inSpans).toEqual(slow.conflicts.sort((x, y) => x - y));
        expect(overlap.added).toBe(slow.moments.length - earlier.beginS.length);
        expect(overlap.agreed + overlap.disagreed + overlap.added).toBe(later.beginS.length);
        const merged = mergeRecords(earlier, later, keep);
        expect(Array.from(merged.beginS)).toEqual(slow.moments);
        expect(columnsOf(merged)).toEqual(slow.columns);
      }),
      { seed: SEED, numRuns: runs(500, 10_000) },
    );
  });

  it('that are the same are that record itself, whichever is kept', () => {
    fc.assert(
      fc.property(readings, has, fc.constantFrom('earlier', 'later'), (a, hasA, keep) => {
        const record = recordOf(a, hasA);
        expect(mergeRecords(record, recordOf(a, hasA), keep)).toBe(record);
      }),
      { seed: SEED, numRuns: runs(200, 4000) },
    );
  });

  it('that nowhere disagree make one record in either order', () => {
    fc.assert(
      fc.property(readings, has, fc.infiniteStream(fc.integer({ min: 0, max: 2 })), has, (all, hasA, share, hasB) => {
        const parts: [Readings, Readings] = [new Map(), new Map()];
        for (const [slot, values] of all) {
          const whose = share.next().value ?? 2;
          if (whose !== 1) parts[0].set(slot, values);
          if (whose !== 0) parts[1].set(slot, values);
        }
        fc.pre(parts[0].size > 0 && parts[1].size > 0);
        const [a, b] = [recordOf(parts[0], hasA), recordOf(parts[1], hasB)];
        const one = mergeRecords(a, b, 'earlier');
        const other = mergeRecords(b, a, 'later');
        expect(one.beginS).toEqual(other.beginS);
        expect(columnsOf(one)).toEqual(columnsOf(other));
        expect(one.missing).toBe(other.missing);
      }),
      { seed: SEED, numRuns: runs(300, 6000) },
    );
  });
});

describe('records that disagree', () => {
  const earlier = madeRecord({ activeKw: [10, 20, 30, 40, 50], reactiveKvar: [1, 1, 1, 1, 1] });
  const later = madeRecord({
    activeKw: [25, 30, 10, 55, 60],
    reactiveKvar: [1, 1, -2, 1, 1],
    firstS: FIRST_S + 900,
  });

  it('say in which spans and by how much at most', () => {
    const at = (slot: number) => FIRST_S + slot * 900;
    expect(overlapOf(earlier, later)).toEqual({
      added: 1,
      agreed: 1,
      disagreed: 3,
      spanCount: 2,
      spans: [
        { beginS: at(1), endS: at(2), intervals: 1 },
        { beginS: at(3), endS: at(5), intervals: 2 },
      ],
      // −2 kvar stands as 2 kvar leading and none lagging
      largest: { activeKw: 30, laggingKvar: 1, leadingKvar: 2 },
    });
  });

  it('keep whole intervals of the one that is asked for', () => {
    const kept = mergeRecords(earlier, later, 'earlier');
    expect(Array.from(kept.activeKw)).toEqual([10, 20, 30, 40, 50, 60]);
    const corrected = mergeRecords(earlier, later, 'later');
    expect(Array.from(corrected.activeKw)).toEqual([10, 25, 30, 10, 55, 60]);
    expect(Array.from(corrected.leadingKvar)).toEqual([0, 0, 0, 2, 0, 0]);
    expect(corrected.duplicates).toBe(1);
  });

  it('do not disagree in the last bits of a division: six times 0.7 kWh in ten minutes is 4.2 kW', () => {
    const energy = madeRecord({ activeKw: [0.7 * 6, 5], reactiveKvar: [0, 0] });
    const power = madeRecord({ activeKw: [4.2, 5.000_01], reactiveKvar: [0, 0] });
    expect(energy.activeKw[0]).not.toBe(4.2);
    expect(overlapOf(energy, power)).toMatchObject({ agreed: 1, disagreed: 1 });
    // what agrees stays as it stood, to the bit
    expect(mergeRecords(energy, power, 'later').activeKw[0]).toBe(0.7 * 6);
  });

  it('list the first hundred spans and count them all', () => {
    const slots = Array.from({ length: 400 }, (_, i) => i);
    const a = madeRecord({ activeKw: slots.map(() => 1), reactiveKvar: slots.map(() => 0) });
    const b = madeRecord({ activeKw: slots.map((slot) => 1 + (slot % 2)), reactiveKvar: slots.map(() => 0) });
    const { spans, spanCount, disagreed } = overlapOf(a, b);
    expect([spans.length, spanCount, disagreed]).toEqual([100, 200, 200]);
  });
});

describe('a record that is extended', () => {
  const column = { activeKw: [1, 2], reactiveKvar: [0, 0] };

  it('counts repaired intervals at most, and what both readers noted once', () => {
    const parts = {
      intervalS: 900,
      activeKw: Float64Array.of(1, 2),
      laggingKvar: Float64Array.of(0, 0),
      leadingKvar: Float64Array.of(0, 0),
    };
    const said = remark('date-order-settled', { order: 'dmy' });
    const a = createLoadRecord({ ...parts, beginS: Float64Array.of(0, 900), repaired: 2, notes: [said] });
    const b = createLoadRecord({
      ...parts,
      beginS: Float64Array.of(900, 1800),
      activeKw: Float64Array.of(2, 3),
      repaired: 2,
      notes: [said, remark('zone-assumed-utc')],
    });
    const merged = mergeRecords(a, b, 'earlier');
    // both of the earlier, and the one interval of the later that was taken
    expect(merged.repaired).toBe(3);
    expect(merged.notes.map(({ code }) => code)).toEqual(['date-order-settled', 'zone-assumed-utc']);
  });

  it('loses a column that the new intervals do not have, and gains one for the intervals it had', () => {
    const withVoltage = madeRecord({ ...column, voltageV: [400, 401] });
    const next = madeRecord({ ...column, firstS: FIRST_S + 1800 });
    expect(mergeRecords(withVoltage, next, 'earlier').voltageV).toBeNull();
    expect(mergeRecords(madeRecord(column), withVoltage, 'earlier').voltageV).toEqual(Float64Array.of(400, 401));
  });

  it('keeps its voltage where a correction has none', () => {
    const withVoltage = madeRecord({ ...column, voltageV: [400, 401] });
    const correction = madeRecord({ activeKw: [3], reactiveKvar: [1] });
    const merged = mergeRecords(withVoltage, correction, 'later');
    expect([Array.from(merged.activeKw), Array.from(merged.voltageV!)]).toEqual([
      [3, 2],
      [400, 401],
    ]);
  });

  it.each([
    ['of another length', madeRecord({ ...column, intervalS: 1800 }), 'intervalS', '1800'],
    ['beside its own', madeRecord({ ...column, firstS: FIRST_S + 300 }), 'beginS', '300 s beside them'],
    ['beside its own, before it', madeRecord({ ...column, firstS: FIRST_S - 300 }), 'beginS', '600 s beside them'],
  ])('refuses intervals %s', (_what, other, path, found) => {
    const merge = () => mergeRecords(madeRecord(column), other, 'later');
    expect(merge).toThrow(InputProblem);
    expect(merge).toThrow(expect.objectContaining({ problems: [expect.objectContaining({ path, found })] }));
  });
});
