import * as z from 'zod';
import {
  CAPACITOR_V,
  label,
  listOf,
  NOT_NEGATIVE,
  POSITIVE,
  POWER_FACTOR,
  plain,
  quantity,
  reactorPct,
  whole,
} from './schema-parts.js';

/** What a bank may be built from. */
export const catalogueSchema = z.strictObject({
  stageKvar: listOf(quantity('stageKvar', POSITIVE), 1, 60).optional(),
  kvarBasis: z.enum(['rated', 'effective']).optional(),
  ratedV: listOf(quantity('ratedV', CAPACITOR_V), 1, 40).optional(),
  reactorPct: listOf(reactorPct(), 1, 20).optional(),
  maxStages: whole(1, 24).optional(),
  cabinets: listOf(
    z.strictObject({ name: label(), maxKvar: quantity('maxKvar', POSITIVE), maxStages: whole(1, 100) }),
    0,
    40,
  ).optional(),
  switches: listOf(
    z.strictObject({
      kind: label(),
      maxStageKvar: quantity('maxStageKvar', POSITIVE),
      stepDelayS: quantity('stepDelayS', NOT_NEGATIVE),
      reconnectDelayS: quantity('reconnectDelayS', NOT_NEGATIVE),
      limitsInrush: z.boolean().optional(),
    }),
    0,
    20,
  ).optional(),
  evenSteps: z.boolean().optional(),
  maxTotalKvar: quantity('maxTotalKvar', POSITIVE).optional(),
  setPoints: listOf(plain(POWER_FACTOR), 1, 40).optional(),
  interStageUh: quantity('interStageUh', POSITIVE).optional(),
  mustMeetTarget: z.boolean().optional(),
});
