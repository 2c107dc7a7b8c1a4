import type { Bank, StageGroup } from '../layout/bank.js';
import { ratedA, stageOhm } from '../layout/stage.js';
import { bankStates, stageKinds } from '../network/stage-kinds.js';
import { closingPeak } from './closing-circuit.js';
import type { ClosingStanding } from './closing-standings.js';
import type { ClosingCircuit, SeriesBranch } from './loop-impedance.js';
import type { ClosingNetwork } from './network-loop.js';
import { CAPACITOR_RULES, type RuleSet } from './rules.js';

/** Peak current of closing one stage of a group, closed forms. */
export interface InrushStage {
  group: number;
  singlePeakA: number;
  singleHz: number;
  /** null where the stage is the only one */
  ontoBankPeakA: number | null;
  ontoBankHz: number | null;
  /** exact peak of the linear circuit at the worst closing instant, alone or onto any level [A]; null in a quick look */
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

/** What the exact solution needs of the site. */
export interface ClosingSite {
  nominalV: number;
  frequencyHz: number;
  /** supply at its greatest fault level and what else stands in the network */
  standings: readonly ClosingStanding[];
  /** every count vector the bank can stand at */
  vectors: readonly Int32Array[];
}

/** Exact peaks of closing one stage of a group. */
export interface ExactInrush {
  /** onto the supply alone [A] */
  singlePeakA: number;
  /** the greatest, alone or onto any level at which a stage of the group is left [A] */
  worstPeakA: number;
}

/** One closing of a stage: alone, or onto what a count vector has connected. */
export interface Closing {
  circuit: ClosingCircuit;
  /** connected stages per group before the closing */
  vector: Int32Array;
  /** how the network stands; "" in the normal standing */
  standing: string;
}

/**
 * Every closing of one stage of a group in every standing of the network: alone first, then onto every electrical state in
 * which one is left; stages of one kind are one branch of their sum. The inductance between stages counts once, before the
 * closing stage, as in the closed form, and also where it meets no stage but other capacitors at its bus; damping loads
 * and harmonics are left out.
 * @param bank the bank
 * @param index the closing stage's group
 * @param site voltage, frequency, standings, count vectors
 * @returns circuits per phase
 * @source method-inrush
 */
export function closings(bank: Bank, index: number, site: ClosingSite): Closing[] {
  const omega = 2 * Math.PI * site.frequencyHz;
  const kinds = stageKinds(bank);
  const branches = kinds.first.map((group) => stageBranchAt(group, omega));
  const own = stageBranchAt(bank.groups[index]!, omega);
  const ontoOwn = { ...own, inductanceH: own.inductanceH + bank.interStageUh * 1e-6 };
  const closable = site.vectors.filter((vector) => vector[index]! < bank.groups[index]!.count);
  const states = bankStates(kinds, closable).filter(({ shares }) => shares.some((share) => share > 0));
  const none = { vector: new Int32Array(bank.groups.length), shares: new Float64Array(kinds.first.length) };
  return site.standings.flatMap(({ name, supplyOhm, beside, network }) =>
    [none, ...states].map(({ vector, shares }): Closing => {
      const stages = branches.flatMap((branch, kind) =>
        shares[kind]! > 0 ? [scaledBranch(branch, shares[kind]!)] : [],
      );
      const connected = [...stages, ...beside];
      const meets = connected.length > 0 || capacitorsAtBank(network);
      const circuit = {
        sourceOhm: supplyOhm.rOhm,
        sourceH: supplyOhm.xOhm / omega,
        crestV: (Math.SQRT2 * site.nominalV) / Math.sqrt(3),
        frequencyHz: site.frequencyHz,
        connected,
        closing: meets ? ontoOwn : own,
        ...(network === null ? {} : { network }),
      };
      return { circuit, vector, standing: name };
    }),
  );
}

function capacitorsAtBank(network: ClosingNetwork | null): boolean {
  return network?.branches.some(({ from, capacitanceF }) => from === network.bankNode && capacitanceF > 0) ?? false;
}

/**
 * Exact peak of closing one stage of a group at the worst instant: alone, and onto every level.
 * @param bank the bank
 * @param index the closing stage's group
 * @param site voltage, frequency, supply, count vectors
 * @returns peaks [A], or null where the circuit could not be solved
 * @source method-inrush
 */
export function exactInrush(bank: Bank, index: number, site: ClosingSite): ExactInrush | null {
  const all = closings(bank, index, site);
  const isAlone = ({ vector }: Closing): boolean => vector.every((count) => count === 0);
  const peakOver = (worst: number, { circuit }: Closing): number => Math.max(worst, closingPeak(circuit, worst).peakA);
  const singlePeakA = all.filter(isAlone).reduce(peakOver, 0);
  // The higher the level the greater the peak, as a rule: from the top, most of the rest need not be followed.
  const worstPeakA = all.filter((closing) => !isAlone(closing)).reduceRight(peakOver, singlePeakA);
  // A circuit far from any that is built (a reactor of nothing but resistance) has modes that are not found.
  return Number.isFinite(worstPeakA) ? { singlePeakA, worstPeakA } : null;
}

function stageBranchAt(group: StageGroup, omega: number): SeriesBranch {
  const ohm = stageOhm(group);
  return {
    rOhm: ohm.resistanceOhm,
    inductanceH: ohm.inductiveOhm / omega,
    capacitanceF: 1 / (omega * ohm.capacitiveOhm),
  };
}

// Equal branches in parallel are one branch of their sum.
function scaledBranch(branch: SeriesBranch, count: number): SeriesBranch {
  return {
    rOhm: branch.rOhm / count,
    inductanceH: branch.inductanceH / count,
    capacitanceF: branch.capacitanceF * count,
  };
}
