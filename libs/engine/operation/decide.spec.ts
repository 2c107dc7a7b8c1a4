import { describe, expect, it } from 'vitest';
import { type Decision, oneByOneInto } from './decide.js';
import { NearestLevel } from './nearest-level.js';
import type { SwitchedBank } from './switched-bank.js';

// Three stages of 50 and two of 25, largest size first; the threshold is 0.65 of 25, or 16.25 kvar.
const MIXED: SwitchedBank = {
  stageCount: 5,
  classes: [
    { kvar: 50, stages: Int32Array.of(0, 1, 2) },
    { kvar: 25, stages: Int32Array.of(3, 4) },
  ],
  fixedKvar: 0,
  smallestKvar: 25,
};
const EQUAL: SwitchedBank = { ...MIXED, stageCount: 3, classes: [{ kvar: 25, stages: Int32Array.of(0, 1, 2) }] };

interface State {
  wantedKvar: number;
  connected: number[];
  free: number[];
  mostSwitchings?: number;
  voltageScale?: number;
}

type Row = [state: State, chosen: number[], why: string];

const nearestLevelInto = (bank: SwitchedBank, decision: Decision): void => new NearestLevel(bank, decision).choose();

function decided(into: typeof oneByOneInto, bank: SwitchedBank, state: State): number[] {
  const decision: Decision = {
    mostSwitchings: 99,
    voltageScale: 1,
    bandKvar: 0.65 * 25,
    chosen: new Int32Array(bank.classes.length),
    ...state,
    connected: Int32Array.from(state.connected),
    free: Int32Array.from(state.free),
  };
  into(bank, decision);
  return [...decision.chosen];
}

const nearestMixed: Row[] = [
  [{ wantedKvar: 110, connected: [0, 0], free: [3, 2] }, [2, 0], '100 is nearer than 125'],
  [{ wantedKvar: 115, connected: [0, 0], free: [3, 2] }, [2, 1], '125 is nearer than 100'],
  [{ wantedKvar: 112.5, connected: [0, 0], free: [3, 2] }, [2, 0], 'as near from below, with fewer switchings'],
  [{ wantedKvar: 37.5, connected: [0, 0], free: [3, 2] }, [0, 1], 'as near with as few switchings: the lower'],
  [{ wantedKvar: 62.5, connected: [1, 1], free: [2, 1] }, [1, 1], 'as near as any: kept'],
  [{ wantedKvar: 50, connected: [0, 2], free: [3, 0] }, [0, 2], 'there already, by other stages'],
  [{ wantedKvar: 500, connected: [0, 0], free: [3, 2] }, [3, 2], 'all there is'],
  [{ wantedKvar: -10, connected: [3, 2], free: [0, 0] }, [0, 0], 'none'],
  [{ wantedKvar: 150, connected: [0, 0], free: [0, 2] }, [0, 2], 'no more than is free'],
  [{ wantedKvar: 150, connected: [0, 0], free: [3, 2], mostSwitchings: 1 }, [1, 0], 'no more than there is time for'],
  [
    { wantedKvar: 75, connected: [2, 0], free: [1, 2], mostSwitchings: 2 },
    [1, 1],
    'one out and one in are two switchings',
  ],
  [
    { wantedKvar: 100, connected: [0, 0], free: [3, 2], voltageScale: 0.5 },
    [3, 2],
    'at 71 % of the voltage each gives half',
  ],
  [{ wantedKvar: 80, connected: [1, 1], free: [2, 1], voltageScale: 0 }, [1, 1], 'on a dead bus nothing helps'],
];

