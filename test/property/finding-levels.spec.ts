// Rules: a limit passed, an insufficient record and no record at all block issue; what is near a limit and every
// assumption that would turn the verdict is accepted by itself. Checked against the duties the verdict was made from.
import { describe, expect, it } from 'vitest';
import { estimateZone } from '#libs/contract/estimate-zone.js';
import { assessEstimate, type Outcome } from '#libs/engine/index.js';
import { blocking, type Finding, findingNumbers, findings } from '#libs/present/findings.js';
import { putEstimateInWords, putInWords } from '#libs/present/put-in-words.js';
import { rulesEvaluated, rulesWords } from '#libs/present/rules-evaluated.js';
import { UNUSUAL_MESSAGES } from '#libs/present/unusual-messages.js';
import { generatedCase } from '../support/generated-site.js';
import { MADE_BANK, MADE_PLAIN_BANK, madeOutcome, madeSite } from '../support/outcome.js';
import { runs } from '../support/soak.js';

function at(list: readonly Finding[], level: Finding['level']): Finding[] {
  return list.filter((finding) => finding.level === level);
}

/** What of the duties is missing among the findings, or stands at another level than its verdict asks for. */
function misplaced({ result }: Outcome, list: readonly Finding[]): string[] {
  return result.duties.flatMap((duty) => {
    if (duty.verdict !== 'avoid' && duty.verdict !== 'watch') return [];
    const level = duty.verdict === 'avoid' ? 'blocks issue' : 'to be accepted';
    const found = at(list, level).filter(({ value, limit }) => value === duty.value && limit === duty.limit);
    return found.length > 0 ? [] : [`${duty.name} ${duty.group} ${duty.orderH}: not at "${level}"`];
  });
}

const generated = Array.from({ length: runs(8, 120) }, (_, number) => {
  const { parts, load } = generatedCase(number);
  return madeOutcome(parts, load);
});
const outcomes = [madeOutcome({ bank: MADE_PLAIN_BANK }, { days: 20 }), ...generated];

describe('findings', () => {
  it('give every row over or near a limit a finding of its own at its level', () => {
    for (const outcome of outcomes) expect(misplaced(outcome, findings(outcome))).toEqual([]);
    expect(outcomes.some(({ result }) => result.verdict === 'avoid')).toBe(true);
    // the control: a row that is worse than its finding says is seen
    const over = outcomes.find(({ result }) => result.duties.some(({ verdict }) => verdict === 'watch'))!;
    const spoilt = structuredClone(over);
    for (const duty of spoilt.result.duties) if (duty.verdict === 'watch') duty.verdict = 'avoid';
    expect(misplaced(spoilt, findings(spoilt)).length).toBeGreaterThan(0);
  });

  it('block issue wherever the verdict is over a limit, and ask for acceptance wherever it is near one', () => {
    for (const outcome of outcomes) {
      const list = findings(outcome);
      const { verdict } = outcome.result;
      if (verdict === 'avoid') expect(blocking(list).length).toBeGreaterThan(0);
      if (verdict === 'watch') expect(blocking(list).length + at(list, 'to be accepted').length).toBeGreaterThan(0);
    }
  });

  it('say the verdict itself where no reason does', () => {
    const { result } = outcomes[0]!;
    const bare = (verdict: 'avoid' | 'watch' | 'clear') =>
      findings({ result: { ...result, verdict, reasons: [], assumptions: [], duties: [] } }).map(({ code }) => code);
    expect(bare('avoid')).toContain('verdict.avoid');
    expect(bare('watch')).toContain('verdict.watch');
    expect(bare('clear').filter((code) => code.startsWith('verdict.'))).toEqual([]);
  });

  it('go by ids that are unlike each other, gravest first', () => {
    const order = ['blocks issue', 'to be accepted', 'to be noted', 'information'];
    for (const outcome of outcomes) {
      const list = findings(outcome);
      expect(new Set(list.map(({ id }) => id)).size).toBe(list.length);
      const places = list.map(({ level }) => order.indexOf(level));
      expect(places).toEqual([...places].sort((a, b) => a - b));
    }
  });

  it('block issue on a record too short to recommend on, and not on a long one', () => {
    const codes = (days: number) => blocking(findings(madeOutcome({ bank: MADE_BANK }, { days }))).map((f) => f.code);
    expect(codes(6)).toContain('record.insufficient');
    expect(codes(60)).toEqual([]);
  });

  it('block issue without a record at all', () => {
    const bills = [{ month: '2025-01', activeKwh: 40_000, laggingKvarh: 36_000, maxKw: 180 }];
    const site = madeSite({ bank: MADE_BANK, estimate: { bills } });
    const { result } = assessEstimate(site, estimateZone(site));
    expect(blocking(putEstimateInWords(result).findings).map(({ code }) => code)).toContain('estimate.basis');
  });

  it('have each assumption accepted that would turn the verdict, and no other', () => {
    const { result } = madeOutcome({ bank: MADE_BANK }, { days: 60 });
    const [first, second, ...rest] = result.assumptions;
    const effect = { figure: 'duties.voltage distortion', low: 0.62, high: 1.04 };
    const assumptions = [
      { ...first!, effect: { ...effect, changesVerdict: true } },
      { ...second!, effect: { ...effect, changesVerdict: false } },
      ...rest,
    ];
    const accepted = at(putInWords({ ...result, assumptions }).findings, 'to be accepted').map(({ code }) => code);
    expect(accepted).toContain(first!.code);
    expect(accepted).not.toContain(second!.code);
    const turning = findings({ result: { ...result, assumptions } }).find(({ code }) => code === first!.code)!;
    expect(turning.consequence).toContain(
      'Voltage distortion 62\u00a0% to 104\u00a0% of its limit, and the verdict changes',
    );
  });

  it('print value and limit apart, with the unit once each', () => {
    const [finding] = blocking(findings(outcomes[0]!)).filter(({ limit }) => limit !== null);
    const shown = findingNumbers(finding!);
    expect(shown.value).not.toBe(shown.limit);
    expect(shown.value.endsWith(`\u00a0${finding!.unit}`)).toBe(true);
  });

  it('lay an inrush over its limit to the assumed inductance, closed form and exact alike', () => {
    const inrush = findings(outcomes[0]!).filter(({ what }) => what.startsWith('Inrush current'));
    expect(inrush.length).toBeGreaterThan(2);
    expect(new Set(inrush.map(({ code }) => code))).toEqual(new Set(['inrush.assumedInductance']));
  });

  it('keep hazard words out', () => {
    for (const outcome of outcomes) {
      for (const { what, consequence } of findings(outcome)) {
        expect(`${what} ${consequence}`).not.toMatch(/\b(danger|warning|caution)/i);
      }
    }
  });
});

describe('the rules that were evaluated', () => {
  it('are counted whether they were triggered or not', () => {
    for (const { result } of outcomes) {
      const { rows, notJudged, devices, signs, inputs } = rulesEvaluated(result);
      expect(rows + notJudged).toBe(result.duties.length);
      expect(devices).toBeLessThanOrEqual(result.devices.length);
      expect(signs).toBeGreaterThan(5);
      expect(inputs).toBe(Object.keys(UNUSUAL_MESSAGES).length);
    }
    expect(rulesWords({ rows: 12, notJudged: 2, devices: 1, assumptions: 7, signs: 12, inputs: 14 })).toBe(
      '46 rules were evaluated: 12 rows held against a limit, 1 fitted rating, 7 assumptions moved to either end, ' +
        '12 signs of a fault in the record, 14 inputs held against what is built; 2 could not be judged.',
    );
  });
});
