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
import { overCorrectionKvar } from './reasons.js';
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

/** One layout with one reactor ratio; built at the least rated voltage at which the voltage duties are clear. */
interface Family {
  layout: Layout;
  reactorPct: number;
  /** rated voltages that carry the fundamental, ascending [V] */
  voltages: readonly number[];
  /** null where no voltage is clear; absent until it was asked for */
  built?: { ratedV: number; flows: Verdict } | null;
}

/** A family at one of its voltages; a candidate only where that is the voltage it is built at. */
interface Candidate extends Sized {
  family: Family;
  ratedV: number;
  bank: Bank;
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
  readonly #families = new Map<string, Family>();

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
    const all = this.#candidates(layoutsLeft, 0).filter((candidate) => this.#flows(candidate) !== null);
    if (all.length === 0) return null;
    const met = reaching.filter((candidate) => this.#flows(candidate) !== null);
    return this.#nearest(all) ?? this.#despiteLimits(met.length > 0 ? met : all);
  }

  // The first that meets the target, does not over-correct and is clear; else the first that is `watch`.
  #preferredWithin(reaching: readonly Candidate[]): Chosen | null {
    let watched: Chosen | null = null;
    for (const [k, candidate] of reaching.entries()) {
      this.#step(k / reaching.length);
      const flows = this.#flows(candidate);
      if (flows === null || flows === 'avoid' || (watched !== null && flows === 'watch')) continue;
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
    const { nominalV } = this.#study.site;
    const built = { ratedV, nominalV, reactorPct, reactorQuality: REACTOR_QUALITY, catalogue: this.#catalogue };
    return bankOf(layout, built);
  }

  #totalKvar(bank: Bank): number {
    return bank.groups.reduce((sum, g) => sum + g.count * effectiveKvar(g, this.#study.site.nominalV), 0);
  }

  #step(fraction: number): void {
    if (this.#watch?.stopped()) throw new Stopped('stopped while choosing the bank');
    this.#watch?.report(0.1 + 0.8 * fraction);
  }

  // Every layout, reactor ratio and voltage that could be built, in order of preference; which of a family's voltages it
  // is built at is judged when a candidate is first looked at. A higher voltage only makes the bank smaller, so a layout
  // that falls below the bound is done.
  #candidates(found: readonly Layout[], boundKvar: number): Candidate[] {
    const greatestKvar = this.#greatestKvar();
    const candidates: Candidate[] = [];
    for (const reactorPct of this.#catalogue.reactorPct) {
      const voltages = this.#catalogue.ratedV.filter((ratedV) => this.#carriesFundamental(ratedV, reactorPct));
      for (const layout of found) {
        const family = this.#family(layout, reactorPct, voltages);
        for (const ratedV of voltages) {
          const candidate = this.#candidate(family, ratedV);
          if (candidate.effectiveKvar < boundKvar) break;
          if (!this.#tooLarge(candidate, greatestKvar)) candidates.push(candidate);
        }
      }
    }
    return candidates.sort(preferred);
  }

  #family(layout: Layout, reactorPct: number, voltages: readonly number[]): Family {
    const key = `${layout.count} ${layout.sizeKvar} ${layout.halves} ${reactorPct}`;
    const known = this.#families.get(key) ?? { layout, reactorPct, voltages };
    this.#families.set(key, known);
    return known;
  }

  #candidate(family: Family, ratedV: number): Candidate {
    const { layout, reactorPct } = family;
    const bank = this.#bank(layout, ratedV, reactorPct);
    const kvar = bank.groups.map((group) => effectiveKvar(group, this.#study.site.nominalV));
    return {
      family,
      ratedV,
      bank,
      effectiveKvar: this.#totalKvar(bank),
      stages: layout.count + layout.halves,
      smallestKvar: Math.min(...kvar),
      reactorPct,
    };
  }

  // Verdict of the flows alone, which the full judgement is never milder than; null at a voltage that is not the family's.
  #flows({ family, ratedV }: Candidate): Verdict | null {
    if (family.built === undefined) family.built = this.#leastClearVoltage(family);
    return family.built?.ratedV === ratedV ? family.built.flows : null;
  }

  #leastClearVoltage({ layout, reactorPct, voltages }: Family): { ratedV: number; flows: Verdict } | null {
    for (const ratedV of voltages) {
      const bank = this.#bank(layout, ratedV, reactorPct);
      const quick = quickJudge(this.#study.model, bank, this.#basis(bank));
      if (quick.voltages === 'clear') return { ratedV, flows: this.#opened(quick.verdict) };
    }
    return null;
  }

  // Most that could be wanted of a bank, as effective kvar at nominal voltage.
  #greatestKvar(): number {
    const { load, voltageScale } = this.#study;
    return load.reactiveKvar.reduce((most, q, i) => {
      const scale = voltageScale === null ? 1 : voltageScale[i]!;
      return scale > 0 ? Math.max(most, q / scale) : most;
    }, 0);
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

  // Where every stage is free again by the next interval, one that no load calls for is never connected and changes
  // nothing; where a delay lasts longer it may stand in for another.
  #tooLarge({ bank, effectiveKvar: totalKvar, smallestKvar }: Candidate, greatestKvar: number): boolean {
    const { maxTotalKvar } = this.#catalogue;
    if (maxTotalKvar !== null) return totalKvar > maxTotalKvar;
    if (this.#basis(bank).reconnectDelayS > this.#study.record.intervalS) return false;
    const largestKvar = Math.max(...bank.groups.map((group) => effectiveKvar(group, this.#study.site.nominalV)));
    return totalKvar - largestKvar - smallestKvar >= greatestKvar;
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
      if (this.#flows(candidate) === 'avoid') continue;
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
