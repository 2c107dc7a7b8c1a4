import { assessBank, type BankInput, type Result, type Site, UTC_TABLE } from '#libs/engine/index.js';
import { chance } from './chance.js';
import { driftingLoad, madeRecord } from './made-record.js';
import { madeSite } from './made-site.js';
import { SEED } from './soak.js';

/** Twelve days of a drifting load around 300 kW, long enough to be planned on; invented. */
export const RECORD = madeRecord({ ...driftingLoad(chance(SEED), 96, 300, 0.9), intervalS: 10_800 });

/** Two groups with 7 % reactors. */
export const BANK: BankInput = {
  stages: [
    { count: 2, ratedKvar: 25, ratedV: 480, reactorPct: 7 },
    { count: 3, ratedKvar: 50, ratedV: 480, reactorPct: 7 },
  ],
};

/** Drives, and a little background. */
export const LOADS: NonNullable<Site['loads']> = {
  distorting: [{ name: 'drives', fundamentalA: 250, spectrum: 'six-pulse-choke' }],
  backgroundPct: [{ orderH: 5, pct: 1 }],
};

/** The made-up works with this bank and these loads, assessed; parts given replace the plain ones. */
export function assessedSite(parts: Partial<Site> = {}): Result {
  return assessBank(madeSite({ bank: BANK, loads: LOADS, ...parts }), RECORD, UTC_TABLE).result;
}

/** The codes of a result's reasons. */
export function reasonCodes(result: Result): string[] {
  return result.reasons.map(({ code }) => code);
}
