import * as z from 'zod';
import { NOT_NEGATIVE, POSITIVE, quantity, type Range } from './schema-parts.js';

const TEMPERATURE: Range = { min: -60, max: 90 };

/** Where the bank stands. */
export const placeSchema = z.strictObject({
  ambientMaxC: quantity('ambientMaxC', TEMPERATURE).optional(),
  ambientDayC: quantity('ambientDayC', TEMPERATURE).optional(),
  ambientYearC: quantity('ambientYearC', TEMPERATURE).optional(),
  altitudeM: quantity('altitudeM', { min: -500, max: 9000 }).optional(),
  indoors: z.boolean().optional(),
  enclosureIp: z
    .string()
    .regex(/^IP[0-6X][0-9X]$/, { error: 'a degree of protection such as "IP31"' })
    .optional(),
  ventilation: z.enum(['none', 'natural', 'forced']).optional(),
  airFlowM3PerH: quantity('airFlowM3PerH', NOT_NEGATIVE).optional(),
  allowedRiseK: quantity('allowedRiseK', { above: 0, min: 0.1, max: 100 }).optional(),
});

/** The controller's current transformer. */
export const currentTransformerSchema = z.strictObject({
  place: z.enum(['incomer', 'load', 'bank']).optional(),
  ratioPrimaryA: quantity('ratioPrimaryA', POSITIVE),
  ratioSecondaryA: quantity('ratioSecondaryA', POSITIVE),
  phase: z.enum(['L1', 'L2', 'L3']).optional(),
  wiring: z.enum(['single', 'summed']).optional(),
  sensitivityA: quantity('sensitivityA', POSITIVE).optional(),
});

/** What the bank may do on a generator. */
export const generatorRuleSchema = z.strictObject({
  holdOff: z.boolean().optional(),
  allowedKvar: quantity('allowedKvar', NOT_NEGATIVE).optional(),
});
