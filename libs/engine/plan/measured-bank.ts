import { lastFactors, type HistoryBasis, stageHistories, agedGroup } from '../duty/stage-history.js';
import type { Bank, BankInput } from '../layout/bank.js';

/** A bank as it measures, and where each of its groups comes from. */
export interface MeasuredBank {
  bank: Bank;
  /** entry of `bank.stages` each group was part of */
  ofGroup: number[];
  /** stages that are not at their nameplate */
  measuredStages: number;
}

/**
 * An installed bank as it measures: every measured stage a group of its own with the capacitance last found, the rest
 * at the nameplate.
 * @param given the bank as the site file gives it
 * @param bank the same, settled
 * @param basis nominal voltage, frequency, day of the judgement
 * @param path of the bank in the site file
 * @returns the bank
 * @throws InputProblem naming every measurement that can't be
 * @source method-ageing
 */
export function measuredBank(given: BankInput, bank: Bank, basis: HistoryBasis, path = 'bank'): MeasuredBank {
  const histories = stageHistories(given, bank, basis, path);
  const parts = bank.groups.flatMap((group, g) => {
    const factors = [...lastFactors(histories, g).values()];
    const measured = factors.map((factor) => ({ g, group: { ...agedGroup(group, factor), count: 1 } }));
    const rest = group.count - factors.length;
    return rest === 0 ? measured : [{ g, group: { ...group, count: rest } }, ...measured];
  });
  return {
    bank: { ...bank, groups: parts.map(({ group }) => group) },
    ofGroup: parts.map(({ g }) => g),
    measuredStages: histories.length,
  };
}
