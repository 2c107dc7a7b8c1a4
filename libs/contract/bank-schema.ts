import * as z from 'zod';
import {
  CAPACITOR_V,
  label,
  listOf,
  localDay,
  NOT_NEGATIVE,
  POSITIVE,
  plain,
  quantity,
  type Range,
  reactorPct,
  whole,
} from './schema-parts.js';

/** A tuned order: below about 1.1 the reactor would leave no capacitor, above 50 there is none to speak of. */
const TUNED_ORDER = { min: 1.07, max: 50 };

const three = (name: string, range: Range) => {
  const one = quantity(name, range);
  return z.tuple([one, one, one]);
};

/** One stage as it was measured on the site. */
const stageMeasurement = z.strictObject({
  stage: whole(1, 100),
  date: localDay(),
  busV: quantity('busV', POSITIVE).optional(),
  frequencyHz: quantity('frequencyHz', POSITIVE).optional(),
  lineA: three('lineA', NOT_NEGATIVE).optional(),
  terminalUf: three('terminalUf', POSITIVE).optional(),
  connection: z.enum(['delta', 'star', 'earthedStar']).optional(),
  instrument: label().optional(),
});

/** A group of equal stages; the reactor is given by its ratio, by what it is tuned to, or by its inductance. */
export const stageGroupSchema = z.strictObject({
  count: whole(1, 100),
  ratedKvar: quantity('ratedKvar', POSITIVE),
  ratedV: quantity('ratedV', CAPACITOR_V),
  reactorPct: reactorPct().optional(),
  tunedHz: quantity('tunedHz', POSITIVE).optional(),
  tunedOrderH: plain(TUNED_ORDER).optional(),
  reactorQuality: plain(POSITIVE).optional(),
  dischargeOhm: quantity('dischargeOhm', POSITIVE).optional(),
  reactorMaxA: quantity('reactorMaxA', POSITIVE).optional(),
  reactorLinearA: quantity('reactorLinearA', POSITIVE).optional(),
  switchPeakA: quantity('switchPeakA', POSITIVE).optional(),
  switchKvar: quantity('switchKvar', POSITIVE).optional(),
  fuseA: quantity('fuseA', POSITIVE).optional(),
  fixed: z.boolean().optional(),
  capacitanceUf: quantity('capacitanceUf', POSITIVE).optional(),
  measuredUf: quantity('measuredUf', POSITIVE).optional(),
  reactorMh: quantity('reactorMh', POSITIVE).optional(),
  commissioned: localDay().optional(),
  measurements: listOf(stageMeasurement, 1, 500).optional(),
});

/** The bank of a site, with what is fitted around it. */
export const bankSchema = z.strictObject({
  stages: listOf(stageGroupSchema, 1, 24),
  interStageUh: quantity('interStageUh', POSITIVE).optional(),
  ambientCategory: z.enum(['A', 'B', 'C', 'D']).optional(),
  switchKind: label().optional(),
  connection: z.enum(['delta', 'star', 'earthedStar']).optional(),
  installed: z.boolean().optional(),
  conductorA: quantity('conductorA', POSITIVE).optional(),
  mainDevice: z
    .strictObject({
      ratedA: quantity('ratedA', POSITIVE).optional(),
      settingA: quantity('settingA', POSITIVE).optional(),
      instantaneousA: quantity('instantaneousA', POSITIVE).optional(),
      breakingKa: quantity('breakingKa', POSITIVE).optional(),
      withstandKa: quantity('withstandKa', POSITIVE).optional(),
      shortTimeKa: quantity('shortTimeKa', POSITIVE).optional(),
    })
    .optional(),
  protection: z
    .strictObject({
      earthFault: z.boolean().optional(),
      overTemperature: z.boolean().optional(),
      overPressure: z.boolean().optional(),
      undervoltage: z.boolean().optional(),
    })
    .optional(),
});
