import { couplesAtPrimary } from '../duty/limits-point.js';
import { COMMON_CATALOGUE } from '../layout/candidates.js';
import { siteNetwork } from '../network/network-model.js';
import { Stopped, type Watch } from '../problem.js';
import { withEffects } from './effects.js';
import type { Judged } from './judge-basis.js';
import type { BankOutcome } from './outcome.js';
import { reactorTrials } from './reactor-choice.js';
import { robustness } from './robustness.js';

/**
 * The same outcome with what says how firm it is: ranges in which the verdict stands, one stage out, the effect of each
 * assumption, and the customary reactor ratios side by side. Some sixty judgements: apart, so that a bank under the
 * hand needn't wait for them.
 * @param outcome a bank planned or judged
 * @param watch progress and stopping
 * @returns a new outcome; its bank, verdict and figures are unchanged
 * @throws Stopped where the watch says so
 * @source method-robustness
 */
export function withRobustness<T extends BankOutcome>(outcome: T, watch?: Watch): T {
  const { site, bank, result } = outcome;
  if (bank.groups.length === 0) return outcome;
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
  const trials = reactorTrials(judged, bank, result.control, COMMON_CATALOGUE.ratedV);
  step(1);
  return { ...outcome, result: { ...result, robustness: ranges, assumptions, reactorTrials: trials } };
}
