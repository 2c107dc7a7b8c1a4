import { marginMap } from '../duty/margin-map.js';
import { graver } from '../duty/rules.js';
import { type Remark, remark } from '../problem.js';
import { bankFigures } from './bank-figures.js';
import { cautions } from './cautions.js';
import { deviceFigures } from './device-figures.js';
import { estimateFigures } from './estimate-figures.js';
import { estimateReasons, refusedByEstimate } from './estimate-reasons.js';
import type { EstimateMoney, EstimateOutcome, EstimateRequirement, EstimateResult } from './estimate-result.js';
import type { EstimateStudy } from './estimate-study.js';
import { basisOf, overallVerdict } from './judge-basis.js';
import { type BankChoice, judgeWhole, rivalOf } from './judged-bank.js';
import { judgementReasons, reconnectionReasons } from './judgement-reasons.js';
import { dutyFigures, neutralFigure, supplyFigures } from './network-figures.js';
import { copyNote, pointAssumption, reasonsBeside, verdictBeside } from './reasons-beside.js';
import { unusualSite } from './unusual-inputs.js';

/** A bank for an estimated load, and what led to it. */
export interface EstimateChoice extends BankChoice {
  reasons: Remark[];
  assumptions: Remark[];
  money: EstimateMoney | null;
  /** why there is no money, where there is a tariff */
  moneyRefused: Remark[];
}

/**
 * Judges one bank for an estimated load and composes the outcome; its verdict is never better than `watch`.
 * @param kind which command asked
 * @param study site and estimated load
 * @param choice bank, control and what led to them
 * @returns the outcome
 * @source method-estimate, method-limits
 */
export function estimateOutcome(
  kind: EstimateOutcome['kind'],
  study: EstimateStudy,
  choice: EstimateChoice,
): EstimateOutcome {
  const { bank, control } = choice;
  const { levels, judgement, beside, equipment, summary, conductorMinA } = judgeWhole(kind, study, choice);
  const network = graver(overallVerdict(study, judgement), verdictBeside(beside));
  const result: EstimateResult = {
    record: null,
    estimate: { ...study.load, refused: [...refusedByEstimate(bank.groups.length > 0), ...choice.moneyRefused] },
    requirement: requirementOf(study),
    bank: summary,
    control,
    operation: null,
    network: judgement.network,
    duties: judgement.duties,
    charge: { stages: judgement.charge },
    inrush: { stages: judgement.inrush },
    conductorMinA,
    ...beside,
    robustness: null,
    reactorTrials: [],
    spareWays: [],
    money: choice.money,
    verdict: graver(network, 'watch'),
    reasons: [
      ...judgementReasons(study, bank, judgement),
      ...estimateReasons(study, summary.effectiveKvar),
      ...choice.reasons,
      ...unusualSite(study.site, bank),
      ...reconnectionReasons(study, bank, control, judgement),
      ...reasonsBeside(study, bank, { control, duties: judgement.duties }, beside),
    ],
    assumptions: [
      ...study.assumptions,
      ...pointAssumption(study, beside.limits),
      ...copyNote(study),
      ...choice.assumptions,
    ],
    cautions: [...cautions(judgement), remark('caution.estimate')],
    figures: [],
  };
  result.figures = [
    ...estimateFigures(study),
    ...supplyFigures(study, result),
    ...bankFigures(study, bank, result),
    ...neutralFigure(study),
    ...dutyFigures(result),
    ...(equipment === null ? [] : deviceFigures(study, bank, control, equipment)),
  ];
  return {
    kind,
    site: study.site,
    zone: study.zone,
    bank,
    result,
    loadA: study.model.loadA,
    margins: marginMap(study.model, bank, levels, basisOf(study, control)),
    rival: rivalOf(study, choice, network),
    priced: null,
  };
}

function requirementOf({ site, load }: EstimateStudy): EstimateRequirement {
  return {
    targetPowerFactor: site.targetPowerFactor,
    maxKvar: null,
    p99Kvar: null,
    p95Kvar: null,
    p50Kvar: null,
    meanKvar: null,
    intervalsInNeed: null,
    lowerKvar: load.lowerKvar,
    upperKvar: load.upperKvar,
    listKvar: load.equipment?.neededKvar ?? null,
    sizedKvar: load.sizedKvar,
    months: load.months.map(({ month, activeKwh, laggingKvarh, powerFactorLagging, maxKw, lowerKvar, upperKvar }) => ({
      month,
      activeKwh,
      laggingKvarh,
      leadingKvarh: null,
      powerFactorLagging,
      maxKw,
      neededKvar: null,
      energyNeedKvar: lowerKvar,
      upperKvar,
    })),
  };
}
