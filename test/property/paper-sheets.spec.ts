// Sheets that leave the paper: closed forms of the bank (X_C = U²/Q, p = X_L/X_C) worked again here, and the ends of what
// was judged.
import { describe, expect, it } from 'vitest';
import {
  controllerSettings,
  maintenanceChecks,
  type Outcome,
  overvoltageV,
  type Result,
  type SettingName,
  withRobustness,
} from '#libs/engine/index.js';
import { controllerSheet } from '#libs/present/controller-sheet.js';
import { maintenanceLines } from '#libs/present/maintenance-lines.js';
import { operatorPage } from '#libs/present/operator-page.js';
import { revisionNumbers } from '#libs/present/revision-numbers.js';
import { scheduleOfMaterials } from '#libs/present/schedule-of-materials.js';
import { missingParts, needIssuable } from '#libs/proposal/missing-parts.js';
import type { ProposalFrame } from '#libs/proposal/proposal-frame.js';
import { generatedCase } from '../support/generated-site.js';
import { MADE_BANK, MADE_PLAIN_BANK, madeFrame, madeOutcome } from '../support/outcome.js';
import { runs } from '../support/soak.js';

const made = madeOutcome(
  { bank: MADE_BANK, control: { currentTransformer: { ratioPrimaryA: 1000, ratioSecondaryA: 5 } } },
  { days: 60 },
);
const none = madeOutcome({}, { days: 20, powerFactor: 0.985 });

function setting(outcome: Outcome, name: SettingName) {
  return controllerSettings(outcome).find(({ setting: one }) => one === name)!;
}

describe('the controller’s settings', () => {
  it('give the threshold of the smallest stage and its current by hand', () => {
    // 25 kvar at 480 V behind 7 %: 25 · (400/480)² / 0.93; times 0.65; over √3 · 400 V and 1000/5
    const kvar = 0.65 * ((25 * (400 / 480) ** 2) / 0.93);
    expect(setting(made, 'threshold').value).toBeCloseTo(kvar, 9);
    expect(setting(made, 'thresholdCurrent').value).toBeCloseTo((kvar * 1000) / (Math.sqrt(3) * 400) / 200, 9);
  });

  it('switch off above the voltage at which the weakest capacitor passes its own', () => {
    // 1.10 · 480 V · (1 − 0.07)
    expect(overvoltageV(made)).toBeCloseTo(491.04, 9);
    const mixed = {
      ...made,
      bank: { ...made.bank, groups: [{ ...made.bank.groups[0]!, ratedV: 440 }, ...made.bank.groups] },
    };
    expect(overvoltageV(mixed)).toBeCloseTo(1.1 * 440 * 0.93, 9);
  });

  it('say where each value comes from', () => {
    expect(setting(made, 'setPoint').from).toBe('default');
    const given = madeOutcome({ bank: MADE_BANK, control: { setPointPowerFactor: 0.97 } }, { days: 9 });
    expect(setting(given, 'setPoint')).toMatchObject({ value: 0.97, from: 'site' });
    expect(setting({ ...made, kind: 'plan' }, 'setPoint').from).toBe('searched');
    expect(setting(madeOutcome({ bank: MADE_BANK }, { days: 9 }), 'thresholdCurrent').from).toBe('open');
  });

  it('leave no line without a name, a value or a dash, and a derivation', () => {
    const sheet = controllerSheet(made);
    expect(sheet.length).toBe(controllerSettings(made).length);
    for (const line of sheet) for (const cell of Object.values(line)) expect(cell).not.toBe('');
    expect(controllerSheet(none)).toEqual([]);
  });
});

describe('maintenance', () => {
  const outcomes = Array.from({ length: runs(3, 40) }, (_, number) => {
    const { parts, load } = generatedCase(number);
    return madeOutcome({ bank: MADE_PLAIN_BANK, ...parts }, load);
  });

  // what a stage takes at nominal voltage passes the reject value only where that current is itself judged over its limit
  it('expects what lies between its reject values, but for the current of a stage over its limit', () => {
    for (const outcome of [made, ...outcomes]) {
      const checks = maintenanceChecks(outcome).filter(
        ({ check }) => check === 'capacitance' || check === 'stageCurrent',
      );
      expect(checks).toHaveLength(2 * outcome.bank.groups.length);
      const currents = outcome.result.duties.filter(({ name }) => name === 'capacitor current');
      for (const { check, group, expected, least, most } of checks) {
        expect(least!).toBeLessThan(expected!);
        if (check === 'stageCurrent' && expected! >= most!) {
          expect(currents.find((duty) => duty.group === group)!.ratio!).toBeGreaterThanOrEqual(expected! / most!);
          expect(outcome.result.verdict).toBe('avoid');
        } else expect(most!).toBeGreaterThan(expected!);
      }
    }
  });

  it('rejects a stage where the verdict turns, and at the customary end of life where it does not', () => {
    const share = (comesOutPct: number | null) => {
      const stages = made.result.ageing.stages.map((stage) => ({ ...stage, comesOutPct }));
      const result = { ...made.result, ageing: { ...made.result.ageing, stages } };
      const [first] = maintenanceChecks({ ...made, result });
      return { share: first!.least! / first!.expected!, basis: first!.basis };
    };
    expect(share(83).share).toBeCloseTo(0.83, 12);
    expect(share(83).basis).toBe('computed');
    expect(share(null).share).toBeCloseTo(0.9, 12);
    expect(share(null).basis).toBe('practice');
  });

  it('scales the switchings of the busiest stage to a year', () => {
    const most = Math.max(...made.result.operation.switchings);
    const found = maintenanceChecks(made).find(({ check }) => check === 'switchings')!.expected!;
    expect(found).toBeCloseTo((most * 365) / 60, 6);
  });

  it('has words for every check', () => {
    for (const line of maintenanceLines(made)) for (const cell of Object.values(line)) expect(cell).not.toBe('');
  });
});

