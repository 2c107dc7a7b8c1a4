import * as z from 'zod';
import { LIMIT_EDITIONS } from '#libs/engine/index.js';
import { label, listOf, plain, quantity } from './schema-parts.js';

const EDITIONS = [...new Set([...LIMIT_EDITIONS.iec, ...LIMIT_EDITIONS.ieee])];
const limitPct = (name: string) => quantity(name, { above: 0, min: 1e-6, max: 100 });
const row = z.strictObject({ orderH: plain({ above: 1, max: 50 }), pct: limitPct('pct') });

/** Limits of distortion: the edition within the rule set, and the user's own. */
export const limitsSchema = z.strictObject({
  emcClass: z.literal([1, 2, 3]).optional(),
  edition: z.enum(EDITIONS).optional(),
  own: z
    .strictObject({
      name: label(60).optional(),
      voltage: listOf(row, 1, 100).optional(),
      distortionPct: limitPct('distortionPct').optional(),
      current: listOf(row, 1, 100).optional(),
      currentDistortionPct: limitPct('currentDistortionPct').optional(),
    })
    .optional(),
});
