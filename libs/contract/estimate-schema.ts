import * as z from 'zod';
import {
  label,
  listOf,
  localMonth,
  NOT_NEGATIVE,
  POSITIVE,
  POWER_FACTOR,
  plain,
  quantity,
  whole,
} from './schema-parts.js';

const bill = z.strictObject({
  month: localMonth(),
  activeKwh: quantity('activeKwh', POSITIVE),
  laggingKvarh: quantity('laggingKvarh', NOT_NEGATIVE).optional(),
  powerFactor: plain(POWER_FACTOR).optional(),
  maxKw: quantity('maxKw', POSITIVE).optional(),
  maxKva: quantity('maxKva', POSITIVE).optional(),
});

/** A share written as per cent, or per cent written as a share, is out of these ranges. */
const equipment = z.strictObject({
  name: label(),
  count: whole(1, 100_000).optional(),
  ratedKw: quantity('ratedKw', POSITIVE),
  efficiencyPct: quantity('efficiencyPct', { min: 10, max: 100 }),
  powerFactor: plain({ min: 0.05, max: 1 }),
  loadFactor: plain({ above: 0, min: 1e-3, max: 1.5 }).optional(),
  coincidence: plain({ above: 0, min: 1e-3, max: 1 }).optional(),
});

/** Bills and equipment in place of a meter's record; what their fields have to do with each other is in estimate-rules.ts. */
export const estimateSchema = z.strictObject({
  bills: listOf(bill, 1, 120).optional(),
  equipment: listOf(equipment, 1, 1000).optional(),
});
