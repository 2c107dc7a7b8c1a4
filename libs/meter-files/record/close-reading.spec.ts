import { describe, expect, it } from 'vitest';
import { UTC_TABLE } from '#libs/engine/index.js';
import { closeReading } from './close-reading.js';

const FIRST_S = Date.UTC(2025, 2, 1) / 1000;

/** Forty days of hours; a working load with ten hours of exact zeros on the fifth day and a gap of three on the sixth. */
function result() {
  const hours = Array.from({ length: 40 * 24 }, (_, hour) => hour).filter((hour) => hour < 125 || hour > 127);
  const isOff = (hour: number) => hour >= 96 && hour < 106;
  const column = (of: (hour: number) => number) => Float64Array.from(hours, (hour) => (isOff(hour) ? 0 : of(hour)));
  return {
    columns: {
      intervalS: 3600,
      beginS: Float64Array.from(hours, (hour) => FIRST_S + hour * 3600),
      activeKw: column((hour) => 100 + ((hour * 37) % 101)),
      laggingKvar: column((hour) => 60 + ((hour * 53) % 47)),
      leadingKvar: column(() => 0),
      voltageV: null,
      connectedKvar: null,
      standby: null,
    },
    duplicates: 0,
    notes: [],
    counts: { format: 'csv', rowsRead: hours.length, rejectedRows: 0 },
    zone: UTC_TABLE,
  };
}

describe('closing a reading', () => {
  it('puts what the values ask among the notes, where a plan lists its open points', () => {
    const { record, quality } = closeReading(result(), {});
    const values = { register: 'kW and kvar', date: '2025-03-05', hours: 10 };
    expect(quality.questions).toMatchObject([{ code: 'sign.zeros', values }]);
    expect(record.notes).toEqual(quality.questions);
    expect(quality).toMatchObject({
      suspectZeroCount: 1,
      suspectZeros: [{ beginS: FIRST_S + 96 * 3600, intervals: 10 }],
    });
  });

  it('states repairs by the month and how they were made, and changes no value by it', () => {
    const { record, quality } = closeReading(result(), { repair: 'hold', upToS: 4 * 3600 });
    expect(quality.repair).toEqual({ method: 'hold', upToS: 4 * 3600 });
    expect(quality.months.map(({ month, repaired }) => [month, repaired])).toEqual([
      ['2025-03', 3],
      ['2025-04', 0],
    ]);
    expect(record.activeKw.filter((kw) => kw === 0)).toHaveLength(10);
    // what a repair holds is no register that stands still
    expect(quality.questions).toHaveLength(1);
  });
});
