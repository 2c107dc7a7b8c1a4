import { couplesAtPrimary } from '../duty/limits-point.js';
import { COMMON_CATALOGUE } from '../layout/candidates.js';
import type { CostBasis } from '../money/capital.js';
import type { Money } from '../money/money-result.js';
import { siteNetwork } from '../network/network-model.js';
import { Stopped, type Watch } from '../problem.js';
import type { LoadRecord } from '../record/load-record.js';
import type { ZoneTable } from '../record/zone-table.js';
import { assessOn } from './assess-bank.js';
import { withEffects } from './effects.js';
import type { Judged } from './judge-basis.js';
import { withMoneyEffects } from './money-effects.js';
import { MoneyMover, type WeighedWays } from './money-mover.js';
import { moneyRobustness } from './money-robustness.js';
import { type MoneyStudy, moneyStudy } from './money-study.js';
import type { BankOutcome, Outcome } from './outcome.js';
import { planOn } from './plan-bank.js';
import { pricedTrials, reactorTrials } from './reactor-choice.js';
import type { BankResult } from './result.js';
import { robustness } from './robustness.js';
import type { Site } from './site.js';
import { spareWays } from './spare-ways.js';
import { type Study, studySite } from './study.js';
import type { PricedWays } from './weighed-bank.js';
import { scaleOf } from './weigh-again.js';

/**
 * The same outcome with what says how firm it is: ranges in which the verdict stands, one stage out, the effect of each
 * assumption, the customary reactor ratios side by side, room for more stages, and how firm the money is. Some sixty
 * judgements: apart, so that a bank under the hand needn't wait for them.
 * @param outcome a bank planned or judged
 * @param watch progress and stopping
 * @returns a new outcome; its bank, verdict and figures are unchanged
 * @throws Stopped where the watch says so
 * @source method-robustness
 */
export function withRobustness<T extends BankOutcome>(outcome: T, watch?: Watch): T {
  return robustBy(outcome, weighedAgain(outcome), watch);
}

/**
 * Plans or judges a bank and says how firm the outcome is: `planBank` or `assessBank`, then `withRobustness`, the site
 * studied once for both.
 * @param kind which of the two it is
 * @param given validated site, the meter's record, the site's zone over it
 * @param watch progress and stopping
 * @returns the outcome
 * @throws InputProblem where the inputs contradict each other, Stopped where the watch says so
 * @source method-robustness
 */
export function firmOutcome(
  kind: Outcome['kind'],
  { site, record, zone }: { site: Site; record: LoadRecord; zone: ZoneTable },
  watch?: Watch,
): Outcome {
  const first = watch && partOf(watch, 0, JUDGED);
  const judged =
    kind === 'plan' ? planOn(studySite(site, record, zone), site, first) : assessOn(site, record, zone, first);
  const { priced } = judged.outcome;
  const weighed = priced === null ? null : waysOn(judged.study, judged.money, priced);
  return robustBy(judged.outcome, weighed, watch && partOf(watch, JUDGED, 1));
}

/** Share of the whole at which a bank is planned or judged. */
const JUDGED = 0.63;

function partOf(watch: Watch, from: number, to: number): Watch {
  return { report: (fraction) => watch.report(from + (to - from) * fraction), stopped: () => watch.stopped() };
}

function robustBy<T extends BankOutcome>(outcome: T, weighed: WeighedWays | null, watch?: Watch): T {
  const { site, bank, result } = outcome;
  if (bank.groups.length === 0) return withMoney(outcome, weighed);
  const { supply, loads, nominalV, topology } = site;
  const judged: Judged = {
    site,
    model: siteNetwork(supply, loads, { nominalV, loadA: outcome.loadA, topology, primary: couplesAtPrimary(site) }),
  };
  const step = (fraction: number): void => {
    if (watch?.stopped()) throw new Stopped('stopped while moving the inputs');
    watch?.report(fraction);
  };
  const ranges = robustness(judged, bank, result.control);
  step(0.6);
  const assumptions = withEffects(result.assumptions, judged, bank, result.control);
  step(0.8);
  const cost = costOf(weighed);
  const trials = pricedTrials(reactorTrials(judged, bank, result.control, COMMON_CATALOGUE.ratedV), bank, cost);
  const more = spareWays(judged, bank, result.control, cost);
  step(1);
  const firm = {
    ...outcome,
    result: { ...result, robustness: ranges, assumptions, reactorTrials: trials, spareWays: more },
  };
  return withMoney(firm, weighed);
}

function costOf(weighed: WeighedWays | null): CostBasis | null {
  const way = weighed?.ways.find(({ name }) => name === weighed.chosen);
  const prices = weighed?.scale.money.prices ?? null;
  return prices && { ...prices, switchKind: way?.switchKind ?? null };
}

// An estimate has bills of its own, and nothing that was weighed.
function isPriced(result: BankResult): result is BankResult & { money: Money } {
  return 'money' in result && result.money !== null;
}

function weighedAgain({ priced }: BankOutcome): WeighedWays | null {
  if (priced === null) return null;
  const study = studySite(priced.site, priced.record, priced.zone);
  return waysOn(study, moneyStudy(study, priced.site), priced);
}

function waysOn(study: Study, money: MoneyStudy | null, { ways, chosen }: PricedWays): WeighedWays | null {
  return money && { scale: scaleOf(study, money), ways, chosen };
}

function withMoney<T extends BankOutcome>(outcome: T, weighed: WeighedWays | null): T {
  const { result } = outcome;
  if (weighed === null || !isPriced(result)) return outcome;
  const mover = new MoneyMover(weighed);
  const table = moneyRobustness(weighed, mover);
  const savingRange = table.ways.find(({ name }) => name === weighed.chosen)?.saving ?? null;
  const money = { ...result.money, savingRange, robustness: table.ways.length === 0 ? null : table };
  const assumptions =
    savingRange === null ? result.assumptions : withMoneyEffects(result.assumptions, weighed, mover, savingRange);
  return { ...outcome, result: { ...result, money, assumptions } };
}
