import { NEAR_RATIO } from '../duty/duty-row.js';
import type { JudgeBasis } from '../duty/judge-bank.js';
import { LimitWitnesses, quickJudge } from '../duty/quick-judge.js';
import { CAPACITOR_RULES, graver, type Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import { bankOf, type Layout, layouts, preferred, type SettledCatalogue, type Sized } from '../layout/candidates.js';
import { effectiveKvar } from '../layout/stage.js';
import { basisOf, type Judged } from './judge-basis.js';
import { settleControl } from './settle-bank.js';
import type { Site } from './site.js';

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
export interface Candidate extends Sized {
  family: Family;
  ratedV: number;
  bank: Bank;
}

const REACTOR_QUALITY = 30;

/** The banks a catalogue makes for a network, in their order of preference, whatever the load is known from. */
export class BankCandidates {
  readonly #judged: Judged;
  readonly #site: Site;
  readonly #catalogue: SettledCatalogue;
  readonly #layouts: Layout[];
  readonly #families = new Map<string, Family>();
  readonly #witnesses = new LimitWitnesses();

  /**
   * @param judged settled site and its network
   * @param site validated site
   * @param catalogue what may be built
   */
  constructor(judged: Judged, site: Site, catalogue: SettledCatalogue) {
    this.#judged = judged;
    this.#site = site;
    this.#catalogue = catalogue;
    this.#layouts = layouts(catalogue);
  }

  /**
   * No candidate is larger: every layout at the least voltage and the greatest reactor ratio.
   * @returns effective kvar
   * @source method-layout
   */
  mostKvar(): number {
    const ratedV = this.#catalogue.ratedV[0]!;
    const reactorPct = this.#catalogue.reactorPct[this.#catalogue.reactorPct.length - 1]!;
    return this.#layouts.reduce(
      (most, layout) => Math.max(most, this.#totalKvar(this.#bank(layout, ratedV, reactorPct))),
      0,
    );
  }

  /**
   * Every layout, reactor ratio and voltage that could be built; which of a family's voltages it is built at is judged
   * when a candidate is first looked at. A higher voltage only makes the bank smaller, so a layout that falls below the
   * bound is done.
   * @param boundKvar least effective total [kvar]
   * @param tooLarge candidates that are left out
   * @returns candidates, preferred ones first
   * @source method-layout
   */
  list(boundKvar: number, tooLarge: (candidate: Candidate) => boolean): Candidate[] {
    const candidates: Candidate[] = [];
    for (const reactorPct of this.#catalogue.reactorPct) {
      const voltages = this.#catalogue.ratedV.filter((ratedV) => this.#carriesFundamental(ratedV, reactorPct));
      for (const layout of this.#layouts) {
        const family = this.#family(layout, reactorPct, voltages);
        for (const ratedV of voltages) {
          const candidate = this.#candidate(family, ratedV);
          if (candidate.effectiveKvar < boundKvar) break;
          if (!tooLarge(candidate)) candidates.push(candidate);
        }
      }
    }
    return candidates.sort(preferred);
  }

  /**
   * Verdict of the flows alone, which the full judgement is never milder than.
   * @param candidate one of the list
   * @returns the verdict, or null at a voltage that is not the family's
   * @source method-limits
   */
  flows({ family, ratedV }: Candidate): Verdict | null {
    if (family.built === undefined) family.built = this.#leastClearVoltage(family);
    return family.built?.ratedV === ratedV ? family.built.flows : null;
  }

  /**
   * Does a candidate pass a limit where others did before; a few flows instead of all.
   * @param candidate one of the list
   * @returns true where `flows`, not asked yet, would say `avoid` or null
   * @source method-limits
   */
  isRuledOut({ family, bank }: Candidate): boolean {
    return family.built === undefined && this.#witnesses.speakAgainst(this.#judged.model, bank, this.basis(bank));
  }

  /**
   * What a bank is judged by, with the site's controller.
   * @param bank the bank
   * @returns rules, voltages, supply, loads and delay
   */
  basis(bank: Bank): JudgeBasis {
    return basisOf(this.#judged, settleControl(this.#site.control, bank, this.#judged.site).control);
  }

  #bank(layout: Layout, ratedV: number, reactorPct: number): Bank {
    const { nominalV } = this.#judged.site;
    const built = { ratedV, nominalV, reactorPct, reactorQuality: REACTOR_QUALITY, catalogue: this.#catalogue };
    return bankOf(layout, built);
  }

  #totalKvar(bank: Bank): number {
    return bank.groups.reduce((sum, g) => sum + g.count * effectiveKvar(g, this.#judged.site.nominalV), 0);
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
    const kvar = bank.groups.map((group) => effectiveKvar(group, this.#judged.site.nominalV));
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

  #leastClearVoltage({ layout, reactorPct, voltages }: Family): { ratedV: number; flows: Verdict } | null {
    for (const ratedV of voltages) {
      const bank = this.#bank(layout, ratedV, reactorPct);
      const quick = quickJudge(this.#judged.model, bank, this.basis(bank));
      this.#witnesses.learn(this.#judged.model, quick);
      if (quick.voltages === 'clear') return { ratedV, flows: this.#opened(quick.verdict) };
    }
    return null;
  }

  // Fundamental voltage alone, in the corner of greatest p: a cheap necessary condition of clear voltage duties.
  #carriesFundamental(ratedV: number, reactorPct: number): boolean {
    const { rules, nominalV, highestV } = this.#judged.site;
    const growth = this.#judged.model.corners.factors.map((f) => f.capacitanceFactor * f.inductanceFactor);
    const rise = 1 / (1 - (reactorPct / 100) * Math.max(...growth));
    const { continuousVoltageRatio, highestVoltageRatio } = CAPACITOR_RULES[rules];
    const highest = (highestV * rise) / (highestVoltageRatio * ratedV);
    const continuous = continuousVoltageRatio === null ? 0 : (nominalV * rise) / (continuousVoltageRatio * ratedV);
    return rise > 0 && Math.max(highest, continuous) <= NEAR_RATIO.voltage;
  }

  #opened(verdict: Verdict): Verdict {
    return this.#judged.site.recordedBank.state === 'unknown' ? graver(verdict, 'watch') : verdict;
  }
}
