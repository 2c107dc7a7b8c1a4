import type { Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import type { SettledCatalogue } from '../layout/candidates.js';
import { effectiveKvar } from '../layout/stage.js';
import type { Control } from '../operation/control.js';
import { meetsTarget } from '../operation/operation.js';
import { type Remark, Stopped, type Watch } from '../problem.js';
import { BankCandidates, type Candidate } from './bank-candidates.js';
import { judge, overallVerdict } from './judge-basis.js';
import { overCorrectionKvar } from './reasons.js';
import { settleControl } from './settle-bank.js';
import type { Site } from './site.js';
import { type Operated, operate, type Study } from './study.js';
import { TargetRuns } from './target-runs.js';
import { leastTotalKvar } from './total-bound.js';

/** The bank that was chosen, and what it falls short of where nothing was clear. */
export interface Chosen {
  bank: Bank;
  control: Control;
  assumptions: Remark[];
  shortOf: 'onlyWatch' | 'targetOutOfReach' | 'onlyAvoid' | null;
  /** the bank simulated */
  operated: Operated;
}

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
  readonly #candidates: BankCandidates;
  readonly #runs: TargetRuns;

  constructor(study: Study, site: Site, catalogue: SettledCatalogue, watch: Watch | undefined) {
    this.#study = study;
    this.#site = site;
    this.#catalogue = catalogue;
    this.#watch = watch;
    this.#candidates = new BankCandidates(study, site, catalogue);
    this.#runs = new TargetRuns(study);
  }

  choose(): Chosen | null {
    const boundKvar = leastTotalKvar(this.#study, this.#candidates.mostKvar());
    const reaching = boundKvar === null ? [] : this.#list(boundKvar);
    const within = this.#preferredWithin(reaching);
    if (within !== null) return within;
    const all = this.#list(0).filter((candidate) => this.#flows(candidate) !== null);
    if (all.length === 0) return null;
    const met = reaching.filter((candidate) => this.#flows(candidate) !== null);
    return this.#nearest(all) ?? this.#despiteLimits(met.length > 0 ? met : all);
  }

  // The first that meets the target, does not over-correct and is clear; else the first that is `watch`.
  #preferredWithin(reaching: readonly Candidate[]): Chosen | null {
    let watched: Chosen | null = null;
    for (const [k, candidate] of reaching.entries()) {
      this.#step(k / reaching.length);
      if (this.#candidates.isRuledOut(candidate)) continue;
      const flows = this.#flows(candidate);
      if (flows === null || flows === 'avoid' || (watched !== null && flows === 'watch')) continue;
      const operated = this.#leastSetPoint(candidate);
      if (operated === null) continue;
      const verdict = overallVerdict(this.#study, judge(this.#study, candidate.bank, operated.control));
      if (verdict === 'clear') return this.#chosen(candidate, operated, null);
      if (verdict === 'watch') watched ??= this.#chosen(candidate, operated, 'onlyWatch');
    }
    return watched;
  }

  #step(fraction: number): void {
    if (this.#watch?.stopped()) throw new Stopped('stopped while choosing the bank');
    this.#watch?.report(0.1 + 0.8 * fraction);
  }

  #list(boundKvar: number): Candidate[] {
    const greatestKvar = this.#greatestKvar();
    return this.#candidates.list(boundKvar, (candidate) => this.#tooLarge(candidate, greatestKvar));
  }

  #flows(candidate: Candidate): Verdict | null {
    return this.#candidates.flows(candidate);
  }

  // Most that could be wanted of a bank, as effective kvar at nominal voltage.
  #greatestKvar(): number {
    const { load, voltageScale } = this.#study;
    return load.reactiveKvar.reduce((most, q, i) => {
      const scale = voltageScale === null ? 1 : voltageScale[i]!;
      return scale > 0 ? Math.max(most, q / scale) : most;
    }, 0);
  }

  // Where every stage is free again by the next interval, one that no load calls for is never connected and changes
  // nothing; where a delay lasts longer it may stand in for another.
  #tooLarge({ bank, effectiveKvar: totalKvar, smallestKvar }: Candidate, greatestKvar: number): boolean {
    const { maxTotalKvar } = this.#catalogue;
    if (maxTotalKvar !== null) return totalKvar > maxTotalKvar;
    if (this.#candidates.basis(bank).reconnectDelayS > this.#study.record.intervalS) return false;
    const largestKvar = Math.max(...bank.groups.map((group) => effectiveKvar(group, this.#study.site.nominalV)));
    return totalKvar - largestKvar - smallestKvar >= greatestKvar;
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
    const { targetPowerFactor } = this.#study.site;
    for (const setPointPowerFactor of this.#setPoints()) {
      const operated = this.#runs.run(candidate.bank, this.#control(candidate, setPointPowerFactor), (month) =>
        meetsTarget([month], targetPowerFactor),
      );
      if (operated === null) continue;
      return this.#overCorrects(candidate, operated) ? null : operated;
    }
    return null;
  }

  #control({ bank }: Candidate, setPointPowerFactor: number): Control {
    const { control } = settleControl(this.#site.control, bank, this.#study.site);
    return { ...control, setPointPowerFactor };
  }

  #overCorrects(candidate: Candidate, operated: Operated): boolean {
    return overCorrectionKvar(operated) > candidate.smallestKvar * (1 + 1e-9);
  }

  // Nothing within limits meets the target: the highest lowest month wins, then the order of preference.
  #nearest(all: Candidate[]): Chosen | null {
    const setPoints = this.#setPoints();
    const setPointPowerFactor = setPoints[setPoints.length - 1]!;
    let best: { candidate: Candidate; operated: Operated; lowest: number } | null = null;
    for (const candidate of all) {
      if (this.#flows(candidate) === 'avoid') continue;
      const passed: number = best === null ? Number.NEGATIVE_INFINITY : best.lowest + 1e-9;
      let lowest = 1;
      const operated = this.#runs.run(
        candidate.bank,
        this.#control(candidate, setPointPowerFactor),
        ({ powerFactorLagging }) => {
          lowest = Math.min(lowest, powerFactorLagging ?? 1);
          return lowest > passed;
        },
      );
      if (operated === null || this.#overCorrects(candidate, operated)) continue;
      if (judge(this.#study, candidate.bank, operated.control).verdict === 'avoid') continue;
      best = { candidate, operated, lowest };
    }
    return best === null ? null : this.#chosen(best.candidate, best.operated, 'targetOutOfReach');
  }

  #despiteLimits(candidates: Candidate[]): Chosen {
    for (const candidate of candidates) {
      const operated = this.#leastSetPoint(candidate);
      if (operated !== null) return this.#chosen(candidate, operated, 'onlyAvoid');
    }
    const first = candidates[0]!;
    const setPoints = this.#setPoints();
    const control = this.#control(first, setPoints[setPoints.length - 1]!);
    return this.#chosen(first, operate(this.#study, first.bank, control), 'onlyAvoid');
  }

  #chosen({ bank }: Candidate, operated: Operated, shortOf: Chosen['shortOf']): Chosen {
    const { assumptions } = settleControl(this.#site.control, bank, this.#study.site);
    const withoutSetPoint = assumptions.filter(({ path }) => path !== 'control.setPointPowerFactor');
    return { bank, control: operated.control, assumptions: withoutSetPoint, shortOf, operated };
  }
}
