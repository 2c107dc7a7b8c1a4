import * as z from 'zod';
import { quantity, whole } from './schema-parts.js';

/** Discounting. */
export const financeSchema = z.strictObject({
  discountPct: quantity('discountPct', { above: -100, max: 1000 }).optional(),
  horizonYears: whole(1, 100).optional(),
  billGrowthPct: quantity('billGrowthPct', { above: -100, max: 100 }).optional(),
  costGrowthPct: quantity('costGrowthPct', { above: -100, max: 100 }).optional(),
});
