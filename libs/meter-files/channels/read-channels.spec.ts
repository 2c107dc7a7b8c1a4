import { describe, expect, it } from 'vitest';
import { Question } from '#libs/contract/question.js';
import { InputProblem } from '#libs/engine/index.js';
import type { ReadOptions } from '../meter-format.js';
import { type ChannelKind, MeterChannel } from './meter-channel.js';
import { readChannels } from './read-channels.js';

const START = Date.UTC(2024, 4, 6) / 1000;

function channel(kind: Partial<ChannelKind>, values: readonly number[], stepS = 900): MeterChannel {
  const made = new MeterChannel({
    name: kind.quantity ?? 'active',
    quantity: 'active',
    energy: true,
    cumulative: false,
    times: 1,
    over: 1,
    ...kind,
  });
  for (const [i, value] of values.entries()) made.add(START + i * stepS, value, i + 1);
  return made;
}

const read = (channels: MeterChannel[], options: ReadOptions = {}) =>
  readChannels({ format: 'made', channels, notes: [], rowsRead: 0 }, options);

function problemOf(action: () => unknown): InputProblem {
  try {
    action();
  } catch (problem) {
    if (problem instanceof InputProblem) return problem;
    throw problem;
  }
  throw new Error('nothing was refused');
}

describe('the channels of a meter', () => {
  it('are joined on their beginnings, whatever order they come in', () => {
    const active = channel({}, [10, 12, 11]);
    const lagging = new MeterChannel({ ...active.kind, name: 'QI', quantity: 'lagging' });
    for (const i of [2, 0, 1]) lagging.add(START + i * 900, 4 + i, i + 1);
    const { record } = read([active, lagging]);
    expect(Array.from(record.beginS)).toEqual([START, START + 900, START + 1800]);
    // 10 kWh in a quarter of an hour are 40 kW on average
    expect(Array.from(record.activeKw)).toEqual([40, 48, 44]);
    expect(Array.from(record.laggingKvar)).toEqual([16, 20, 24]);
  });

  it('of one quantity are added, and a moment that one lacks has no value', () => {
    const { record } = read([
      channel({ energy: false }, [40, 41, 42]),
      channel({ name: 'QI', quantity: 'lagging', energy: false }, [5, 6, 7]),
      channel({ name: 'QII', quantity: 'lagging', energy: false }, [1, Number.NaN, 2]),
    ]);
    expect(Array.from(record.laggingKvar)).toEqual([6, 9]);
    expect(record.missing).toBe(1);
    expect(record.notes.map(({ code }) => code)).toContain('channels-added');
  });

  it('that are registers give the difference of their readings, exact in the decimals they are read in', () => {
    // 0.3 − 0.1 is not 0.2 in binary, 200.3 − 200.1 still less
    const { record } = read([
      channel({ cumulative: true }, [200.1, 200.3, 201.3, 201.4]),
      channel({ quantity: 'lagging', cumulative: true }, [0, 0.5, 1, 1.5]),
    ]);
    expect(Array.from(record.activeKw)).toEqual([0.8, 4, 0.4]);
    expect(Array.from(record.laggingKvar)).toEqual([2, 2, 2]);
  });

  it('that are registers leave a gap where they fall or a reading is missing', () => {
    const active = channel({ cumulative: true }, [100, 101, 102, 3, 4, 5, 6]);
    const reactive = new MeterChannel({ ...active.kind, quantity: 'lagging' });
    for (const i of [0, 1, 2, 3, 4, 6]) reactive.add(START + i * 900, i, i + 1);
    const { record } = read([active, reactive]);
    expect(Array.from(record.beginS, (beginS) => (beginS - START) / 900)).toEqual([0, 1, 3]);
    expect(record.notes.map(({ code }) => code)).toEqual(
      expect.arrayContaining(['register-fell', 'register-readings-missing']),
    );
  });

  it('raise a question where one moment has two values, and nothing where it has one twice', () => {
    const active = channel({}, [10, 12]);
    const lagging = channel({ quantity: 'lagging' }, [4, 5]);
    active.add(START, 10, 3);
    expect(read([active, lagging]).record.duplicates).toBe(1);
    active.add(START + 900, 13, 4);
    const question = problemOf(() => read([active, lagging]));
    expect(question).toBeInstanceOf(Question);
    expect((question as Question).questions[0]!.readings.map(({ maxKw }) => maxKw)).toEqual([48, 52]);
    expect(read([active, lagging], { map: { keepRow: 'first' } }).record.activeKw[1]).toBe(48);
  });

  it('are refused where a quantity is missing or lengths differ', () => {
    expect(problemOf(() => read([channel({}, [1, 2])])).problems[0]!.code).toBe('no-reactive-column');
    const halfHours = channel({ quantity: 'lagging' }, [1, 2], 1800);
    expect(problemOf(() => read([channel({}, [1, 2]), halfHours])).problems[0]).toMatchObject({
      code: 'mixed-intervals',
      found: '1800 s',
    });
  });
});
