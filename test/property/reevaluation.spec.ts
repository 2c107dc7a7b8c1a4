// A bank judged again on invented sites: metamorphic laws, and the least stages out by trying every choice.
import { describe, expect, it } from 'vitest';
import {
  assessBank,
  type BankInput,
  bankTonight,
  groundOf,
  leastStagesOut,
  likeTerms,
  reevaluateBank,
  type Site,
  type SiteThen,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { stagesOutWords, tonightSentences } from '#libs/present/tonight-words.js';
import { chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { runs, SEED } from '../support/soak.js';

const RECORD = madeRecord({ ...driftingLoad(chance(SEED), 28 * 24, 300, 0.8), intervalS: 3600 });
const DRIVES: NonNullable<Site['loads']> = {
  distorting: [{ name: 'drives', fundamentalA: 260, spectrum: 'six-pulse-choke' }],
  backgroundPct: [{ orderH: 5, pct: 1 }],
};
const STRONG: NonNullable<Site['loads']> = {
  distorting: [{ name: 'drives', fundamentalA: 160, spectrum: 'six-pulse-choke' }],
  backgroundPct: [{ orderH: 5, pct: 3 }],
};
const WEAK: NonNullable<Site['loads']> = {
  distorting: [{ name: 'drives', fundamentalA: 40, spectrum: 'six-pulse-choke' }],
  backgroundPct: [{ orderH: 5, pct: 1 }],
};
const TUNED: BankInput = { stages: [{ count: 5, ratedKvar: 50, ratedV: 525, reactorPct: 7 }], installed: true };
const PLAIN: BankInput = { stages: [{ count: 4, ratedKvar: 50, ratedV: 440 }], installed: true };

/** Steered above the target, so that the dead band does not leave a month below it. */
const CONTROL = { setPointPowerFactor: 0.98 };

function then(parts: Partial<Site>, record = RECORD): SiteThen {
  return { site: madeSite({ asOf: '2025-06-30', control: CONTROL, ...parts }), record, zone: UTC_TABLE };
}

const ids = (of: { id: string }[]): string[] => [...new Set(of.map(({ id }) => id))];

describe('a bank judged again', () => {
  it('reports nothing where nothing changed', () => {
    const one = then({ bank: TUNED, loads: DRIVES });
    const { reevaluation, before, after } = reevaluateBank(one, { ...one, site: { ...one.site, asOf: '2025-12-31' } });
    expect(reevaluation).toMatchObject({
      inputs: [],
      newRecord: false,
      changes: [],
      tonight: null,
      since: null,
      records: null,
    });
    expect(after.result.duties).toEqual(before.result.duties);
    expect(reevaluation.remedies).toEqual([]);
  });

  it('tells what a lost stage costs, and that putting it back mends it', () => {
    const lost = { ...TUNED, stages: [{ ...TUNED.stages[0]!, count: 2 }] };
    const { reevaluation } = reevaluateBank(then({ bank: TUNED, loads: DRIVES }), then({ bank: lost, loads: DRIVES }));
    expect(reevaluation.inputs).toEqual([{ path: 'bank.stages[0].count', before: 5, after: 2 }]);
    const kvar = reevaluation.changes.find(({ id }) => id === 'bank.effectiveKvar')!;
    expect(Number(kvar.after) / Number(kvar.before)).toBeCloseTo(0.4, 12);
    expect(ids(reevaluation.changes)).toContain('operation.lowestPowerFactor');
    expect(ids(reevaluation.changes)).not.toContain('need.maxKvar');
    const restored = reevaluation.remedies.find(({ kind }) => kind === 'restore')!;
    expect(restored).toMatchObject({ stages: 3, mends: true, ratedKvar: 50, reactorPct: 7 });
    const whole = assessBank(madeSite({ bank: TUNED, loads: DRIVES }), RECORD, UTC_TABLE).result;
    expect(restored.effectiveKvar).toBeCloseTo(whole.bank.effectiveKvar, 9);
    expect(reevaluation.remedies[0]!.mends).toBe(true);
  });

  it('counts a stage as it measures, and replacing it as new', () => {
    const low = (stage: number) => ({ stage, date: '2025-05-01', terminalUf: UF, connection: 'delta' as const });
    const aged = { ...TUNED, stages: [{ ...TUNED.stages[0]!, measurements: [1, 2, 3, 4].map(low) }] };
    const { reevaluation } = reevaluateBank(then({ bank: TUNED, loads: DRIVES }), then({ bank: aged, loads: DRIVES }));
    const kvar = reevaluation.changes.find(({ id }) => id === 'bank.effectiveKvar')!;
    // Four of five stages at six tenths: Q falls with C, and 1/(1 − p) with it.
    const left = (0.6 * 0.93) / (1 - 0.042);
    expect(Number(kvar.after) / Number(kvar.before)).toBeCloseTo((1 + 4 * left) / 5, 9);
    expect(reevaluation.stages.map(({ group, stage, count }) => [group, stage, count])).toEqual([
      [0, null, 1],
      [0, 1, 1],
      [0, 2, 1],
      [0, 3, 1],
      [0, 4, 1],
    ]);
    expect(reevaluation.remedies.some(({ kind, mends }) => kind === 'replace' && mends)).toBe(true);
  });

  it('says first which stages to keep out where the bank is over a limit', () => {
    const { reevaluation } = reevaluateBank(
      then({ bank: PLAIN, loads: { distorting: [], backgroundPct: [] } }),
      then({ bank: PLAIN, loads: DRIVES }),
    );
    expect(reevaluation.verdict.after).toBe('avoid');
    expect(reevaluation.tonight!.within.stagesOut).toBeGreaterThan(0);
    expect(reevaluation.tonight!.until.length).toBeGreaterThan(0);
    const detuned = reevaluation.remedies.find(({ kind }) => kind === 'detune')!;
    expect(detuned).toMatchObject({ verdict: 'clear', mends: true });
    expect(detuned.effectiveKvar).toBeCloseTo(4 * 50 * (400 / 440) ** 2, 6);
    expect(ids(reevaluation.changes)).toContain('network.voltageDistortionPct');
  });

  it('says the same first where it is judged by itself, and nothing where it is within limits', () => {
    const now = then({ bank: PLAIN, loads: DRIVES });
    const { reevaluation } = reevaluateBank(then({ bank: PLAIN, loads: { distorting: [], backgroundPct: [] } }), now);
    const alone = bankTonight(assessBank(now.site, now.record, now.zone), now.site);
    expect(alone).toEqual({ tonight: reevaluation.tonight, stages: reevaluation.stages });
    const { site, record, zone } = then({ bank: TUNED, loads: DRIVES });
    expect(tonightSentences(bankTonight(assessBank(site, record, zone), site))).toEqual([]);
  });

  it('does not lay to age what is over its limit as it stands', () => {
    const said = (loads: Site['loads']) => {
      const { site, record, zone } = then({ bank: PLAIN, loads });
      return assessBank(site, record, zone).result.reasons.map(({ code }) => code);
    };
    expect(said(DRIVES)).toContain('limit.exceeded');
    expect(said(DRIVES)).not.toContain('ageing.overLimit');
  });

  it('tells the limit that age passes where another is passed already', () => {
    const judged = (dischargeOhm: number) => {
      const bank = { stages: [{ ...TUNED.stages[0]!, reactorPct: 5.67, dischargeOhm }], installed: true };
      const { site, record, zone } = then({ bank, loads: STRONG });
      return assessBank(site, record, zone).result;
    };
    const [sound, over] = [judged(10_000), judged(10_000_000)];
    const aged = sound.reasons.filter(({ code }) => code === 'ageing.overLimit');
    expect([sound.verdict, aged.map(({ values }) => values.duty)]).toEqual([
      'clear',
      ['capacitor current', 'capacitor current'],
    ]);
    expect(over.duties.filter(({ verdict }) => verdict === 'avoid').map(({ name }) => name)).toEqual(['discharge']);
    expect(over.reasons.filter(({ code }) => code === 'ageing.overLimit')).toEqual(aged);
  });

  it('keeps stages out by the nameplate where what was measured is within limits', () => {
    const low = (stage: number) => ({ stage, date: '2025-05-01', terminalUf: UF, connection: 'delta' as const });
    const judged = (measurements: ReturnType<typeof low>[]) => {
      const bank = { stages: [{ ...PLAIN.stages[0]!, count: 1, measurements }], installed: true };
      const { site, record, zone } = then({ bank, loads: WEAK });
      return { tonight: bankTonight(assessBank(site, record, zone), site).tonight };
    };
    expect(judged([]).tonight).not.toBeNull();
    expect(judged([low(1)])).toEqual(judged([]));
  });
});

describe('the stages to keep out, in words', () => {
  const entry = (group: number, stage: number | null, count: number, ratedKvar = 50) => ({
    ...{ group, stage, count, ratedKvar },
  });
  const stages = [entry(0, null, 1, 25), entry(1, null, 3), entry(1, 2, 1, 34.5), entry(2, null, 2)];

  it.each([
    [[0, 0, 1, 0], 'stage 2 of group 2 (34.5 kvar as it measures)'],
    [[0, 3, 0, 0], 'stages 1, 3 and 4 of group 2 (50.0 kvar each)'],
    [[0, 2, 0, 0], 'two of stages 1, 3 and 4 of group 2 (50.0 kvar each)'],
    [[1, 0, 0, 1], 'the stage of group 1 (25.0 kvar) and one of the two stages of group 3 (50.0 kvar each)'],
    [[0, 0, 0, 2], 'both stages of group 3 (50.0 kvar each)'],
    [[1, 3, 1, 2], 'the whole bank, all seven stages'],
    [[0, 0, 0, 0], 'nothing'],
  ])('are told by the numbers they have on site: %j', (out, said) => {
    expect(stagesOutWords(out, stages).replaceAll('\u2009', ' ').replaceAll('\u00a0', ' ')).toBe(said);
  });
});

describe('the least stages to keep out', () => {
  const random = chance(SEED + 5);
  const cases = Array.from({ length: runs(4, 60) }, (_, k) => {
    const ratedV = random.oneOf([400, 440, 525]);
    const group = () => ({
      count: random.whole(1, 3),
      ratedKvar: random.oneOf([12.5, 25, 50, 75]),
      ratedV,
      reactorPct: random.oneOf([0, 0, 7]),
    });
    const fundamentalA = random.between(60, 300);
    return { k, bank: { stages: [group(), group()] } as BankInput, fundamentalA };
  });

  it.each(cases)('are those of every choice tried, case $k', ({ bank, fundamentalA }) => {
    const loads = { ...DRIVES, distorting: [{ ...DRIVES.distorting![0]!, fundamentalA }] };
    const site = madeSite({ bank, loads });
    const found = leastStagesOut(groundOf(site, RECORD, UTC_TABLE), bank, 'clear');
    const choices = everyChoice(bank).filter((kept) => {
      const stages = bank.stages.flatMap((stage, g) => (kept[g]! > 0 ? [{ ...stage, count: kept[g]! }] : []));
      if (stages.length === 0) return true;
      const { duties, reasons } = assessBank(madeSite({ bank: { stages }, loads }), RECORD, UTC_TABLE).result;
      const near = reasons.some(({ code }) => ['peak.near', 'plain.distortingShare'].includes(code));
      return !near && duties.every(({ verdict }) => verdict === 'clear' || verdict === null);
    });
    const total = (kept: number[]): number => kept.reduce((sum, n) => sum + n, 0);
    const most = Math.max(...choices.map(total));
    const kept = bank.stages.map(({ count }, g) => count - found.out[g]!);
    expect(total(kept)).toBe(most);
    expect(choices).toContainEqual(kept);
  });

  it('would not be, were one stage fewer kept out (control)', () => {
    const bank: BankInput = { stages: [{ count: 4, ratedKvar: 50, ratedV: 440 }] };
    const ground = groundOf(madeSite({ bank, loads: DRIVES }), RECORD, UTC_TABLE);
    const { out } = leastStagesOut(ground, bank, 'clear');
    const fewer = madeSite({ bank: { stages: [{ ...bank.stages[0]!, count: 4 - out[0]! + 1 }] }, loads: DRIVES });
    expect(assessBank(fewer, RECORD, UTC_TABLE).result.verdict).not.toBe('clear');
  });
});

describe('records on like terms', () => {
  it('say the same of a record and of the first half of one that repeats it', () => {
    const week = driftingLoad(chance(SEED + 9), 168, 200, 0.7);
    const twice = {
      activeKw: [...week.activeKw, ...week.activeKw],
      reactiveKvar: [...week.reactiveKvar, ...week.reactiveKvar],
    };
    const [one, two] = [madeRecord({ ...week, intervalS: 3600 }), madeRecord({ ...twice, intervalS: 3600 })];
    const { records, sameHours, sameMonths } = likeTerms([
      { record: one, zone: UTC_TABLE },
      { record: two, zone: UTC_TABLE },
    ]);
    expect(records[0]!.days * 2).toBe(records[1]!.days);
    expect(records[1]!.activeKwhPerDay).toBeCloseTo(records[0]!.activeKwhPerDay, 9);
    expect(records[1]!.laggingKvarhPerDay).toBeCloseTo(records[0]!.laggingKvarhPerDay, 9);
    expect(sameHours!.hours).toBe(168);
    expect(sameHours!.activeKw[1]).toBeCloseTo(sameHours!.activeKw[0]!, 9);
    expect(sameMonths.map(({ month }) => month)).toEqual([1]);
  });

  it('leave out hours that one of them lacks: nights against days have none in common', () => {
    const part = (fromH: number) => {
      const slots = Array.from({ length: 168 }, (_, slot) => slot).filter(
        (slot) => Math.floor((slot % 24) / 12) === fromH,
      );
      const load = driftingLoad(chance(SEED), slots.length, 100, 0.5);
      return { record: madeRecord({ ...load, slots, intervalS: 3600 }), zone: UTC_TABLE };
    };
    expect(likeTerms([part(0), part(1)]).sameHours).toBeNull();
    expect(likeTerms([part(0), part(0)]).sameHours!.hours).toBe(84);
  });
});

describe('since when', () => {
  it('is the month and the day a stage was lost, in a record taken with the bank switching', () => {
    const load = driftingLoad(chance(SEED + 11), 150 * 24, 300, 0.8);
    const lost = { ...TUNED, stages: [{ ...TUNED.stages[0]!, count: 2 }] };
    const given = (bank: BankInput) =>
      assessBank(
        madeSite({ bank, loads: DRIVES, control: CONTROL }),
        madeRecord({ ...load, intervalS: 3600 }),
        UTC_TABLE,
      ).series.connectedKvar;
    const [good, poor] = [given(TUNED), given(lost)];
    // The stages go on day 73, 15 March.
    const reactiveKvar = load.reactiveKvar.map((q, i) => q - (i < 73 * 24 ? good[i]! : poor[i]!));
    const record = madeRecord({ activeKw: load.activeKw, reactiveKvar, intervalS: 3600 });
    const recordedBank = { state: 'switching' as const };
    const { since } = reevaluateBank(
      then({ bank: TUNED, loads: DRIVES }),
      then({ bank: lost, loads: DRIVES, recordedBank }, record),
    ).reevaluation;
    expect(since!.monthsBy).toBe('metered');
    expect(since!.firstMonthOut).toBe('2025-03');
    const short = since!.changes.find(({ series }) => series === 'shortKvar')!;
    expect(short.kind).toBe('step');
    expect(Math.abs(Date.parse(short.date!) - Date.parse('2025-03-15')) / 86_400_000).toBeLessThanOrEqual(1);
  });
});

/** Six tenths of the nameplate between terminals of a delta: 1.5 · 0.6 · Q/(3·ω·U²). */
const UF: [number, number, number] = ((): [number, number, number] => {
  const uf = (1.5 * 0.6 * 50e3 * 1e6) / (3 * 2 * Math.PI * 50 * 525 ** 2);
  return [uf, uf, uf];
})();

function everyChoice({ stages }: BankInput): number[][] {
  return stages.reduce<number[][]>(
    (all, { count }) => all.flatMap((kept) => Array.from({ length: count + 1 }, (_, n) => [...kept, n])),
    [[]],
  );
}
