import { InputProblem, type Watch } from '../problem.js';
import type { LoadRecord } from '../record/load-record.js';
import type { ZoneTable } from '../record/zone-table.js';
import type { JudgedOn } from './judged-on.js';
import { moneyStudy } from './money-study.js';
import type { Outcome } from './outcome.js';
import { outcomeOf } from './outcome-of.js';
import { newMoney, unusedPapers } from './price-bank.js';
import { settleBank, settleControl } from './settle-bank.js';
import type { Site } from './site.js';
import { studySite } from './study.js';
import { onlyWay } from './weighed-bank.js';

/**
 * Judges the site's own bank against the record, and prices it as new where the site gives a tariff.
 * @param site validated site with a `bank`
 * @param record the meter's record
 * @param zone the site's zone over the record
 * @param watch progress and stopping
 * @returns the outcome
 * @throws InputProblem where the site has no bank or the inputs contradict each other
 * @source method-limits
 */
export function assessBank(site: Site, record: LoadRecord, zone: ZoneTable, watch?: Watch): Outcome {
  return assessOn(site, record, zone, watch).outcome;
}

/**
 * The same with what it was judged on.
 * @param site validated site with a `bank`
 * @param record the meter's record
 * @param zone the site's zone over the record
 * @param watch progress and stopping
 * @returns the outcome, study and money
 * @throws InputProblem where the site has no bank or the inputs contradict each other
 * @source method-limits
 */
export function assessOn(site: Site, record: LoadRecord, zone: ZoneTable, watch?: Watch): JudgedOn {
  if (site.bank === undefined) {
    throw new InputProblem([{ code: 'missing', path: 'bank', expected: 'the bank to judge', found: 'nothing' }]);
  }
  const study = studySite(site, record, zone);
  watch?.report(0.3);
  const { bank, assumptions, findings } = settleBank(site.bank, site.frequencyHz);
  const settled = settleControl(site.control, bank, study.site);
  const money = moneyStudy(study, site);
  const outcome = outcomeOf('assess', study, {
    bank,
    control: settled.control,
    said: {
      reasons: findings,
      assumptions: [...assumptions, ...settled.assumptions, ...unusedPapers(site), ...(money?.assumptions ?? [])],
    },
    money: newMoney(study, site, money, bank),
    priced: onlyWay(site, money, { bank, control: settled.control }),
  });
  watch?.report(1);
  return { outcome, study, money };
}
