import { NEAR_RATIO } from '../duty/duty-row.js';
import { inrushStages } from '../duty/inrush.js';
import { inrushDuty, networkIsUnknown, PLAIN_SHARE_PCT } from '../duty/judge-bank.js';
import { CAPACITOR_RULES } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import type { Build } from '../layout/search-space.js';
import { summarizeNetwork } from '../network/network-check.js';
import { overallVerdict } from './judge-basis.js';
import type { Study } from './study.js';

/** What closed forms alone say against a clear verdict: a sieve before any network is looked at. */
export class ClearScreen {
  readonly #study: Study;
  readonly #shortCircuitMva: number;
  readonly #greatestGrowth: number;
  /** neither the record nor unknown loads leave anything open */
  readonly #known: boolean;
  /** distorting loads are too large for stages without reactors */
  readonly #plainIsWatched: boolean;

  /** @param study site and record */
  constructor(study: Study) {
    const { site, model } = study;
    const growth = model.corners.factors.map((factor) => factor.capacitanceFactor * factor.inductanceFactor);
    const ratedKva = site.supply.transformers.reduce((sum, { ratedKva: one }) => sum + one, 0);
    const distortingA = (site.loads.distorting ?? []).reduce((sum, { fundamentalA }) => sum + fundamentalA, 0);
    this.#study = study;
    this.#shortCircuitMva = summarizeNetwork(model, []).shortCircuitMva;
    this.#greatestGrowth = Math.max(...growth);
    this.#known = overallVerdict(study, { verdict: 'clear' }) === 'clear' && !networkIsUnknown(site.loads);
    const sharePct = ratedKva === 0 ? 0 : (100 * Math.sqrt(3) * site.nominalV * distortingA) / 1000 / ratedKva;
    this.#plainIsWatched = sharePct > PLAIN_SHARE_PCT;
  }

  /**
   * False where a build can't be clear, whatever its flows.
   * @param build the build
   * @param bank its bank
   * @returns true where nothing speaks against it yet
   * @source method-limits
   */
  mayBeClear(build: Build, bank: Bank): boolean {
    if (!this.#known || !this.#carriesFundamental(build)) return false;
    if (build.reactorPct === 0 && this.#plainIsWatched) return false;
    const { nominalV, frequencyHz, rules } = this.#study.site;
    const stages = inrushStages(bank, { nominalV, frequencyHz, rules, shortCircuitMva: this.#shortCircuitMva });
    return stages.every((stage) => inrushDuty(bank, stage, rules).every(({ verdict }) => verdict === 'clear'));
  }

  // The fundamental voltage alone, in the corner of greatest reactor ratio: a condition that clear voltages need.
  #carriesFundamental({ ratedV, reactorPct }: Build): boolean {
    const { rules, nominalV, highestV } = this.#study.site;
    const rise = 1 / (1 - (reactorPct / 100) * this.#greatestGrowth);
    const { continuousVoltageRatio, highestVoltageRatio } = CAPACITOR_RULES[rules];
    const highest = (highestV * rise) / (highestVoltageRatio * ratedV);
    const continuous = continuousVoltageRatio === null ? 0 : (nominalV * rise) / (continuousVoltageRatio * ratedV);
    return rise > 0 && Math.max(highest, continuous) <= NEAR_RATIO.voltage * (1 + 1e-9);
  }
}
