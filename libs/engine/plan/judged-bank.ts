import { ageing } from '../duty/ageing.js';
import { type Devices, devices } from '../duty/devices.js';
import type { Judgement } from '../duty/judge-bank.js';
import { limitsPoint } from '../duty/limits-point.js';
import { marginMap } from '../duty/margin-map.js';
import { type MeasuredCheck, measuredCheck } from '../duty/measured-check.js';
import { CAPACITOR_RULES, type Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import { type BankSummary, bankLevels, type Level, summarizeBank } from '../layout/levels.js';
import type { MeasuredDistortion } from '../network/loads.js';
import type { Control } from '../operation/control.js';
import { basisOf, type Judged, judge, overallVerdict } from './judge-basis.js';
import type { BankOutcome, Rival } from './outcome.js';
import type { Beside } from './reasons-beside.js';

/** Reactor ratio of the comparison where the bank is plain [%]. */
const RIVAL_REACTOR_PCT = 7;

/** A bank and its controller. */
export interface BankChoice {
  bank: Bank;
  control: Control;
}

/** A bank judged whole on its network: what does not depend on when the load asks for it. */
export interface JudgedBank {
  levels: Level[];
  summary: BankSummary;
  judgement: Judgement;
  /** least rated current of conductors and disconnector [A] */
  conductorMinA: number;
  beside: Beside;
  /** null for an empty bank */
  equipment: Devices | null;
}

/**
 * Judges a bank on its network, with devices, ageing and measurement beside it.
 * @param kind which command asked
 * @param judged settled site and its network
 * @param choice bank and settings
 * @returns everything that is said of the bank without a record
 * @source method-limits
 */
export function judgeWhole(kind: BankOutcome['kind'], judged: Judged, choice: BankChoice): JudgedBank {
  const { bank, control } = choice;
  const { nominalV, rules } = judged.site;
  const levels = bankLevels(bank, nominalV);
  const judgement = judge(judged, bank, control);
  const summary = summarizeBank(bank, levels, nominalV);
  const conductorMinA =
    (CAPACITOR_RULES[rules].conductorRatio * summary.effectiveKvar * 1000) / (Math.sqrt(3) * nominalV);
  const found = besideOf(kind, judged, { bank, control, judgement, conductorMinA });
  return { levels, summary, judgement, conductorMinA, ...found };
}

// A plan does without what the site's own bank has: it says nothing of the one that is proposed.
function besideOf(
  kind: BankOutcome['kind'],
  judged: Judged,
  choice: { bank: Bank; control: Control; judgement: Judgement; conductorMinA: number },
): { beside: Beside; equipment: Devices | null } {
  const { bank, control, judgement, conductorMinA } = choice;
  const { model, site } = judged;
  const judge = basisOf(judged, control);
  const facts = { ...site.facts, bank: kind === 'plan' ? null : site.facts.bank };
  const levels = bankLevels(bank, site.nominalV);
  const equipment =
    bank.groups.length === 0 ? null : devices(model, bank, levels, { judge, judgement, control, conductorMinA, facts });
  const beside = {
    limits: limitsPoint(model, site),
    devices: equipment?.rows ?? [],
    ageing: ageing(model, bank, judge, facts.bank === null ? null : { bank: facts.bank, asOf: site.asOf }),
    measured: facts.measured === null ? null : measuredOf(judged, kind, bank, facts.measured),
  };
  return { beside, equipment };
}

// With a bank in, a measurement says something of the bank that was in: the site's own, not the one that is proposed.
function measuredOf(
  judged: Judged,
  kind: BankOutcome['kind'],
  bank: Bank,
  measured: MeasuredDistortion,
): MeasuredCheck {
  const compared = kind === 'plan' ? { ...bank, groups: [] } : bank;
  return measuredCheck(judged.model, compared, bankLevels(compared, judged.site.nominalV), measured);
}

/**
 * The same nameplates built the other way: shown beside the bank wherever one of the two is near or over a limit.
 * @param judged settled site and its network
 * @param choice bank and settings
 * @param verdict of the bank itself
 * @returns the other way judged, or null where there is nothing to compare
 * @source method-limits
 */
export function rivalOf(judged: Judged, { bank, control }: BankChoice, verdict: Verdict): Rival | null {
  const detuned = bank.groups.some((group) => group.reactorPct > 0);
  if (bank.groups.length === 0 || (!detuned && verdict === 'clear')) return null;
  const groups = bank.groups.map((group) => ({ ...group, reactorPct: detuned ? 0 : RIVAL_REACTOR_PCT }));
  const rival = { ...bank, groups };
  const levels = bankLevels(rival, judged.site.nominalV);
  const margins = marginMap(judged.model, rival, levels, basisOf(judged, control));
  const judgement = judge(judged, rival, control);
  return {
    bank: rival,
    verdict: overallVerdict(judged, judgement),
    margins,
    levelsOver: margins.sharePct.filter((row, k) => k > 0 && row.some((share) => share > 100)).length,
    levelsAll: levels.length - 1,
  };
}
