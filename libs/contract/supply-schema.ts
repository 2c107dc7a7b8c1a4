import * as z from 'zod';
import { EARTHINGS } from '#libs/engine/index.js';
import { label, listOf, NOT_NEGATIVE, POSITIVE, plain, quantity, type Range } from './schema-parts.js';

const PERCENT: Range = { min: 0, max: 100 };

const transformer = z.strictObject({
  bus: label().optional(),
  ratedKva: quantity('ratedKva', POSITIVE),
  impedancePct: quantity('impedancePct', { above: 0, below: 100 }),
  impedanceTolerancePct: quantity('impedanceTolerancePct', { min: 0, max: 50 }).optional(),
  loadLossKw: quantity('loadLossKw', NOT_NEGATIVE).optional(),
  xOverR: plain({ min: 0.01, max: 1e6 }).optional(),
  rOverX: plain({ min: 0, max: 100 }).optional(),
  noLoadLossKw: quantity('noLoadLossKw', NOT_NEGATIVE).optional(),
  noLoadCurrentPct: quantity('noLoadCurrentPct', PERCENT).optional(),
});

/** The fault level as a utility states it: a current or an impedance at a voltage. */
const faultLevel = z.strictObject({
  maxMva: quantity('maxMva', POSITIVE).optional(),
  minMva: quantity('minMva', POSITIVE).optional(),
  maxKa: quantity('maxKa', POSITIVE).optional(),
  minKa: quantity('minKa', POSITIVE).optional(),
  minOhm: quantity('minOhm', POSITIVE).optional(),
  maxOhm: quantity('maxOhm', POSITIVE).optional(),
  atKv: quantity('atKv', { min: 0.05, max: 1000 }).optional(),
});

/** The supply of a site; its fault level stands in one of two forms. */
export const supplySchema = z.strictObject({
  faultLevelMva: z
    .strictObject({
      max: quantity('faultLevelMva', POSITIVE),
      min: quantity('faultLevelMva', POSITIVE).optional(),
    })
    .optional(),
  faultLevel: faultLevel.optional(),
  rOverX: plain({ min: 0, max: 100 }).optional(),
  xOverR: plain({ min: 0.01, max: 1e6 }).optional(),
  resistanceExponent: plain({ min: 0, max: 2 }).optional(),
  rippleHz: quantity('rippleHz', POSITIVE).nullable().optional(),
  arrangement: z.enum(['parallel', 'separate']).optional(),
  transformers: listOf(transformer, 0, 20).optional(),
  earthing: z.enum(EARTHINGS).optional(),
  photovoltaicKw: quantity('photovoltaicKw', NOT_NEGATIVE).optional(),
});
