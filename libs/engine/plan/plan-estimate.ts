import { settleCatalogue } from '../layout/candidates.js';
import { InputProblem, type Remark, remark } from '../problem.js';
import type { ZoneTable } from '../record/zone-table.js';
import { type BankByNeed, bankByNeed } from './bank-by-need.js';
import { estimateMoney } from './estimate-money.js';
import { estimateOutcome } from './estimate-outcome.js';
import type { EstimateOutcome } from './estimate-result.js';
import { type EstimateStudy, studyEstimate } from './estimate-study.js';
import { bankLines } from './plan-lines.js';
import { settleBank, settleControl } from './settle-bank.js';
import type { Site } from './site.js';

/**
 * Proposes a bank without a record: the preferred layout that gives the upper bound of the need, judged on the network.
 * @param site validated site with an `estimate`; its own `bank` lends nothing
 * @param zone the site's zone over the months of the bills
 * @returns the outcome, never better than `watch`
 * @throws InputProblem where the inputs contradict each other
 * @source method-estimate
 */
export function planEstimate(site: Site, zone: ZoneTable): EstimateOutcome {
  const study = studyEstimate(site, zone);
  const { bank: nothing } = settleBank({ stages: [] }, site.frequencyHz);
  const { catalogue, absent } = settleCatalogue(site.catalogue, 2);
  const isNeeded = study.load.sizedKvar > 0;
  const chosen = isNeeded ? bankByNeed(study, site, catalogue, study.load.sizedKvar) : null;
  const bank = chosen?.bank ?? nothing;
  const { control, assumptions } = settleControl(site.control, bank, study.site);
  const priced = estimateMoney(study, site, bank);
  return estimateOutcome('plan', study, {
    bank,
    control,
    reasons: isNeeded ? choiceReasons(chosen) : [],
    assumptions: [
      ...bankLines(bank),
      ...assumptions,
      ...(isNeeded ? absent : []).map((key) => remark(`default.catalogue.${key}`, {}, { path: `catalogue.${key}` })),
      ...(site.bank === undefined ? [] : [remark('bank.ignored', {}, { path: 'bank' })]),
      ...unusedLines(site),
      ...priced.moneyAssumptions,
    ],
    money: priced.money,
    moneyRefused: priced.moneyRefused,
  });
}

/**
 * Judges the site's own bank without a record, against the bounds of its need and on its network.
 * @param site validated site with an `estimate` and a `bank`
 * @param zone the site's zone over the months of the bills
 * @returns the outcome, never better than `watch`
 * @throws InputProblem where the site has no bank or the inputs contradict each other
 * @source method-estimate
 */
export function assessEstimate(site: Site, zone: ZoneTable): EstimateOutcome {
  if (site.bank === undefined) {
    throw new InputProblem([{ code: 'missing', path: 'bank', expected: 'the bank to judge', found: 'nothing' }]);
  }
  const study: EstimateStudy = studyEstimate(site, zone);
  const { bank, assumptions, findings } = settleBank(site.bank, site.frequencyHz);
  const settled = settleControl(site.control, bank, study.site);
  const priced = estimateMoney(study, site, bank);
  return estimateOutcome('assess', study, {
    bank,
    control: settled.control,
    reasons: findings,
    assumptions: [...assumptions, ...settled.assumptions, ...unusedLines(site), ...priced.moneyAssumptions],
    money: priced.money,
    moneyRefused: priced.moneyRefused,
  });
}

function choiceReasons(chosen: BankByNeed | null): Remark[] {
  if (chosen === null) return [remark('layout.noCandidate', {}, { path: 'catalogue' })];
  if (chosen.shortOf === 'needOutOfReach') return [remark('estimate.needOutOfReach', {}, { path: 'catalogue' })];
  return chosen.shortOf === 'onlyAvoid' ? [remark('layout.onlyAvoid', {}, { path: 'catalogue' })] : [];
}

// Costs and what is searched by them need switchings and hours, which an estimate does not have.
function unusedLines(site: Site): Remark[] {
  const names = [
    ...(['prices', 'finance'] as const).filter((key) => site[key] !== undefined),
    ...(['switches', 'cabinets'] as const)
      .filter((key) => site.catalogue?.[key] !== undefined)
      .map((key) => `catalogue.${key}`),
  ];
  return names.map((name) => remark('estimate.notUsed', { name }, { path: name }));
}
