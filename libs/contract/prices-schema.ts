import * as z from 'zod';
import {
  currency,
  label,
  listOf,
  localDay,
  NOT_NEGATIVE,
  POSITIVE,
  plain,
  quantity,
  reactorPct,
} from './schema-parts.js';

const price = plain(NOT_NEGATIVE);

/** A price book. */
export const pricesSchema = z.strictObject({
  name: label().optional(),
  invented: z.boolean().optional(),
  currency: currency().optional(),
  validFrom: localDay().optional(),
  validTo: localDay().optional(),
  perKvar: price.optional(),
  perStage: price.optional(),
  reactors: listOf(z.strictObject({ reactorPct: reactorPct(), perKvar: price }), 0, 40).optional(),
  installationFixed: price.optional(),
  installationPerKvar: price.optional(),
  fixed: price.optional(),
  contingencyPct: quantity('contingencyPct', { min: 0, max: 1000 }).optional(),
  switches: listOf(
    z.strictObject({
      kind: label(),
      perStage: price.optional(),
      perKvar: price.optional(),
      lifeSwitchings: plain(POSITIVE).optional(),
      lossWPerKvar: plain(NOT_NEGATIVE).optional(),
    }),
    0,
    20,
  ).optional(),
  cabinets: listOf(z.strictObject({ name: label(), price }), 0, 40).optional(),
  maintenancePerYear: price.optional(),
  maintenancePerStage: price.optional(),
  lossWPerKvar: z
    .strictObject({ plain: plain(NOT_NEGATIVE).optional(), reactor: plain(NOT_NEGATIVE).optional() })
    .optional(),
  lossPricePerKwh: price.optional(),
  capacitorLifeYears: plain(POSITIVE).optional(),
  replacementFactor: plain(NOT_NEGATIVE).optional(),
});
