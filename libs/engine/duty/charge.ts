import type { Bank, StageGroup } from '../layout/bank.js';
import { deltaCapacitanceUf } from '../layout/stage.js';
import { CAPACITOR_RULES, type RuleSet } from './rules.js';

/** A capacitor may be connected again at this share of U_N. */
const RECONNECT_SHARE = 0.1;

/** Stored charge of one stage of a group and the resistor it needs. */
export interface ChargeStage {
  group: number;
  /** one phase of the delta [µF] */
  capacitanceUf: number;
  dischargeToV: number;
  dischargeWithinS: number;
  /** greatest resistor across a delta phase that meets the rule [Ω] */
  dischargeMaxOhm: number;
  /** loss in the required resistor, one phase [W]; null where it would be 0 Ω */
  dischargeLossW: number | null;
  /** greatest resistor that meets the reconnection delay [Ω] */
  reconnectMaxOhm: number | null;
  /** the smaller of the two [Ω] */
  requiredOhm: number;
}

/**
 * Time for a resistor to bring a stage from √2·U_N to a voltage: t = R·C·ln(√2·U_N/U).
 * @param resistorOhm R across a delta phase [Ω]
 * @param capacitanceUf C of that phase [µF]
 * @param ratedV U_N [V]
 * @param toV U [V]
 * @returns t [s]
 * @source iec-60831-1 (discharge, k = 1)
 */
export function dischargeS(resistorOhm: number, capacitanceUf: number, ratedV: number, toV: number): number {
  return resistorOhm * capacitanceUf * 1e-6 * Math.log((Math.SQRT2 * ratedV) / toV);
}

/**
 * Greatest resistor that discharges a stage as the rule set asks: R ≤ t/(k·C·ln(√2·U_N/U_R)), k = 1.
 * @param group nameplate
 * @param rules rule set
 * @param frequencyHz f [Hz]
 * @returns R across a delta phase [Ω]
 * @source iec-60831-1, nec-460
 */
export function dischargeMaxOhm(group: StageGroup, rules: RuleSet, frequencyHz: number): number {
  const rule = CAPACITOR_RULES[rules];
  const farad = deltaCapacitanceUf(group, frequencyHz) * 1e-6;
  return rule.dischargeWithinS(group.ratedV) / (farad * Math.log((Math.SQRT2 * group.ratedV) / rule.dischargeToV));
}

/**
 * Stored charge of each group: rule resistor, resistor for the reconnection delay R ≤ t/(C·ln(√2/0.1)), the smaller
 * of them and its loss U_N²/R.
 * @param bank the bank
 * @param rules rule set
 * @param frequencyHz f [Hz]
 * @param reconnectDelayS t [s]; 0 asks for no discharge before the next connection
 * @returns one entry a group
 * @source iec-60831-1, nec-460
 */
export function chargeStages(bank: Bank, rules: RuleSet, frequencyHz: number, reconnectDelayS: number): ChargeStage[] {
  const rule = CAPACITOR_RULES[rules];
  return bank.groups.map((group, index) => {
    const capacitanceUf = deltaCapacitanceUf(group, frequencyHz);
    const ruleOhm = dischargeMaxOhm(group, rules, frequencyHz);
    const reconnectMaxOhm =
      reconnectDelayS > 0 ? reconnectDelayS / (capacitanceUf * 1e-6 * Math.log(Math.SQRT2 / RECONNECT_SHARE)) : null;
    const requiredOhm = Math.min(ruleOhm, reconnectMaxOhm ?? ruleOhm);
    return {
      group: index,
      capacitanceUf,
      dischargeToV: rule.dischargeToV,
      dischargeWithinS: rule.dischargeWithinS(group.ratedV),
      dischargeMaxOhm: ruleOhm,
      dischargeLossW: (group.ratedV * group.ratedV) / requiredOhm,
      reconnectMaxOhm,
      requiredOhm,
    };
  });
}

/**
 * Reconnection delay that a bank's resistors allow: the longest time to 10 % of U_N over its groups, for the stated
 * resistor or, where none is stated, for the rule set's own.
 * @param groups nameplates
 * @param rules rule set
 * @param frequencyHz f [Hz]
 * @returns t [s]; 0 for an empty bank
 * @source method-controller
 */
export function naturalReconnectDelayS(groups: readonly StageGroup[], rules: RuleSet, frequencyHz: number): number {
  return groups.reduce((longest, group) => {
    const resistorOhm = group.dischargeOhm ?? dischargeMaxOhm(group, rules, frequencyHz);
    const toV = RECONNECT_SHARE * group.ratedV;
    return Math.max(longest, dischargeS(resistorOhm, deltaCapacitanceUf(group, frequencyHz), group.ratedV, toV));
  }, 0);
}
