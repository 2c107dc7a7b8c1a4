import { NEAR_RATIO } from '../duty/duty-row.js';
import type { JudgeBasis } from '../duty/judge-bank.js';
import { quickJudge } from '../duty/quick-judge.js';
import { CAPACITOR_RULES, graver, type Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import { bankOf, type Layout, layouts, preferred, type SettledCatalogue, type Sized } from '../layout/candidates.js';
import { effectiveKvar } from '../layout/stage.js';
import type { Control } from '../operation/control.js';
import { meetsTarget } from '../operation/operation.js';
import { type Remark, Stopped, type Watch } from '../problem.js';
import { basisOf, judge, overallVerdict } from './judge-basis.js';
import { overCorrectionKvar, smallestStageKvar } from './reasons.js';
import { settleControl } from './settle-bank.js';
import type { Site } from './site.js';
import { type Operated, operate, type Study } from './study.js';
import { leastTotalKvar } from './total-bound.js';

/** The bank that was chosen, and what it falls short of where nothing was clear. */
export interface Chosen {
  bank: Bank;
  control: Control;
  assumptions: Remark[];
  shortOf: 'onlyWatch' | 'targetOutOfReach' | 'onlyAvoid' | null;
}

interface Candidate extends Sized {
  bank: Bank;
  /** verdict of the flows alone; the full judgement is never milder */
  flows: Verdict;
}

const REACTOR_QUALITY = 30;

/**
 * Walks the candidates in their order of preference and takes the first that meets the target in every billing month,
 * does not over-correct and is clear; else the first that is `watch`; else the one that comes nearest to the target
 * within limits; else the first that meets it though a limit is passed.
 * @param study site and record
 * @param site validated site
 * @param catalogue what may be built
 * @param watch progress and stopping
 * @returns the choice, or null where the catalogue makes no candidate
 * @source method-layout
 */
export function chooseBank(study: Study, site: Site, catalogue: SettledCatalogue, watch?: Watch): Chosen | null {
  const chooser = new Chooser(study, site, catalogue, watch);
  return chooser.choose();
}

class Chooser {
  readonly #study: Study;
  readonly #site: Site;
  readonly #catalogue: SettledCatalogue;
  readonly #watch: Watch | undefined;

  constructor(study: Study, site: Site, catalogue: SettledCatalogue, watch: Watch | undefined) {
    this.#study = study;
    this.#site = site;
    this.#catalogue = catalogue;
    this.#watch = watch;
  }

  choose(): Chosen | null {
    const layoutsLeft = layouts(this.#catalogue);
    const mostKvar = this.#mostKvar(layoutsLeft);
    const boundKvar = leastTotalKvar(this.#study, mostKvar);
    const reaching = boundKvar === null ? [] : this.#candidates(layoutsLeft, boundKvar);
    const within = this.#preferredWithin(reaching);
    if (within !== null) return within;
    const all = this.#candidates(layoutsLeft, 0);
    if (all.length === 0) return null;
    return this.#nearest(all) ?? this.#despiteLimits(reaching.length > 0 ? reaching : all);
  }

  // The first that meets the target, does not over-correct and is clear; else the first that is `watch`.
  #preferredWithin(reaching: readonly Candidate[]): Chosen | null {
    let watched: Chosen | null = null;
    for (const [k, candidate] of reaching.entries()) {
      this.#step(k / reaching.length);
      if (candidate.flows === 'avoid' || (watched !== null && candidate.flows === 'watch')) continue;
      const operated = this.#leastSetPoint(candidate);
      if (operated === null) continue;
      const verdict = overallVerdict(this.#study, judge(this.#study, candidate.bank, operated.control));
      if (verdict === 'clear') return this.#chosen(candidate, operated.control, null);
      if (verdict === 'watch') watched ??= this.#chosen(candidate, operated.control, 'onlyWatch');
    }
    return watched;
  }

  // No candidate is larger: every layout at the least voltage and the greatest reactor ratio.
  #mostKvar(found: readonly Layout[]): number {
    const ratedV = this.#catalogue.ratedV[0]!;
    const reactorPct = this.#catalogue.reactorPct[this.#catalogue.reactorPct.length - 1]!;
    return found.reduce((most, layout) => Math.max(most, this.#totalKvar(this.#bank(layout, ratedV, reactorPct))), 0);
  }

  #bank(layout: Layout, ratedV: number, reactorPct: number): Bank {
    return bankOf(layout, { ratedV, reactorPct, reactorQuality: REACTOR_QUALITY, catalogue: this.#catalogue });
  }

  #totalKvar(bank: Bank): number {
    return bank.groups.reduce((sum, g) => sum + g.count * effectiveKvar(g, this.#study.site.nominalV), 0);
  }

  #step(fraction: number): void {
    if (this.#watch?.stopped()) throw new Stopped('stopped while choosing the bank');
    this.#watch?.report(0.1 + 0.8 * fraction);
  }

  // Per layout and reactor ratio the least rated voltage at which the voltage duties are clear. A higher voltage only
  // makes the bank smaller, so a layout that falls below the bound is done.
  #candidates(found: readonly Layout[], boundKvar: number): Candidate[] {
    const greatestKvar = this.#study.load.reactiveKvar.reduce((most, q) => Math.max(most, q), 0);
    const candidates: Candidate[] = [];
    for (const reactorPct of this.#catalogue.reactorPct) {
      const voltages = this.#catalogue.ratedV.filter((ratedV) => this.#carriesFundamental(ratedV, reactorPct));
      for (const layout of found) {
        const bank = this.#atLeastVoltage(layout, reactorPct, { voltages, boundKvar, greatestKvar });
        if (bank !== null) candidates.push(bank);
      }
    }
    return candidates.sort(preferred);
  }

  #atLeastVoltage(
    layout: Layout,
    reactorPct: number,
    within: { voltages: readonly number[]; boundKvar: number; greatestKvar: number },
  ): Candidate | null {
    for (const ratedV of within.voltages) {
      const bank = this.#bank(layout, ratedV, reactorPct);
      const totalKvar = this.#totalKvar(bank);
      if (totalKvar < within.boundKvar) return null;
      const smallestKvar = smallestStageKvar(this.#study, bank);
      if (this.#tooLarge(totalKvar, smallestKvar, within.greatestKvar)) continue;
      const quick = quickJudge(this.#study.model, bank, this.#basis(bank));
      if (quick.voltages !== 'clear') continue;
      const stages = layout.count + layout.halves;
      const flows = this.#opened(quick.verdict);
      return { bank, flows, effectiveKvar: totalKvar, stages, smallestKvar, reactorPct };
    }
    return null;
  }

  // Fundamental voltage alone, in the corner of greatest p: a cheap necessary condition of clear voltage duties.
  #carriesFundamental(ratedV: number, reactorPct: number): boolean {
    const { rules, nominalV, highestV } = this.#study.site;
    const growth = this.#study.model.corners.factors.map((f) => f.capacitanceFactor * f.inductanceFactor);
    const rise = 1 / (1 - (reactorPct / 100) * Math.max(...growth));
    const { continuousVoltageRatio, highestVoltageRatio } = CAPACITOR_RULES[rules];
    const highest = (highestV * rise) / (highestVoltageRatio * ratedV);
    const continuous = continuousVoltageRatio === null ? 0 : (nominalV * rise) / (continuousVoltageRatio * ratedV);
    return rise > 0 && Math.max(highest, continuous) <= NEAR_RATIO.voltage;
  }

  #tooLarge(totalKvar: number, smallestKvar: number, greatestKvar: number): boolean {
    const { maxTotalKvar } = this.#catalogue;
    return maxTotalKvar === null ? totalKvar - smallestKvar >= greatestKvar : totalKvar > maxTotalKvar;
  }

  #opened(verdict: Verdict): Verdict {
    return this.#study.site.recordedBank.state === 'unknown' ? graver(verdict, 'watch') : verdict;
  }

  #basis(bank: Bank): JudgeBasis {
    return basisOf(this.#study, settleControl(this.#site.control, bank, this.#study.site).control);
  }

  #setPoints(): number[] {
    const given = this.#site.control?.setPointPowerFactor;
    if (given !== undefined) return [given];
    const listed = this.#site.catalogue?.setPoints;
    if (listed !== undefined) return [...listed].sort((a, b) => a - b);
    const { targetPowerFactor } = this.#study.site;
    const points = [targetPowerFactor];
    for (let k = 1; targetPowerFactor + 0.01 * k < 1 - 1e-9; k++)
      points.push(Number((targetPowerFactor + 0.01 * k).toFixed(6)));
    if (targetPowerFactor < 1) points.push(1);
    return points;
  }

  // The lowest set point that meets the target in every month without over-correcting.
  #leastSetPoint(candidate: Candidate): Operated | null {
    for (const setPointPowerFactor of this.#setPoints()) {
      const operated = this.#operated(candidate, setPointPowerFactor);
      if (!meetsTarget(operated.months, this.#study.site.targetPowerFactor)) continue;
      return this.#overCorrects(candidate, operated) ? null : operated;
    }
    return null;
  }

  #operated(candidate: Candidate, setPointPowerFactor: number): Operated {
    const { control } = settleControl(this.#site.control, candidate.bank, this.#study.site);
    return operate(this.#study, candidate.bank, { ...control, setPointPowerFactor });
  }

  #overCorrects(candidate: Candidate, operated: Operated): boolean {
    return overCorrectionKvar(operated) > candidate.smallestKvar * (1 + 1e-9);
  }

  // Nothing within limits meets the target: the highest lowest month wins, then the order of preference.
  #nearest(all: Candidate[]): Chosen | null {
    const setPoints = this.#setPoints();
    const setPointPowerFactor = setPoints[setPoints.length - 1]!;
    let best: { candidate: Candidate; control: Control; lowest: number } | null = null;
    for (const candidate of all) {
      if (candidate.flows === 'avoid') continue;
      const operated = this.#operated(candidate, setPointPowerFactor);
      const lowest = operated.months.reduce((low, month) => Math.min(low, month.powerFactorLagging ?? 1), 1);
      if (best !== null && lowest <= best.lowest + 1e-9) continue;
      if (this.#overCorrects(candidate, operated)) continue;
      if (judge(this.#study, candidate.bank, operated.control).verdict === 'avoid') continue;
      best = { candidate, control: operated.control, lowest };
    }
    return best === null ? null : this.#chosen(best.candidate, best.control, 'targetOutOfReach');
  }

  #despiteLimits(candidates: Candidate[]): Chosen {
    for (const candidate of candidates) {
      const operated = this.#leastSetPoint(candidate);
      if (operated !== null) return this.#chosen(candidate, operated.control, 'onlyAvoid');
    }
    const first = candidates[0]!;
    const setPoints = this.#setPoints();
    return this.#chosen(first, this.#operated(first, setPoints[setPoints.length - 1]!).control, 'onlyAvoid');
  }

  #chosen(candidate: Candidate, control: Control, shortOf: Chosen['shortOf']): Chosen {
    const { assumptions } = settleControl(this.#site.control, candidate.bank, this.#study.site);
    const withoutSetPoint = assumptions.filter(({ path }) => path !== 'control.setPointPowerFactor');
    return { bank: candidate.bank, control, assumptions: withoutSetPoint, shortOf };
  }
}