describe('the schedule of materials', () => {
  it('counts three fuses’ sets and resistors by the stage, and one of what the bank has once', () => {
    const lines = scheduleOfMaterials(made);
    const number = (item: string) => lines.filter((line) => line.item.startsWith(item)).map((line) => line.number);
    expect(number('capacitor')).toEqual(['2', '6']);
    expect(number('fuses')).toEqual(['2', '6']);
    expect(number('discharge resistor')).toEqual(['6', '18']);
    expect(number('controller')).toEqual(['1']);
    expect(number('label')).toEqual(['8']);
    expect(scheduleOfMaterials(none)).toEqual([]);
  });
});

describe('the page for the network operator', () => {
  it('tells each row of the network with its limit, and asks what was assumed', () => {
    const { effects, questions, facts } = operatorPage(made);
    expect(effects.map(({ what }) => what)).toContain('voltage distortion');
    expect(effects.every(({ value }) => value !== '')).toBe(true);
    expect(facts.find(([label]) => label === 'fault level at the primary')![1]).toBe('180–250\u00a0MVA');
    expect(questions[1]!.taken).toContain('order 5: 1.5');
  });
});

describe('a paper that is to be more than a draft', () => {
  const whole = withRobustness(made);
  const outcome: Outcome = { ...whole, result: { ...whole.result, ...{ figures: made.result.figures } } };
  const frame = madeFrame({ state: 'for review', preparedBy: 'R. Aldane' });

  it('is refused while a required part is empty, by its name', () => {
    expect(missingParts(outcome, frame)).toEqual([]);
    expect(() => needIssuable(outcome, frame)).not.toThrow();
    expect(missingParts(made, frame)).toEqual(['sensitivity']);
    expect(() => needIssuable(made, frame)).toThrow(/sensitivity/);
  });

  const { result } = outcome;
  const bare = { name: '', licence: 'L 1', jurisdiction: 'nowhere', date: '2026-01-31', capacity: '', statement: '' };
  const signed = (signature: object) => ({
    review: {
      signatures: [{ ...bare, name: 'M. Okafor', ...signature }],
      handChecks: [],
      accepted: [],
      ownApproval: null,
    },
  });
  const unworked = (figure: Result['figures'][number]) => ({ ...figure, working: '' });
  const emptied: [part: string, result: Partial<Result>, frame?: Partial<ProposalFrame>, outcome?: Partial<Outcome>][] =
    [
      ['number, engine version and content hash', {}, { contentHash: '7f3a' }],
      ['number, engine version and content hash', {}, { number: ' ' }],
      ['decision', {}, {}, { site: { ...outcome.site, name: ' \u200b' } }],
      ['prepared by', {}, { preparedBy: '  ' }],
      ['prepared by', {}, { preparedBy: null }],
      ['checked and approved', {}, { state: 'approved' }],
      ['checked and approved', {}, { state: 'approved', ...signed({ licence: '' }) }],
      ['checked and approved', {}, { state: 'approved', ...signed({ jurisdiction: ' ' }) }],
      ['assumptions', { assumptions: result.assumptions.map((line) => ({ ...line, text: '' })) }],
      ['data quality', { record: { ...result.record, intervals: 0 } }],
      ['method and working', { figures: result.figures.map((figure, at) => (at === 3 ? unworked(figure) : figure)) }],
      ['stages', { bank: { ...result.bank, stages: [] } }],
      ['protection', { devices: [] }],
      ['discharge', { charge: { stages: [] } }],
      ['network', { network: { ...result.network, levels: [] } }],
      ['duties', { duties: [] }],
      ['sensitivity', { robustness: null }],
      ['limits of validity', { limits: { ...result.limits, points: [] } }],
      ['hand check', { figures: result.figures.filter(({ id }) => !/^(network|bank)\./.test(id)) }],
      ['cautions', { cautions: [] }],
      ['revision history', {}, { revision: 3, history: [] }],
    ];

  it.each(emptied)('is refused without its part: %s', (part, changed, more = {}, beside = {}) => {
    const without: Outcome = { ...outcome, ...beside, result: { ...result, ...changed } };
    expect(missingParts(without, { ...frame, ...more })).toContain(part);
    expect(() => needIssuable(without, { ...frame, ...more })).toThrow(`${part}, for a paper that may be issued`);
    // as a draft it may go out
    expect(() => needIssuable(without, { ...frame, ...more, state: 'draft, not reviewed' })).not.toThrow();
  });

  it('goes out signed, and as a third revision with its history', () => {
    const past = {
      revision: 1,
      kind: 'plan',
      date: null,
      author: null,
      reason: null,
      contentHash: '',
      engineVersion: '',
    } as const;
    const numbers = revisionNumbers(result);
    const whole = { ...frame, state: 'approved', revision: 3, history: [{ ...past, numbers }], ...signed({}) } as const;
    expect(missingParts(outcome, whole)).toEqual([]);
  });

  it('of a site where nothing is built needs no part of a bank', () => {
    expect(missingParts(none, frame)).toEqual([]);
  });

  it('is refused while a finding blocks issue, and stays a draft', () => {
    const over = madeOutcome({ bank: MADE_PLAIN_BANK }, { days: 20 });
    expect(() => needIssuable(over, frame)).toThrow(/blocks issue/);
    expect(() => needIssuable(over, { ...frame, state: 'draft, not reviewed' })).not.toThrow();
  });
});
