import { ageing } from '../duty/ageing.js';
import { type Devices, devices } from '../duty/devices.js';
import type { Judgement } from '../duty/judge-bank.js';
import { limitsPoint } from '../duty/limits-point.js';
import { marginMap } from '../duty/margin-map.js';
import { type MeasuredCheck, measuredCheck } from '../duty/measured-check.js';
import { CAPACITOR_RULES, graver, type Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import { bankLevels, summarizeBank } from '../layout/levels.js';
import type { Money } from '../money/money-result.js';
import type { MeasuredDistortion } from '../network/loads.js';
import type { Control } from '../operation/control.js';
import { summarizeOperation } from '../operation/operation.js';
import type { Remark } from '../problem.js';
import { cautions } from './cautions.js';
import { deviceFigures } from './device-figures.js';
import { figures } from './figures.js';
import { basisOf, judge, overallVerdict } from './judge-basis.js';
import type { Outcome, Rival } from './outcome.js';
import { reasons } from './reasons.js';
import { type Beside, copyNote, pointAssumption, reasonsBeside, verdictBeside } from './reasons-beside.js';
import type { Result } from './result.js';
import { type Operated, operate, type Study } from './study.js';
import type { PricedWays } from './weighed-bank.js';

/** Reactor ratio of the comparison where the bank is plain [%]. */
const RIVAL_REACTOR_PCT = 7;

/** What is said of a bank besides what its own figures say. */
export interface Said {
  reasons: Remark[];
  assumptions: Remark[];
  /** no better than this, whatever its figures say; `clear` where absent */
  atBest?: Verdict;
}

/** A bank and its controller, and what led to them. */
export interface Choice {
  bank: Bank;
  control: Control;
  said: Said;
  /** a plan that keeps the site's own bank */
  isOwn?: boolean;
  /** the bank simulated, where that has been done */
  operated?: Operated;
  /** what it costs and saves, from the bank simulated */
  money?: (operated: Operated) => Money;
  /** what was weighed by its money */
  priced?: PricedWays | undefined;
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
  const levels = bankLevels(bank, study.site.nominalV);
  const operated = choice.operated ?? operate(study, bank, control);
  const judgement = judge(study, bank, control);
  const bankSummary = summarizeBank(bank, levels, study.site.nominalV);
  const conductorMinA =
    (CAPACITOR_RULES[study.site.rules].conductorRatio * bankSummary.effectiveKvar * 1000) /
    (Math.sqrt(3) * study.site.nominalV);
  const { beside, equipment } = besideOf(choice.isOwn === true ? 'assess' : kind, study, {
    bank,
    control,
    judgement,
    conductorMinA,
  });
  const result: Result = {
    record: study.recordSummary,
    requirement: study.requirement,
    bank: bankSummary,
    control,
    operation: summarizeOperation(operated, study.months, study.target, levels),
    network: judgement.network,
    duties: judgement.duties,
    charge: { stages: judgement.charge },
    inrush: { stages: judgement.inrush },
    conductorMinA,
    ...beside,
    robustness: null,
    reactorTrials: [],
    spareWays: [],
    money: choice.money?.(operated) ?? null,
    verdict: graver(graver(overallVerdict(study, judgement), said.atBest ?? 'clear'), verdictBeside(beside)),
    reasons: [
      ...said.reasons,
      ...reasons(study, bank, operated, judgement),
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
    priced: choice.priced ?? null,
  };
}

// A plan does without what the site's own bank has: it says nothing of the one that is proposed.
function besideOf(
  kind: Outcome['kind'],
  study: Study,
  choice: { bank: Bank; control: Control; judgement: Judgement; conductorMinA: number },
): { beside: Beside; equipment: Devices | null } {
  const { bank, control, judgement, conductorMinA } = choice;
  const { model, site } = study;
  const judge = basisOf(study, control);
  const facts = { ...site.facts, bank: kind === 'plan' ? null : site.facts.bank };
  const levels = bankLevels(bank, site.nominalV);
  const equipment =
    bank.groups.length === 0 ? null : devices(model, bank, levels, { judge, judgement, control, conductorMinA, facts });
  const beside = {
    limits: limitsPoint(model, site),
    devices: equipment?.rows ?? [],
    ageing: ageing(model, bank, judge, facts.bank),
    measured: facts.measured === null ? null : measuredOf(study, kind, bank, facts.measured),
  };
  return { beside, equipment };
}

// With a bank in, a measurement says something of the bank that was in: the site's own, not the one that is proposed.
function measuredOf(study: Study, kind: Outcome['kind'], bank: Bank, measured: MeasuredDistortion): MeasuredCheck {
  const compared = kind === 'plan' ? { ...bank, groups: [] } : bank;
  return measuredCheck(study.model, compared, bankLevels(compared, study.site.nominalV), measured);
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

// The same nameplates built the other way: shown beside the bank wherever one of the two is near or over a limit.
function rivalOf(study: Study, { bank, control }: Choice, verdict: Verdict): Rival | null {
  const detuned = bank.groups.some((group) => group.reactorPct > 0);
  if (bank.groups.length === 0 || (!detuned && verdict === 'clear')) return null;
  const groups = bank.groups.map((group) => ({ ...group, reactorPct: detuned ? 0 : RIVAL_REACTOR_PCT }));
  const rival = { ...bank, groups };
  const levels = bankLevels(rival, study.site.nominalV);
  const margins = marginMap(study.model, rival, levels, basisOf(study, control));
  const judgement = judge(study, rival, control);
  return {
    bank: rival,
    verdict: overallVerdict(study, judgement),
    margins,
    levelsOver: margins.sharePct.filter((row, k) => k > 0 && row.some((share) => share > 100)).length,
    levelsAll: levels.length - 1,
  };
}
