import { describe, expect, it } from 'vitest';
import type { Control } from './control.js';
import { simulate } from './simulate.js';
import type { SwitchedBank } from './switched-bank.js';

const CONTROL: Control = {
  setPointPowerFactor: 0.95,
  mode: 'nearestLevel',
  responseRatio: 0.65,
  stepDelayS: 0,
  reconnectDelayS: 0,
  wear: 'even',
};

function equal(count: number): SwitchedBank {
  const stages = Int32Array.from({ length: count }, (_, k) => k);
  return { stageCount: count, classes: [{ kvar: 10, stages }], fixedKvar: 0, smallestKvar: 10 };
}

function run(
  wantedKvar: number[],
  control: Partial<Control> = {},
  more: { count?: number; slots?: number[]; standby?: number[] } = {},
) {
  const { count = 3, slots = wantedKvar.map((_, i) => i), standby } = more;
  const { connectedKvar, switchings } = simulate(
    equal(count),
    { ...CONTROL, ...control },
    {
      intervalS: 300,
      beginS: Float64Array.from(slots, (slot) => slot * 300),
      wantedKvar: Float64Array.from(wantedKvar),
      voltageScale: null,
      standby: standby === undefined ? null : Uint8Array.from(standby),
    },
  );
  return { kvar: [...connectedKvar], switchings: [...switchings] };
}

describe('the controller over a record', () => {
  it('starts with everything off, follows the load and holds within its threshold', () => {
    expect(run([6, 7, 20, 26.5, 26.6, 0]).kvar).toEqual([0, 10, 20, 20, 30, 0]);
  });

  it('holds at exactly the threshold', () => {
    expect(run([6.5, 6.500001]).kvar).toEqual([0, 10]);
  });

  it('spreads wear: the free stage with fewest switchings in, the connected one with most out', () => {
    expect(run([10, 0, 10, 0, 10, 0]).switchings).toEqual([2, 2, 2]);
    expect(run([10, 0, 10, 0, 10, 0, 10]).switchings).toEqual([3, 2, 2]);
  });

  it('in order takes the lowest in and the highest out', () => {
    expect(run([10, 0, 10, 0, 10, 0], { wear: 'inOrder' }).switchings).toEqual([6, 0, 0]);
    expect(run([20, 10, 20, 0], { wear: 'inOrder' }).switchings).toEqual([2, 4, 0]);
  });

  it('leaves a stage off until its delay is over, and takes another meanwhile', () => {
    expect(run([10, 0, 10, 10], { reconnectDelayS: 900 }, { count: 1 }).kvar).toEqual([10, 0, 0, 0]);
    expect(run([10, 0, 10, 10, 10], { reconnectDelayS: 900 }, { count: 1 }).kvar).toEqual([10, 0, 0, 0, 10]);
    expect(run([10, 0, 10], { reconnectDelayS: 900 }, { count: 2 }).kvar).toEqual([10, 0, 10]);
  });

  it('counts the delay through intervals that are missing', () => {
    expect(run([10, 0, 10], { reconnectDelayS: 900 }, { count: 1, slots: [0, 1, 4] }).kvar).toEqual([10, 0, 10]);
    expect(run([10, 0, 10], { reconnectDelayS: 900 }, { count: 1, slots: [0, 1, 3] }).kvar).toEqual([10, 0, 0]);
  });

  it.each([
    [0, [30, 30, 30], 'no bound'],
    [100, [30, 30, 30], 'three in 300 s'],
    [150, [20, 30, 30], 'two in 300 s'],
    [301, [10, 20, 30], 'one at least'],
  ])('with %d s between steps goes %j: %s', (stepDelayS, kvar, _why) => {
    expect(run([30, 30, 30], { stepDelayS }).kvar).toEqual(kvar);
  });

  it('is held off while a standby supply runs, and those switchings count', () => {
    const { kvar, switchings } = run([20, 20, 20, 20], {}, { standby: [0, 1, 1, 0] });
    expect(kvar).toEqual([20, 0, 0, 20]);
    expect(switchings.reduce((sum, count) => sum + count, 0)).toBe(6);
  });

  it('with nothing to switch keeps what is never switched', () => {
    const bank: SwitchedBank = { stageCount: 1, classes: [], fixedKvar: 25, smallestKvar: 0 };
    const view = {
      intervalS: 300,
      beginS: Float64Array.of(0, 300),
      wantedKvar: Float64Array.of(0, 1e6),
      voltageScale: null,
      standby: null,
    };
    expect([...simulate(bank, CONTROL, view).connectedKvar]).toEqual([25, 25]);
  });
});
