import { describe, expect, it } from 'vitest';
import { zoneTable } from '#libs/contract/time-zone.js';
import { assessBank, type Site } from '#libs/engine/index.js';
import { MADE_BANK, madeRecord, madeSite } from '../../../test/support/outcome.js';
import { fullLook, quickLook } from './compute-look.js';
import { StudyCache } from './study-cache.js';

const RECORD = madeRecord({ days: 40 });
const ZONE = zoneTable('Europe/Dublin', RECORD.firstS - 86_400, RECORD.endS + 86_400);
const FIRST = madeSite({ bank: MADE_BANK });

/** What the hand may change, one after the other on one cache. */
const MOVES: [name: string, site: Site][] = [
  [
    'a stage more',
    madeSite({ bank: { stages: MADE_BANK!.stages.map((group) => ({ ...group, count: group.count + 1 })) } }),
  ],
  ['another ratio', madeSite({ bank: { stages: MADE_BANK!.stages.map((group) => ({ ...group, reactorPct: 14 })) } })],
  ['another target', madeSite({ bank: MADE_BANK, target: { powerFactor: 0.9 } })],
  ['target and export', madeSite({ bank: MADE_BANK, target: { powerFactor: 0.97, onExport: 'absolute' } })],
  ['another set point', madeSite({ bank: MADE_BANK, control: { setPointPowerFactor: 0.99 } })],
  ['back to the first', FIRST],
];

describe('what follows the hand', () => {
  const cache = new StudyCache(RECORD, ZONE);
  const { outcome: last } = fullLook(cache, FIRST);

  it.each(MOVES)('says to the last digit what the full judgement says: %s', (_, site) => {
    const quick = quickLook(cache, site, last).outcome;
    const full = assessBank(site, RECORD, ZONE);
    for (const part of ['requirement', 'bank', 'control', 'operation'] as const) {
      expect(quick.result[part], part).toEqual(full.result[part]);
    }
    expect(quick.series).toEqual(full.series);
    expect(quick.margins).toEqual(full.margins);
  });

  it('is never graver than the full judgement, which adds the peaks of |Z|', () => {
    const order = ['clear', 'watch', 'avoid'];
    for (const [, site] of MOVES) {
      const quick = quickLook(cache, site, last).outcome.result.verdict;
      const full = assessBank(site, RECORD, ZONE).result.verdict;
      expect(order.indexOf(quick)).toBeLessThanOrEqual(order.indexOf(full));
    }
  });

  it('tables the need over the target as the engine computes it at each', () => {
    const sweep = cache.sweep(cache.of(FIRST));
    for (const at of [0, 12, 30]) {
      const site = madeSite({ bank: MADE_BANK, target: { powerFactor: sweep.powerFactors[at]! } });
      const { requirement } = assessBank(site, RECORD, ZONE).result;
      expect(sweep.maxKvar[at]).toBe(requirement.maxKvar);
      expect(sweep.p95Kvar[at]).toBe(requirement.p95Kvar);
    }
  });
});
