// Second method: the network as one series impedance and the stages as impedances beside it, in complex arithmetic of the
// test's own, from the site's numbers. That a bank should leave 80 % of a signal is common practice.
import { describe, expect, it } from 'vitest';
import {
  networkScene,
  planBank,
  type ReactorTrial,
  rippleShare,
  type Site,
  TRIED_REACTOR_PCT,
  UTC_TABLE,
  withRobustness,
} from '#libs/engine/index.js';
import { type TrialTable, trialReason, trialTable } from '#libs/present/trial-rows.js';
import { assessedSite, BANK, LOADS, RECORD, reasonCodes } from '../support/assessed-site.js';
import { Complex } from '../support/complex.js';
import { madeSite } from '../support/made-site.js';

const U = 400;
const F = 50;
const QUALITY = 30;

// A supply without a transformer, nothing that damps, four stages of one ratio.
const bare = (reactorPct: number): Site =>
  madeSite({
    supply: { faultLevelMva: { max: 20, min: 12 }, rOverX: 0.2 },
    loads: { distorting: [], backgroundPct: [], dampingKw: { max: 0, min: 0 } },
    bank: { stages: [{ count: 4, ratedKvar: 50, ratedV: 480, reactorPct, reactorQuality: QUALITY }] },
  });

// Least share over levels and corners by the divider of series impedances.
function leastByDivider(reactorPct: number, h: number): number {
  const shares: number[] = [];
  const grown = Math.sqrt(h);
  for (const mva of [20, 12]) {
    const x = U ** 2 / (mva * 1e6) / Math.sqrt(1 + 0.2 ** 2);
    const supply = new Complex(0.2 * x * grown, x * h);
    for (const [c, l] of [[1, 1], ...[0.95, 1.1].flatMap((of) => [0.97, 1.03].map((k) => [of, k]))] as [
      number,
      number,
    ][]) {
      const xc = 480 ** 2 / 50_000;
      const xl = (reactorPct / 100) * xc;
      const stage = new Complex((xl / QUALITY) * grown, h * xl * l - xc / c / h);
      for (let n = 1; n <= 4; n++) {
        const bank = stage.times(1 / n);
        shares.push(bank.over(bank.plus(supply)).size);
      }
    }
  }
  return Math.min(...shares);
}

describe('a ripple-control signal', () => {
  it.each([
    [7, 183.3],
    [7, 216.7],
    [14, 216.7],
    [5.67, 1050],
    [0, 1350],
  ])('with %d %% reactors and at %d Hz is left as the divider of impedances says', (reactorPct, rippleHz) => {
    const { model, bank, levels } = networkScene(bare(reactorPct));
    const found = rippleShare(model, bank, levels, rippleHz / F)!;
    expect(found.share / leastByDivider(reactorPct, rippleHz / F)).toBeCloseTo(1, 9);
    expect(found.levelKvar).toBeGreaterThan(0);
  });

  it('that the bank takes up is a reason and no better than near a limit; far from it nothing is said', () => {
    const at = (rippleHz: number | null) => assessedSite({ supply: { ...madeSite().supply, rippleHz } });
    const taken = at(183.3);
    expect(reasonCodes(taken)).toContain('ripple.absorbed');
    expect(taken.verdict).not.toBe('clear');
    for (const quiet of [at(1050), at(null)]) {
      expect(reasonCodes(quiet)).not.toContain('ripple.absorbed');
      expect(quiet.verdict).toBe('clear');
    }
  });

  it('decides between ratios: a plan leaves the one that takes it up, and the table says why', () => {
    const site = (rippleHz: number | null): Site =>
      madeSite({ loads: LOADS, supply: { ...madeSite().supply, rippleHz }, catalogue: { stageKvar: [25, 50] } });
    const quiet = planBank(site(null), RECORD, UTC_TABLE);
    const ownPct = quiet.bank.groups[0]!.reactorPct;
    expect(ownPct).toBeGreaterThan(0);
    // on the tuned frequency of what would be chosen without a signal
    const spoken = planBank(site(F / Math.sqrt(ownPct / 100)), RECORD, UTC_TABLE);
    expect(spoken.bank.groups[0]!.reactorPct).not.toBe(ownPct);
    expect(reasonCodes(spoken.result)).not.toContain('ripple.absorbed');
    const trials = withRobustness(spoken).result.reactorTrials;
    const lost = trials.find(({ reactorPct }) => reactorPct === ownPct)!;
    expect(lost).toMatchObject({ why: 'ripple', verdict: 'watch' });
    expect(lost.rippleShare!).toBeLessThan(0.8);
    expect(trialReason(lost)).toMatch(/^leaves \d+\s% of the ripple signal$/u);
  }, 60_000);
});

