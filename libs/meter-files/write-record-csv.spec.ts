import { describe, expect, it } from 'vitest';
import { createLoadRecord } from '#libs/engine/index.js';
import { recordColumns } from './record-columns.js';
import { recordCsvChunks, writeRecordCsv } from './write-record-csv.js';

const columns = {
  intervalS: 900,
  beginS: Float64Array.of(1_714_953_600, 1_714_955_400),
  activeKw: Float64Array.of(12.5, -3),
  laggingKvar: Float64Array.of(4, 0),
  leadingKvar: Float64Array.of(0, 1e-7),
};

describe('a record as CSV', () => {
  it('has its stamps in UTC, lagging and leading apart, and the end of every interval', () => {
    expect(writeRecordCsv(createLoadRecord(columns)).split('\n')).toEqual([
      'interval begin [UTC],active power [kW],lagging reactive power [kvar],leading reactive power [kvar],interval end [UTC]',
      '2024-05-06T00:00:00Z,12.5,4,0,2024-05-06T00:15:00Z',
      '2024-05-06T00:30:00Z,-3,0,1e-7,2024-05-06T00:45:00Z',
      '',
    ]);
  });

  it('has voltage, bank and standby only where the record has them', () => {
    const more = {
      voltageV: Float64Array.of(400, 401),
      connectedKvar: Float64Array.of(0, 50),
      standby: Uint8Array.of(0, 1),
    };
    const record = createLoadRecord({ ...columns, ...more });
    const [header = '', first] = writeRecordCsv(record).split('\n');
    expect(header.split(',').slice(4)).toEqual([
      'voltage [V]',
      'connected bank [kvar]',
      'standby',
      'interval end [UTC]',
    ]);
    expect(first).toBe('2024-05-06T00:00:00Z,12.5,4,0,400,0,0,2024-05-06T00:15:00Z');
    expect(Object.keys(recordColumns(record))).toEqual([
      'beginS',
      'activeKw',
      'laggingKvar',
      'leadingKvar',
      'voltageV',
      'connectedKvar',
      'standby',
    ]);
    expect(Object.keys(recordColumns(createLoadRecord(columns)))).toEqual([
      'beginS',
      'activeKw',
      'laggingKvar',
      'leadingKvar',
    ]);
  });

  it('comes in chunks of whole rows, for a stream', () => {
    const n = 20_000;
    const zeros = new Float64Array(n);
    const record = createLoadRecord({
      intervalS: 60,
      beginS: Float64Array.from({ length: n }, (_, i) => i * 60),
      activeKw: zeros,
      laggingKvar: zeros,
      leadingKvar: zeros,
    });
    const chunks = [...recordCsvChunks(record)];
    expect(chunks.length).toBeGreaterThan(2);
    expect(chunks.every((chunk) => chunk.endsWith('\n'))).toBe(true);
    expect(chunks.join('').split('\n')).toHaveLength(n + 2);
  });
});