const nearestEqual: Row[] = [
  [{ wantedKvar: 60, connected: [0], free: [3] }, [2], '50 is nearer than 75'],
  [{ wantedKvar: 62.5, connected: [0], free: [3] }, [2], 'as near from below, with fewer switchings'],
  [{ wantedKvar: 62.5, connected: [3], free: [0] }, [3], 'as near from above, and there already'],
  [{ wantedKvar: 12.5, connected: [2], free: [1] }, [1], 'as near from above, with fewer switchings'],
  [{ wantedKvar: 75, connected: [0], free: [1] }, [1], 'no more than is free'],
  [{ wantedKvar: -75, connected: [3], free: [0], mostSwitchings: 2 }, [1], 'no more than there is time for'],
  [{ wantedKvar: 1e9, connected: [0], free: [3] }, [3], 'all there is'],
  [{ wantedKvar: 80, connected: [1], free: [2], voltageScale: 0 }, [1], 'on a dead bus nothing helps'],
  [{ wantedKvar: 0, connected: [1], free: [2], voltageScale: 0 }, [1], 'nor if nothing is wanted'],
];

describe('nearest level', () => {
  it.each(nearestMixed)('of two sizes, %j goes to %j: %s', (state, chosen, _why) => {
    expect(decided(nearestLevelInto, MIXED, state)).toEqual(chosen);
  });

  it.each(nearestEqual)('of one size, %j goes to %j: %s', (state, chosen, _why) => {
    expect(decided(nearestLevelInto, EQUAL, state)).toEqual(chosen);
  });

  it('counts what is never switched as connected', () => {
    const withFixed = { ...EQUAL, fixedKvar: 40 };
    expect(decided(nearestLevelInto, withFixed, { wantedKvar: 90, connected: [0], free: [3] })).toEqual([2]);
  });
});

const byOnes: Row[] = [
  [{ wantedKvar: 60, connected: [0, 0], free: [3, 2] }, [1, 0], '50, then 10 are within the threshold'],
  [{ wantedKvar: 70, connected: [0, 0], free: [3, 2] }, [1, 1], '20 are over it, and 25 more leave −5'],
  [{ wantedKvar: 33, connected: [0, 0], free: [3, 2] }, [0, 1], '50 would leave −17, beyond the threshold'],
  [{ wantedKvar: 34, connected: [0, 0], free: [3, 2] }, [1, 0], '50 leaves −16, within it'],
  [{ wantedKvar: 33.75, connected: [0, 0], free: [3, 2] }, [1, 0], 'at the threshold itself the larger may act'],
  [{ wantedKvar: 16.25, connected: [0, 0], free: [3, 2] }, [0, 0], 'at the threshold nothing is wanted'],
  [{ wantedKvar: 170, connected: [0, 0], free: [3, 2] }, [3, 1], 'largest first'],
  [{ wantedKvar: 170, connected: [0, 0], free: [1, 2] }, [1, 2], 'what is free'],
  [{ wantedKvar: 170, connected: [0, 0], free: [3, 2], mostSwitchings: 2 }, [2, 0], 'what there is time for'],
  [{ wantedKvar: 0, connected: [2, 1], free: [1, 1] }, [0, 0], 'largest out first, then the rest'],
  [
    { wantedKvar: 80, connected: [2, 0], free: [1, 2] },
    [2, 0],
    '−20, but 50 out would leave 30: over-corrected it settles',
  ],
  [{ wantedKvar: 80, connected: [1, 2], free: [2, 0] }, [1, 1], '−20: 50 out would leave 30, 25 leave 5'],
  [
    { wantedKvar: 100, connected: [0, 0], free: [3, 2], voltageScale: 0.5 },
    [3, 1],
    'steps of 25 and 12.5 at 71 %, the threshold stays',
  ],
  [{ wantedKvar: 80, connected: [1, 1], free: [2, 1], voltageScale: 0 }, [1, 1], 'on a dead bus none brings anything'],
  [{ wantedKvar: -80, connected: [1, 1], free: [2, 1], voltageScale: 0 }, [1, 1], 'nor does it out of one'],
];

describe('one by one', () => {
  it.each(byOnes)('%j goes to %j: %s', (state, chosen, _why) => {
    expect(decided(oneByOneInto, MIXED, state)).toEqual(chosen);
  });
});
