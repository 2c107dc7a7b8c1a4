import type { Bank } from '../layout/bank.js';
import { ratedA, stageOhm } from '../layout/stage.js';
import { CAPACITOR_RULES, type RuleSet } from './rules.js';

/** Peak current of closing one stage of a group, closed forms. */
export interface InrushStage {
  group: number;
  singlePeakA: number;
  singleHz: number;
  /** null where the stage is the only one */
  ontoBankPeakA: number | null;
  ontoBankHz: number | null;
  /** exact peak of the linear circuit; null until it is computed */
  worstPeakA: number | null;
  limitPeakA: number | null;
}

/** What the closed forms need of the site. */
export interface InrushSite {
  nominalV: number;
  frequencyHz: number;
  /** at the greatest fault level [MVA] */
  shortCircuitMva: number;
  rules: RuleSet;
}

/**
 * Peak √2·(U_nom/√3)/√(X_C·X_L) and frequency f·√(X_C/X_L), undamped, reactances at the fundamental.
 * @param capacitiveOhm X_C [Ω]
 * @param inductiveOhm X_L [Ω]
 * @param site voltage and frequency
 * @returns peak [A] and frequency [Hz]
 * @source ieee-c37-99 (closed form), an estimate with reactors
 */
export function closedFormInrush(
  capacitiveOhm: number,
  inductiveOhm: number,
  site: { nominalV: number; frequencyHz: number },
): { peakA: number; frequencyHz: number } {
  return {
    peakA: (Math.SQRT2 * site.nominalV) / Math.sqrt(3) / Math.sqrt(capacitiveOhm * inductiveOhm),
    frequencyHz: site.frequencyHz * Math.sqrt(capacitiveOhm / inductiveOhm),
  };
}

/**
 * Inrush of one stage of each group, alone (X_L = U²/S_k + p·X_C) and onto the rest of the bank connected
 * (X_C = X_C,stage + 1/Σ(1/X_C,other), X_L = X_L,stage + 1/Σ(1/X_L,other), 0 if any other is plain, + ω·L between).
 * @param bank the bank
 * @param site voltage, frequency, fault level, rules
 * @returns one entry a group
 * @source method-inrush
 */
export function inrushStages(bank: Bank, site: InrushSite): InrushStage[] {
  const betweenOhm = 2 * Math.PI * site.frequencyHz * bank.interStageUh * 1e-6;
  const ohms = bank.groups.map(stageOhm);
  return bank.groups.map((group, index) => {
    const own = ohms[index]!;
    const supplyOhm = (site.nominalV * site.nominalV) / (site.shortCircuitMva * 1e6);
    const single = closedFormInrush(own.capacitiveOhm, supplyOhm + own.inductiveOhm, site);
    let capacitiveSiemens = 0;
    let inductiveSiemens = 0;
    for (const [g, other] of bank.groups.entries()) {
      const others = other.count - (g === index ? 1 : 0);
      if (others === 0) continue;
      capacitiveSiemens += others / ohms[g]!.capacitiveOhm;
      inductiveSiemens += others / ohms[g]!.inductiveOhm; // a plain stage makes this infinite: 0 Ω in parallel
    }
    const onto =
      capacitiveSiemens === 0
        ? null
        : closedFormInrush(
            own.capacitiveOhm + 1 / capacitiveSiemens,
            own.inductiveOhm + 1 / inductiveSiemens + betweenOhm,
            site,
          );
    return {
      group: index,
      singlePeakA: single.peakA,
      singleHz: single.frequencyHz,
      ontoBankPeakA: onto?.peakA ?? null,
      ontoBankHz: onto?.frequencyHz ?? null,
      worstPeakA: null,
      limitPeakA: inrushLimitA(group.switchPeakA, ratedA(group), site.rules),
    };
  });
}

function inrushLimitA(switchPeakA: number | null, ownA: number, rules: RuleSet): number | null {
  const { inrushRatio } = CAPACITOR_RULES[rules];
  const limits = [inrushRatio === null ? null : inrushRatio * ownA, switchPeakA].filter((limit) => limit !== null);
  return limits.length === 0 ? null : Math.min(...limits);
}
