// The stages of a replayed day against the year as simulated: two readings of one switching history.
import { describe, expect, it } from 'vitest';
import { zoneTable } from '#libs/contract/time-zone.js';
import { assessBank, studySite } from '#libs/engine/index.js';
import { dayReplay } from '#libs/present/day-replay.js';
import { madeRecord, madeSite } from '../support/outcome.js';

const BANKS = [
  { name: 'equal stages by turns', stages: [{ count: 4, ratedKvar: 50, ratedV: 480, reactorPct: 7 }] },
  {
    name: 'two sizes',
    stages: [
      { count: 1, ratedKvar: 25, ratedV: 480, reactorPct: 7 },
      { count: 3, ratedKvar: 50, ratedV: 480, reactorPct: 7 },
    ],
  },
  {
    name: 'one that is never switched',
    stages: [
      { count: 1, ratedKvar: 12.5, ratedV: 440, fixed: true },
      { count: 3, ratedKvar: 50, ratedV: 480, reactorPct: 7 },
    ],
  },
];

describe('a day replayed', () => {
  it.each(BANKS)('has in each interval the stages whose kvar the year has connected: $name', ({ stages }) => {
    const record = madeRecord({ days: 21 });
    const site = madeSite({ bank: { stages } });
    const zone = zoneTable(site.timeZone, record.firstS - 86_400, record.endS + 86_400);
    const outcome = assessBank(site, record, zone);
    const study = studySite(site, record, zone);
    let switched = 0;
    for (let day = 1; day < 20; day++) {
      const replay = dayReplay(outcome, study, record.firstS + (day + 0.5) * 86_400);
      expect(replay.atS.length).toBeGreaterThan(90);
      for (const [i, stack] of replay.stacks.entries()) {
        const sum = stack.reduce((total, { kvar }) => total + kvar, 0);
        // the sums are added up in another order: a few roundings of 200 kvar
        expect(Math.abs(sum - replay.connectedKvar[i]!)).toBeLessThan(1e-9);
      }
      for (const { runs, switchings } of replay.stages) {
        const edges = runs.reduce(
          (count, { from, to }) => count + (from > 0 ? 1 : 0) + (to < replay.atS.length ? 1 : 0),
          0,
        );
        expect(switchings).toBe(edges);
        switched += switchings;
      }
    }
    expect(switched).toBeGreaterThan(10);
    expect(switched).toBeLessThanOrEqual(outcome.result.operation.totalSwitchings);
  });
});
