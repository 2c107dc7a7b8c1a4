import { settleCatalogue } from '../layout/candidates.js';
import { meetsTarget, operationMonths } from '../operation/operation.js';
import { type Remark, remark, type Watch } from '../problem.js';
import type { LoadRecord } from '../record/load-record.js';
import type { ZoneTable } from '../record/zone-table.js';
import { type Chosen, chooseBank } from './choose-bank.js';
import type { JudgedOn } from './judged-on.js';
import { type MoneyStudy, moneyStudy } from './money-study.js';
import type { Outcome } from './outcome.js';
import { outcomeOf } from './outcome-of.js';
import { planByMoney } from './plan-by-money.js';
import { bankLines } from './plan-lines.js';
import { newMoney, unusedPapers } from './price-bank.js';
import { settleBank, settleControl } from './settle-bank.js';
import type { Site } from './site.js';
import { meterWithConstant, type Study, studySite } from './study.js';
import { onlyWay } from './weighed-bank.js';

/**
 * Designs the bank that pays where the site gives a tariff, prices and sizes of stages; else the smallest bank that
 * meets the target in every billing month without over-correcting and is clear, or, where none does, the nearest.
 * @param site validated site; its own `bank` lends nothing
 * @param record the meter's record
 * @param zone the site's zone over the record
 * @param watch progress and stopping
 * @returns the outcome
 * @throws InputProblem where the inputs contradict each other, Stopped where the watch says so
 * @source method-layout
 */
export function planBank(site: Site, record: LoadRecord, zone: ZoneTable, watch?: Watch): Outcome {
  return planOn(studySite(site, record, zone), site, watch).outcome;
}

/**
 * Designs the bank on a study.
 * @param study site and record
 * @param site validated site; its own `bank` lends nothing
 * @param watch progress and stopping
 * @returns the outcome with the money it was weighed by
 * @throws InputProblem where the inputs contradict each other, Stopped where the watch says so
 * @source method-layout
 */
export function planOn(study: Study, site: Site, watch?: Watch): JudgedOn {
  watch?.report(0.05);
  const money = moneyStudy(study, site);
  const isSearch = money?.prices != null && site.catalogue?.stageKvar !== undefined;
  const outcome = isSearch ? planByMoney(study, site, money, watch) : planByTarget(study, site, money, watch);
  watch?.report(1);
  return { outcome, study, money };
}

function planByTarget(study: Study, site: Site, money: MoneyStudy | null, watch?: Watch): Outcome {
  const { record } = study;
  const without = operationMonths(meterWithConstant(study, 0), study.months, record.intervalS / 3600);
  const { bank: nothing } = settleBank({ stages: [] }, site.frequencyHz);
  if (meetsTarget(without, study.site.targetPowerFactor)) {
    const { control, assumptions } = settleControl(site.control, nothing, study.site);
    const lines = [...assumptions, ...inputLines(site, []), ...(money?.assumptions ?? [])];
    const said = { reasons: metAlready(study), assumptions: lines };
    return outcomeOf('plan', study, { bank: nothing, control, said, money: newMoney(study, site, money, null) });
  }
  const { catalogue, absent } = settleCatalogue(site.catalogue, 2);
  const chosen = chooseBank(study, site, catalogue, watch);
  const bank = chosen?.bank ?? nothing;
  return outcomeOf('plan', study, {
    bank,
    control: chosen?.control ?? settleControl(site.control, bank, study.site).control,
    ...(chosen === null ? {} : { operated: chosen.operated }),
    said: {
      reasons: chosen === null ? [remark('layout.noCandidate', {}, { path: 'catalogue' })] : nearestReasons(chosen),
      assumptions: [
        ...(chosen === null ? [] : bankLines(bank)),
        ...(chosen?.assumptions ?? []),
        ...inputLines(site, absent),
        ...(money?.assumptions ?? []),
      ],
      // A bank that falls short of the target is no clear answer, however well it stays within its limits.
      atBest: chosen === null || chosen.shortOf !== null ? 'watch' : 'clear',
    },
    money: newMoney(study, site, money, chosen?.bank ?? null),
    priced: onlyWay(site, money, chosen),
  });
}

// Needed in single intervals, and yet every billing month holds the target already.
function metAlready(study: Study): Remark[] {
  const { maxKvar } = study.requirement;
  const { targetPowerFactor } = study.site;
  if (maxKvar <= 1e-9) return [];
  return [remark('need.metEveryMonth', { targetPowerFactor, maxKvar }, { unit: 'kvar' })];
}

function nearestReasons(chosen: Chosen): Remark[] {
  return chosen.shortOf === null ? [] : [remark(`layout.${chosen.shortOf}`, {}, { path: 'catalogue' })];
}

function inputLines(site: Site, absent: readonly string[]): Remark[] {
  return [
    ...absent.map((key) => remark(`default.catalogue.${key}`, {}, { path: `catalogue.${key}` })),
    ...(site.bank === undefined ? [] : [remark('bank.ignored', {}, { path: 'bank' })]),
    ...unusedPapers(site),
    // cabinets are priced with any bank, switches chosen from in a search alone
    ...(site.catalogue?.switches === undefined
      ? []
      : [remark('money.unused', { name: 'catalogue.switches' }, { path: 'catalogue.switches' })]),
  ];
}