describe('the table of reactor ratios', () => {
  const outcome = planBank(madeSite({ loads: LOADS, catalogue: { stageKvar: [25, 50] } }), RECORD, UTC_TABLE);
  const trials: readonly ReactorTrial[] = withRobustness(outcome).result.reactorTrials;

  it('has every customary ratio and one filter, each with its reason', () => {
    for (const pct of TRIED_REACTOR_PCT) expect(trials.map(({ reactorPct }) => reactorPct)).toContain(pct);
    const filters = trials.filter(({ filter }) => filter);
    // the greatest current of a six-pulse drive is the 5th: 0.94 · 5 = 4.7
    expect(filters.map(({ tunedOrderH }) => tunedOrderH)).toEqual([expect.closeTo(4.7, 9)]);
    expect(filters[0]!.stageA!).toBeGreaterThan(1.2 * trials.find(({ chosen }) => chosen)!.stageA!);
    expect(filters[0]!.reactorQuality).toBe(QUALITY);
    expect(trials.filter(({ why }) => why === 'chosen').map(({ chosen }) => chosen)).toEqual([true]);
  });

  it('gives reasons that its own numbers bear out', () => {
    const own = trials.find(({ chosen }) => chosen)!;
    for (const { why, verdict, worstRatio, effectiveKvar, nearPeakH, nearOrderH } of trials) {
      if (why === 'chosen') continue;
      expect(verdict === 'avoid', why).toBe(why === 'overLimit');
      expect(verdict === 'clear', why).toBe(why === 'givesLess' || why === 'takesMore');
      if (why === 'overLimit') expect(worstRatio!).toBeGreaterThan(1);
      if (why === 'givesLess') expect(effectiveKvar).toBeLessThan(own.effectiveKvar);
      if (why === 'nearPeak') expect(Math.abs(nearPeakH! - nearOrderH!)).toBeLessThanOrEqual(0.3);
    }
    expect(new Set(trials.map(({ why }) => why)).size).toBeGreaterThan(2);
  });

  it('is a row of words a ratio', () => {
    const { rows } = trialTable(trials, '');
    expect(rows).toHaveLength(trials.length);
    expect(rows.flat().filter((cell) => cell === '' || /NaN|undefined|null/.test(cell))).toEqual([]);
  });

  it('tells cost and ripple signal where one row has them, and no column of dashes where none has', () => {
    const [first, ...others] = trials.map((trial) => ({ ...trial, capital: null, rippleShare: null }));
    const heads = (table: TrialTable) => table.columns.map(({ head }) => head);
    const bare = heads(trialTable([first!, ...others], 'EUR'));
    const full = trialTable([{ ...first!, capital: 12_345.6, rippleShare: 0.5 }, ...others], 'EUR');
    expect(heads(full).filter((head) => !bare.includes(head))).toEqual(['ripple left', 'costs new, EUR']);
    expect(full.rows[0]!.join(' ').replaceAll('\u00a0', ' ')).toMatch(/ 50\.0 % 12 346 /);
    expect(full.rows[1]!.slice(5, 7)).toEqual(['–', '–']);
  });

  it('is not made where a group has a ratio of its own', () => {
    const mixed = { stages: [...BANK.stages, { count: 1, ratedKvar: 25, ratedV: 480 }] };
    expect(assessedSite({ bank: mixed }).reactorTrials).toEqual([]);
  });
});
