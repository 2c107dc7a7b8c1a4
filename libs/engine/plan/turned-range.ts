import type { Verdict } from '../duty/rules.js';
import { meetsTarget } from '../operation/operation.js';
import { type Remark, remark } from '../problem.js';
import type { BusLoad } from '../requirement/bus-load.js';
import type { BankChoice } from './judged-bank.js';
import { type RecordedBankSummary, recordedBankSummary } from './recorded-bank.js';
import { operate, type Study } from './study.js';

/** More unexplained intervals than this, and settings or nameplate are not what was stated [share]. */
const MOST_UNEXPLAINED = 0.02;

/** What the range of a record turned back means for a bank. */
export interface TurnedRange {
  summary: RecordedBankSummary | null;
  atBest: Verdict;
  reasons: Remark[];
}

/**
 * What the range of a record that was taken with a bank switching does to a bank's verdict: at best `watch` where the
 * target is met at one end of the range and missed at the other, or where the record contradicts the old bank.
 * @param study site and record
 * @param choice bank and settings
 * @returns figures, the best verdict and reasons; nothing where no bank was switching
 * @source method-recorded-bank
 */
export function rangeOf(study: Study, { bank, control }: BankChoice): TurnedRange {
  const { turned, target, record } = study;
  if (turned === null) return { summary: null, atBest: 'clear', reasons: [] };
  const summary = recordedBankSummary(turned, target, record);
  const { certainPct, unexplained, intervals, maxNeedLowKvar, maxNeedHighKvar } = summary;
  const reasons = [
    remark('recordedBank.turnedBack', { certainPct, maxNeedLowKvar, maxNeedHighKvar }, { path: 'recordedBank' }),
  ];
  const met = (load: BusLoad): boolean =>
    meetsTarget(operate({ ...study, load }, bank, control).months, study.site.targetPowerFactor);
  const atLow = met(turned.low);
  const divided = atLow !== met(turned.high);
  const contradicted = unexplained > MOST_UNEXPLAINED * intervals;
  if (divided) {
    const values = { targetPowerFactor: study.site.targetPowerFactor, metAt: atLow ? 'least' : 'greatest' };
    reasons.push(remark('recordedBank.rangeDivides', values, { path: 'recordedBank' }));
  }
  if (contradicted) {
    reasons.push(remark('recordedBank.unexplained', { unexplained, intervals }, { path: 'recordedBank' }));
  }
  return { summary, atBest: divided || contradicted ? 'watch' : 'clear', reasons };
}
