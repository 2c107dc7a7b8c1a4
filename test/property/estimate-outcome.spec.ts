// A plan without a record: what it may say and what it must not. Figures are worked out again by an evaluator of its own;
// bills by hand from month totals.
import { describe, expect, it } from 'vitest';
import { estimateZone } from '#libs/contract/estimate-zone.js';
import {
  assessBank,
  assessEstimate,
  type EstimateInput,
  type EstimateOutcome,
  InputProblem,
  planEstimate,
  type Site,
  UTC_TABLE,
  withRobustness,
} from '#libs/engine/index.js';
import { findings } from '#libs/present/findings.js';
import { messageOf } from '#libs/present/remark-words.js';
import { putEstimateInWords } from '#libs/present/put-in-words.js';
import { estimateReport } from '#libs/present/terminal-report.js';
import { evaluateFormula } from '../support/evaluate-formula.js';
import { madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';

const MONTHS = ['2025-01', '2025-02', '2025-03'];
const BILLS: EstimateInput['bills'] = MONTHS.map((month, k) => ({
  month,
  activeKwh: 100_000,
  laggingKvarh: 60_000 + 5000 * k,
  maxKw: 300,
}));
const EQUIPMENT: EstimateInput['equipment'] = [
  { name: 'presses', count: 6, ratedKw: 37, efficiencyPct: 92, powerFactor: 0.78, loadFactor: 0.8 },
  { name: 'heaters', ratedKw: 60, efficiencyPct: 100, powerFactor: 1 },
];
const BANK: Site['bank'] = { stages: [{ count: 4, ratedKvar: 25, ratedV: 480, reactorPct: 7 }] };

function planned(estimate: EstimateInput, parts: Partial<Site> = {}): EstimateOutcome {
  const site = madeSite({ target: { powerFactor: 0.95 }, ...parts, estimate });
  return planEstimate(site, estimateZone(site));
}

function assessed(estimate: EstimateInput, parts: Partial<Site> = {}): EstimateOutcome {
  const site = madeSite({ target: { powerFactor: 0.95 }, bank: BANK, ...parts, estimate });
  return assessEstimate(site, estimateZone(site));
}

const codes = ({ result }: EstimateOutcome): string[] => result.reasons.map(({ code }) => code);
const OUTCOMES: [string, () => EstimateOutcome][] = [
  ['bills', () => planned({ bills: BILLS! })],
  ['an equipment list', () => planned({ equipment: EQUIPMENT! })],
  ['both', () => planned({ bills: BILLS!, equipment: EQUIPMENT! })],
  ['bills with an old bank', () => planned({ bills: BILLS! }, { recordedBank: { state: 'fixed', kvar: 40 } })],
  ['bills in kVA', () => planned({ bills: BILLS!.map(({ maxKw: _, ...bill }) => ({ ...bill, maxKva: 360 })) })],
  ['bills in kW and kVA', () => planned({ bills: BILLS!.map((bill) => ({ ...bill, maxKva: 380 })) })],
  ['a list metered at the primary', () => planned({ equipment: EQUIPMENT! }, { meteredAt: 'primary' })],
  ['a month that needs nothing', () => planned({ bills: [{ ...BILLS![0]!, laggingKvarh: 10_000 }] })],
  ['the site’s own bank', () => assessed({ bills: BILLS! })],
  [
    'the site’s own bank over a limit',
    () => assessed({ bills: BILLS! }, { bank: { stages: [{ count: 2, ratedKvar: 50, ratedV: 400, reactorPct: 7 }] } }),
  ],
  ['unknown loads', () => planned({ bills: BILLS! }, { loads: {} })],
  [
    'the other rules',
    () =>
      planned(
        { bills: BILLS! },
        {
          rules: 'ieee',
          loads: { distorting: [{ name: 'drives', fundamentalA: 100, spectrum: 'six-pulse' }], backgroundPct: [] },
        },
      ),
  ],
];

describe.each(OUTCOMES)('an estimate from %s', (name, make) => {
  const outcome = make();
  const { result } = outcome;

  it('has no record, no operation and no statistics of intervals, and is never better than near a limit', () => {
    expect(result.record).toBeNull();
    expect(result.operation).toBeNull();
    const { maxKvar, p99Kvar, p95Kvar, p50Kvar, meanKvar, intervalsInNeed } = result.requirement;
    expect([maxKvar, p99Kvar, p95Kvar, p50Kvar, meanKvar, intervalsInNeed]).toEqual(Array(6).fill(null));
    expect(result.verdict).not.toBe('clear');
    expect(codes(outcome)).toContain('estimate.basis');
    expect(result.assumptions.map(({ code }) => code)).toContain('estimate.labelled');
    expect(result.cautions.map(({ code }) => code)).toContain('caution.estimate');
  });

  it('names what it can’t support', () => {
    const refused = result.estimate.refused.map(({ code }) => code);
    expect(refused).toEqual(expect.arrayContaining(['estimate.noDuration', 'estimate.noReplay', 'estimate.noLeading']));
    const isBank = result.bank.stages.length > 0;
    expect(refused.includes('estimate.noSwitchings')).toBe(isBank);
    expect(refused.includes('estimate.noSetPoint')).toBe(isBank);
  });

  it('has figures that are their formulas with the inputs put in, the estimated ones called so', () => {
    const words = putEstimateInWords(result);
    expect(words.figures.length).toBeGreaterThan(0);
    for (const { id, label, value, formula, inputs } of words.figures) {
      const found = evaluateFormula(formula, new Map(inputs.map((input) => [input.symbol, input.value])));
      expect({ id, close: Math.abs(found.value - value) <= 1e-9 * Math.max(1, Math.abs(value)) }).toEqual({
        id,
        close: true,
      });
      expect([...found.used].sort()).toEqual(inputs.map(({ symbol }) => symbol).sort());
      expect(label).not.toBe(id);
      if (id.startsWith('estimate.')) expect(label).toMatch(/estimated/);
    }
  });

  it('reads as an estimate at a terminal, every code with its sentence', () => {
    const told = { ...outcome, result: putEstimateInWords(result) };
    // A bank that stands is judged, and one the tool laid out is proposed.
    const head = name.includes('own bank') ? 'Judged' : 'Proposed';
    const lines = estimateReport(told).split('\n');
    expect(lines[1]).toBe('ESTIMATE, without a meter’s record');
    expect(lines[2]).toMatch(new RegExp(`^${head}, estimate: `));
    expect(findings(told).length).toBeGreaterThan(0);
    for (const { code } of [...result.reasons, ...result.assumptions, ...result.cautions, ...result.estimate.refused]) {
      expect({ code, said: messageOf(code) !== null }).toEqual({ code, said: true });
    }
    expect(JSON.stringify(result)).not.toMatch(/NaN|Infinity/);
  });
});

describe('a bank against the bounds', () => {
  const withKvar = (count: number) => ({ stages: [{ count, ratedKvar: 10, ratedV: 400 }] });
  // March: (70 000 − 32 868)/744, at least 49.9 kvar; 300·(0.7 − 0.3287), at most 111.4 kvar.
  it.each([
    [4, 'estimate.belowLower'],
    [5, 'estimate.betweenBounds'],
    [11, 'estimate.betweenBounds'],
    [12, 'estimate.coversUpper'],
  ])('%d stages of 10 kvar: %s', (count, code) => {
    const outcome = assessed({ bills: BILLS! }, { bank: withKvar(count) });
    expect(codes(outcome).filter((one) => /below|between|covers/.test(one))).toEqual([code]);
  });

  it('a bank over a limit stays over it: an estimate makes nothing milder', () => {
    const site = { bank: { stages: [{ count: 2, ratedKvar: 50, ratedV: 400, reactorPct: 7 }] } };
    expect(assessed({ bills: BILLS! }, site).result.verdict).toBe('avoid');
  });

  it('ranges of the verdict are computed on the same network', () => {
    expect(withRobustness(planned({ bills: BILLS! })).result.robustness).not.toBeNull();
  });

  it('a catalogue that ends below the need gives its largest, and says so', () => {
    const outcome = planned({ bills: BILLS! }, { catalogue: { stageKvar: [5], maxStages: 4 } });
    expect(codes(outcome)).toEqual(expect.arrayContaining(['estimate.needOutOfReach', 'estimate.belowLower']));
    expect(outcome.result.bank.stages).toHaveLength(4);
  });
});

describe('bills and list side by side', () => {
  // 6·37/0.92·0.8 + 60 = 253 kW and 154.9 kvar, against 300 kW and 195 kvar in the month of greatest demand, the first.
  it('within a quarter of each other there is nothing to say', () => {
    const outcome = planned({ bills: BILLS!, equipment: EQUIPMENT! });
    expect(outcome.result.estimate.compared).toMatchObject({ month: '2025-01', billedKw: 300, billedKvar: 180 });
    expect(outcome.result.estimate.compared?.listedKw).toBeCloseTo(253.04, 2);
    expect(codes(outcome).filter((code) => code.endsWith('Disagree'))).toEqual([]);
  });

  it('a list that leaves half out is found, and the bank keeps to the bills', () => {
    const outcome = planned({ bills: BILLS!, equipment: [EQUIPMENT![1]!] });
    expect(codes(outcome)).toEqual(expect.arrayContaining(['estimate.kwDisagree', 'estimate.kvarDisagree']));
    expect(outcome.result.requirement.sizedKvar).toBe(outcome.result.requirement.upperKvar);
  });
});

describe('bills of an estimate', () => {
  const clauses = [
    { name: 'standing', kind: 'fixed', amountPerMonth: 50 },
    { name: 'energy', kind: 'energy', pricePerUnit: 0.1 },
    { name: 'reactive', kind: 'kvarhBeyondRatio', freeRatio: 0.4, pricePerUnit: 0.02 },
    { name: 'demand', kind: 'demand', basis: 'kW', pricePerUnit: 5 },
  ] as const satisfies NonNullable<Site['tariff']>['clauses'];
  const withTariff = (tariff: NonNullable<Site['tariff']>) => planned({ bills: BILLS! }, { tariff }).result;

  // Before: 50 + 10 000 + (20 000, 25 000, 30 000 over 0.4)·0.02 + 1 500. A bank of over 111 kvar can take
  // 111·672 kvarh off and more in every month, so the target’s 32 868 kvarh are left, under 0.4 · 100 000.
  it('are those of the month totals before, and of the target after', () => {
    const money = withTariff({ clauses: [...clauses] }).money!;
    expect(money.bills.before.months.map(({ total }) => total)).toEqual([11_950, 12_050, 12_150]);
    expect(money.bills.after.months.map(({ total }) => total)).toEqual([11_550, 11_550, 11_550]);
    expect(money.bills.after.months[0]!.quantities.laggingKvarh).toBeCloseTo(32_868, 0);
    expect(money.bills.before.months[0]!.quantities.maxKva).toBeNull();
  });

  it('a bank that can’t hold the target takes off no more than it gives', () => {
    const tariff = { clauses: [clauses[2]] };
    const bank = { stages: [{ count: 1, ratedKvar: 10, ratedV: 400 }] };
    const money = assessed({ bills: BILLS! }, { tariff, bank }).result.money!;
    // 10 kvar over 744 h: 7 440 of the 20 000 kvarh.
    expect(money.bills.after.months[0]!.total).toBeCloseTo((20_000 - 7440) * 0.02, 2);
  });

  it.each([
    [
      'a window',
      {
        clauses: [{ ...clauses[1], windows: ['peak'] }],
        windows: [{ name: 'peak', hours: [[8, 20]] as [number, number][] }],
      },
    ],
    ['kVA', { clauses: [{ name: 'kVA', kind: 'demand' as const, basis: 'kVA' as const, pricePerUnit: 5 }] }],
    ['days', { clauses: [{ ...clauses[2], per: 'day' as const }] }],
    ['a formula of kvar', { clauses: [{ name: 'f', kind: 'formula' as const, expression: 'maxKvar * 2' }] }],
  ])('with %s there is none, and the clause is named', (_name, tariff) => {
    const result = withTariff(tariff);
    expect(result.money).toBeNull();
    const reason = result.estimate.refused.find(({ code }) => code === 'estimate.noBillsByClause');
    expect(reason?.values.clauses).toBe(tariff.clauses[0]!.name);
  });

  it('with a month missing between the bills there is none', () => {
    const outcome = planned({ bills: [BILLS![0]!, BILLS![2]!] }, { tariff: { clauses: [...clauses] } });
    expect(outcome.result.estimate.refused.map(({ code }) => code)).toContain('estimate.noBillsByMonths');
  });
});

describe('a record and an estimate', () => {
  it('the record wins, and the plan says that the estimate was not used', () => {
    const site = madeSite({ bank: BANK, estimate: { bills: BILLS! } });
    const record = madeRecord({ activeKw: [100, 120, 80], reactiveKvar: [80, 90, 60] });
    const { result } = assessBank(site, record, UTC_TABLE);
    expect(result.record.intervals).toBe(3);
    expect(result.assumptions.map(({ code }) => code)).toContain('estimate.recordWins');
  });

  it('bills of a site whose old bank is only logged are refused: they have no such column', () => {
    const estimate = { bills: BILLS! };
    expect(() => planned(estimate, { recordedBank: { state: 'logged' } })).toThrow(InputProblem);
    expect(() => planned(estimate, { recordedBank: { state: 'logged' } })).toThrow(/recordedBank\.state/);
  });
});
