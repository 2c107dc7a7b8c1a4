// Inputs that look like a slip are findings to be accepted and no part of the verdict; each with a control just within.
import { describe, expect, it } from 'vitest';
import { assessBank, type Site, UTC_TABLE } from '#libs/engine/index.js';
import { assessedSite, BANK, LOADS, RECORD, reasonCodes } from '../support/assessed-site.js';
import { chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { SEED } from '../support/soak.js';

const codes = (parts: Partial<Site>) => reasonCodes(assessedSite(parts)).filter((code) => UNUSUAL.has(code));
const UNUSUAL = new Set([
  'target.unusual',
  'target.belowTariff',
  'record.unlikeBills',
  'record.unlikeTotals',
  'site.frequencyUnusual',
  'site.rulesUnusual',
  'bank.ratedVoltageUnusual',
  'bank.aboveLoad',
  'loads.aboveRecord',
  'currentTransformer.unusual',
]);
/** The greatest apparent power of the record, which is metered at the bus [kVA]. */
const LOAD_KVA = Math.max(
  ...Array.from(RECORD.activeKw, (kw, i) => Math.hypot(kw, RECORD.laggingKvar[i]! - RECORD.leadingKvar[i]!)),
);
const LOAD_A = (LOAD_KVA * 1000) / (Math.sqrt(3) * 400);

describe('inputs unlike what is built or agreed', () => {
  it('are silent on a plain site', () => {
    expect(codes({})).toEqual([]);
  });

  it('are told for a target below what tariffs ask for', () => {
    expect(codes({ target: { powerFactor: 0.33 } })).toEqual(['target.unusual']);
    expect(codes({ target: { powerFactor: 0.8 } })).toEqual([]);
  });

  it('are told for a frequency that is not the zone’s, and for rules of the other side of the ocean', () => {
    expect(codes({ timeZone: 'Europe/Dublin', frequencyHz: 60 })).toEqual(['site.frequencyUnusual']);
    expect(codes({ timeZone: 'America/Chicago', frequencyHz: 60, rules: 'ieee' })).toEqual([]);
    expect(codes({ rules: 'ieee' })).toEqual(['site.rulesUnusual']);
  });

  it('are told for capacitors rated far above what they see', () => {
    const rated = (ratedV: number) => codes({ bank: { stages: [{ count: 4, ratedKvar: 50, ratedV }] } });
    expect(rated(601)).toEqual(['bank.ratedVoltageUnusual']);
    expect(rated(600)).toEqual([]);
  });

  it('are told for a bank above the load, and for listed loads above the record', () => {
    const [small, large] = BANK.stages;
    expect(codes({ bank: { ...BANK, stages: [small!, { ...large!, ratedKvar: 500 }] } })).toEqual(['bank.aboveLoad']);
    const drives = (share: number): Site['loads'] => ({
      ...LOADS,
      distorting: [{ name: 'drives', fundamentalA: share * LOAD_A, spectrum: 'six-pulse-choke' }],
    });
    expect(codes({ loads: drives(1.11) })).toEqual(['loads.aboveRecord']);
    expect(codes({ loads: drives(1.09) })).toEqual([]);
    expect(codes({ loads: drives(1.11), supply: { ...SUPPLY, photovoltaicKw: 100 } })).toEqual([]);
  });

  it('are told for a current transformer too small or too large for the load, but for one around the bank alone', () => {
    const ratio = (ratioPrimaryA: number, place: 'incomer' | 'bank' = 'incomer') =>
      codes({ control: { currentTransformer: { place, ratioPrimaryA, ratioSecondaryA: 5 } } });
    expect(ratio(LOAD_A / 1.21)).toEqual(['currentTransformer.unusual']);
    expect(ratio(LOAD_A * 10.1)).toEqual(['currentTransformer.unusual']);
    expect([...ratio(LOAD_A / 1.19), ...ratio(LOAD_A * 9.9), ...ratio(LOAD_A / 1.21, 'bank')]).toEqual([]);
  });

  it('are told for a target that the tariff charges for', () => {
    const charged = (powerFactor: number) =>
      codes({ target: { powerFactor }, tariff: { clauses: [KVARH] }, control: {} });
    // a ratio of 0.5 is 0.8944
    expect(charged(0.885)).toEqual(['target.belowTariff']);
    expect([...charged(0.89), ...charged(0.95)]).toEqual([]);
  });

  it('are told for a record and bills that differ, where a month is there to compare', () => {
    const year = madeRecord({ ...driftingLoad(chance(SEED), 60 * 8, 300, 0.9), intervalS: 10_800 });
    const judged = (parts: Partial<Site>, record = year) => {
      const site = madeSite({ bank: BANK, loads: LOADS, ...parts });
      return assessBank(site, record, UTC_TABLE).result;
    };
    const first = judged({}).requirement.months.find((_, m) => m === 1)!;
    const bill = (factor: number, month = first.month) => {
      const { activeKwh, laggingKvarh } = first;
      return { estimate: { bills: [{ month, activeKwh: activeKwh * factor, laggingKvarh, maxKw: first.maxKw }] } };
    };
    const told = (parts: Partial<Site>, record = year) =>
      reasonCodes(judged(parts, record)).filter((code) => UNUSUAL.has(code));
    expect(told(bill(0.95))).toEqual(['record.unlikeBills']);
    expect(told(bill(1.06))).toEqual(['record.unlikeBills']);
    expect([...told(bill(0.96)), ...told(bill(1.04))]).toEqual([]);
    // a month the record has only a part of says nothing
    expect(told(bill(0.5, '2031-01'))).toEqual([]);
    expect(reasonCodes(assessedSite(bill(0.5))).filter((code) => UNUSUAL.has(code))).toEqual([]);
    const energy = { name: 'energy', kind: 'energy' as const, pricePerUnit: 0.1 };
    const billed = (total: number) => ({
      tariff: { clauses: [energy], billed: [{ month: first.month, total }] },
    });
    expect(told(billed(0.1 * first.activeKwh * 0.8))).toEqual(['record.unlikeTotals']);
    expect([...told(billed(0.1 * first.activeKwh * 0.85)), ...told(billed(0.1 * first.activeKwh * 1.2))]).toEqual([]);
  });

  it('leave the verdict as it is', () => {
    const unusual = assessedSite({ control: { currentTransformer: { ratioPrimaryA: 1, ratioSecondaryA: 5 } } });
    const fitting = assessedSite({ control: { currentTransformer: { ratioPrimaryA: LOAD_A, ratioSecondaryA: 5 } } });
    expect(unusual.verdict).toBe(fitting.verdict);
    expect(unusual.duties).toEqual(fitting.duties);
  });
});

const KVARH = { name: 'kvarh', kind: 'kvarhBeyondRatio' as const, freeRatio: 0.5, pricePerUnit: 0.01 };

const SUPPLY: Site['supply'] = {
  faultLevelMva: { max: 250, min: 180 },
  transformers: [{ ratedKva: 1000, impedancePct: 6, loadLossKw: 10.5, noLoadLossKw: 1.7, noLoadCurrentPct: 1.2 }],
};
