import type { Bank } from '../layout/bank.js';
import { type Remark, remark } from '../problem.js';

/**
 * What a designed bank takes for granted.
 * @param bank the bank
 * @returns one assumption each
 */
export function bankLines(bank: Bank): Remark[] {
  const lines = [];
  if (bank.groups.some((group) => group.reactorPct > 0)) {
    const quality = bank.groups[0]!.reactorQuality;
    lines.push(remark('default.bank.stages.reactorQuality', { value: quality }, { path: 'catalogue' }));
  }
  if (!bank.interStageGiven) {
    const place = { path: 'catalogue.interStageUh', unit: 'µH' };
    lines.push(remark('default.bank.interStageUh', { value: bank.interStageUh }, place));
  }
  return lines;
}
