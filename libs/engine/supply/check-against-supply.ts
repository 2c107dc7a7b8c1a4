import { type Remark, remark } from '../problem.js';
import type { RecordSummary } from '../record/record-summary.js';
import type { SupplyInput } from './supply.js';

/** A peak above this times the transformers' rating is more than they carry for long; below this share, hardly a load. */
const MOST_RATIO = 1.2;
const LEAST_RATIO = 0.02;
/** Half-hours or quarters taken for hours, kilo taken for mega or for the bare unit. */
const FACTORS = [2, 4, 1000] as const;

/**
 * Holds a record's greatest apparent power against the transformers that carry it: far above or far below their rating
 * a factor is wrong more often than a site is odd. Without transformers nothing can be said.
 * @param record the record's statistics
 * @param site its supply
 * @returns one remark or none; `factor` is there where one of 2, 4 and 1000 would put the peak in place
 * @source method-record-signs
 */
export function checkAgainstSupply(
  record: Pick<RecordSummary, 'maxKva'>,
  site: { supply: Pick<SupplyInput, 'transformers'> },
): Remark[] {
  const ratedKva = (site.supply.transformers ?? []).reduce((sum, transformer) => sum + transformer.ratedKva, 0);
  const { maxKva } = record;
  if (!(ratedKva > 0) || maxKva <= 0) return [];
  const ratio = maxKva / ratedKva;
  const place = { path: 'supply.transformers', source: 'practice' };
  const values: Record<string, number> = { maxKva, ratedKva, ratedPct: 100 * ratio };
  if (ratio > MOST_RATIO) {
    const factor = FACTORS.find((times) => ratio / times <= 1);
    if (factor !== undefined) values.factor = factor;
    return [remark('record.aboveRating', values, place)];
  }
  if (ratio >= LEAST_RATIO) return [];
  if (ratio * 1000 <= MOST_RATIO) values.factor = 1000;
  return [remark('record.farBelowRating', values, place)];
}
