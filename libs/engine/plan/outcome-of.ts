import { type JudgeBasis, type Judgement, judgeBank } from '../duty/judge-bank.js';
import { marginMap } from '../duty/margin-map.js';
import { CAPACITOR_RULES, graver, type Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import { bankLevels, summarizeBank } from '../layout/levels.js';
import type { Money } from '../money/money-result.js';
import type { Control } from '../operation/control.js';
import { summarizeOperation } from '../operation/operation.js';
import type { Remark } from '../problem.js';
import { cautions } from './cautions.js';
import { figures } from './figures.js';
import type { Outcome, Rival } from './outcome.js';
import { reasons } from './reasons.js';
import type { Result } from './result.js';
import { type Operated, operate, type Study } from './study.js';

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
  /** its switches limit inrush, which is then not judged */
  limitsInrush?: boolean;
  /** the bank simulated, where that has been done */
  operated?: Operated;
  /** what it costs and saves, from the bank simulated */
  money?: (operated: Operated) => Money;
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
  const judgement = judge(study, bank, control, choice.limitsInrush);
  const bankSummary = summarizeBank(bank, levels, study.site.nominalV);
  const conductorMinA =
    (CAPACITOR_RULES[study.site.rules].conductorRatio * bankSummary.effectiveKvar * 1000) /
    (Math.sqrt(3) * study.site.nominalV);
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
    robustness: null,
    money: choice.money?.(operated) ?? null,
    verdict: graver(overallVerdict(study, judgement), said.atBest ?? 'clear'),
    reasons: [...said.reasons, ...reasons(study, bank, operated, judgement)],
    assumptions: [...study.assumptions, ...said.assumptions],
    cautions: cautions(judgement),
    figures: [],
  };
  result.figures = figures(study, bank, operated, result);
  return {
    kind,
    site: study.site,
    record: study.record,
    zone: study.zone,
    bank,
    result,
    series: series(study, operated),
    margins: marginMap(study.model, bank, levels, basisOf(study, control)),
    rival: rivalOf(study, choice, result.verdict),
  };
}

/**
 * What a bank on this study is judged by.
 * @param study site and record
 * @param control settings
 * @returns rules, voltages, supply, loads and delay
 */
export function basisOf(study: Study, control: Control): JudgeBasis {
  const { site } = study;
  return {
    rules: site.rules,
    frequencyHz: site.frequencyHz,
    voltages: { nominalV: site.nominalV, highestV: site.highestV },
    emcClass: site.emcClass,
    supply: site.supply,
    loads: site.loads,
    reconnectDelayS: control.reconnectDelayS,
  };
}

/**
 * Judges a bank on a study's network.
 * @param study site and record
 * @param bank the bank
 * @param control settings; the reconnection delay sets the resistors
 * @param limitsInrush its switches limit inrush, which is then not judged
 * @returns judgement
 * @source method-limits
 */
export function judge(study: Study, bank: Bank, control: Control, limitsInrush = false): Judgement {
  const basis = { ...basisOf(study, control), limitsInrush };
  return judgeBank(study.model, bank, bankLevels(bank, study.site.nominalV), basis);
}

/**
 * The verdict with what the record itself leaves open: an unknown old bank is at best `watch`.
 * @param study site and record
 * @param judgement the bank judged
 * @returns overall verdict
 * @source method-controller
 */
export function overallVerdict(study: Study, judgement: Judgement): Verdict {
  return study.site.recordedBank.state === 'unknown' ? graver(judgement.verdict, 'watch') : judgement.verdict;
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
function rivalOf(study: Study, { bank, control, limitsInrush }: Choice, verdict: Verdict): Rival | null {
  const detuned = bank.groups.some((group) => group.reactorPct > 0);
  if (bank.groups.length === 0 || (!detuned && verdict === 'clear')) return null;
  const groups = bank.groups.map((group) => ({ ...group, reactorPct: detuned ? 0 : RIVAL_REACTOR_PCT }));
  const rival = { ...bank, groups };
  const levels = bankLevels(rival, study.site.nominalV);
  const margins = marginMap(study.model, rival, levels, basisOf(study, control));
  const judgement = judge(study, rival, control, limitsInrush);
  return {
    bank: rival,
    verdict: overallVerdict(study, judgement),
    margins,
    levelsOver: margins.sharePct.filter((row, k) => k > 0 && row.some((share) => share > 100)).length,
    levelsAll: levels.length - 1,
  };
}
