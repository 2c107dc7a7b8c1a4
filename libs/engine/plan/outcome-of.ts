import { marginMap } from '../duty/margin-map.js';
import { graver, type Verdict } from '../duty/rules.js';
import type { Money } from '../money/money-result.js';
import { summarizeOperation } from '../operation/operation.js';
import type { Remark } from '../problem.js';
import { cautions } from './cautions.js';
import { deviceFigures } from './device-figures.js';
import { figures } from './figures.js';
import { basisOf, overallVerdict } from './judge-basis.js';
import { type BankChoice, judgeWhole, rivalOf } from './judged-bank.js';
import { moneyFigures } from './money-figures.js';
import type { Outcome } from './outcome.js';
import { reasons } from './reasons.js';
import { copyNote, pointAssumption, reasonsBeside, verdictBeside } from './reasons-beside.js';
import type { Result } from './result.js';
import { type Operated, operate, type Study } from './study.js';
import { rangeOf } from './turned-range.js';
import { unusualRecord, unusualSite } from './unusual-inputs.js';
import type { WaysWeighed } from './weighed-bank.js';

/** What is said of a bank besides what its own figures say. */
export interface Said {
  reasons: Remark[];
  assumptions: Remark[];
  /** no better than this, whatever its figures say; `clear` where absent */
  atBest?: Verdict;
}

/** A bank and its controller, and what led to them. */
export interface Choice extends BankChoice {
  said: Said;
  /** a plan that keeps the site's own bank */
  isOwn?: boolean;
  /** the bank simulated, where that has been done */
  operated?: Operated;
  /** what it costs and saves, from the bank simulated */
  money?: (operated: Operated) => Money;
  /** what was weighed by its money */
  priced?: WaysWeighed | undefined;
}

/**
 * Judges one bank on one study and composes the outcome.
 * @param kind which command asked
 * @param study site and record
 * @param choice bank, control and what led to them
 * @returns the outcome
 * @source method-limits
 */
export function outcomeOf(kind: Outcome['kind'], study: Study, choice: Choice): Outcome {
  const { bank, control, said } = choice;
  const operated = choice.operated ?? operate(study, bank, control);
  const judged = judgeWhole(choice.isOwn === true ? 'assess' : kind, study, choice);
  const { levels, judgement, beside, equipment } = judged;
  const range = rangeOf(study, choice);
  const money = choice.money?.(operated) ?? null;
  const result: Result = {
    record: study.recordSummary,
    recordedBank: range.summary,
    requirement: study.requirement,
    bank: judged.summary,
    control,
    operation: summarizeOperation(operated, study.months, study.target, levels),
    network: judgement.network,
    duties: judgement.duties,
    charge: { stages: judgement.charge },
    inrush: { stages: judgement.inrush },
    conductorMinA: judged.conductorMinA,
    ...beside,
    robustness: null,
    reactorTrials: [],
    spareWays: [],
    money,
    verdict: [said.atBest ?? 'clear', supported(study), range.atBest, verdictBeside(beside)].reduce(
      graver,
      overallVerdict(study, judgement),
    ),
    reasons: [
      ...said.reasons,
      ...range.reasons,
      ...reasons(study, bank, operated, judgement),
      ...unusualSite(study.site, bank),
      ...unusualRecord(study, bank, money?.bills.before ?? null),
      ...reasonsBeside(study, bank, { control, duties: judgement.duties }, beside),
    ],
    assumptions: [
      ...study.assumptions,
      ...pointAssumption(study, beside.limits),
      ...copyNote(study),
      ...said.assumptions,
    ],
    cautions: cautions(judgement),
    figures: [],
  };
  result.figures = [
    ...figures(study, bank, operated, result),
    ...(equipment === null ? [] : deviceFigures(study, bank, control, equipment)),
    ...(result.money === null ? [] : moneyFigures(result.money, study.site.papers)),
  ];
  return {
    kind,
    site: study.site,
    record: study.record,
    zone: study.zone,
    bank,
    result,
    series: series(study, operated),
    loadA: study.model.loadA,
    margins: marginMap(study.model, bank, levels, basisOf(study, control)),
    rival: rivalOf(study, choice, result.verdict),
    priced: choice.priced === undefined ? null : { ...choice.priced, record: study.record, zone: study.zone },
  };
}

// Limits may be kept on a week of readings; a bank for the year cannot be recommended on it.
function supported({ recordSummary }: Study): Verdict {
  return recordSummary.grade === 'insufficient' ? 'watch' : 'clear';
}

function series(study: Study, operated: Operated): Outcome['series'] {
  return {
    beginS: study.record.beginS,
    busKw: study.load.activeKw,
    busKvar: study.load.reactiveKvar,
    needKvar: study.needKvar,
    connectedKvar: operated.deliveredKvar,
    meterKw: operated.meter.activeKw,
    meterLaggingKvar: operated.meter.laggingKvar,
    meterLeadingKvar: operated.meter.leadingKvar,
  };
}
