import * as z from 'zod';
import { AWG_SIZES } from '#libs/engine/index.js';
import { stageGroupSchema } from './bank-schema.js';
import { label, listOf, NOT_NEGATIVE, POSITIVE, plain, quantity, whole } from './schema-parts.js';

const between = z.tuple([label(), label()], { error: 'two names of buses' });

const coupler = z.strictObject({
  name: label().optional(),
  between,
  state: z.enum(['open', 'closed', 'either']),
});

/** Resistance as stated, or by the conductor's size. */
const cable = z.strictObject({
  name: label().optional(),
  between,
  lengthM: quantity('lengthM', { above: 0, min: 1e-3, max: 1e5 }),
  resistanceOhmPerKm: quantity('resistanceOhmPerKm', NOT_NEGATIVE).optional(),
  reactanceOhmPerKm: quantity('reactanceOhmPerKm', NOT_NEGATIVE).optional(),
  crossSectionMm2: quantity('crossSectionMm2', { min: 0.5, max: 2000 }).optional(),
  sizeAwg: z.enum(AWG_SIZES).optional(),
  metal: z.enum(['copper', 'aluminium']).optional(),
  parallel: whole(1, 50).optional(),
});

const generator = z.strictObject({
  name: label().optional(),
  bus: label(),
  ratedKva: quantity('ratedKva', POSITIVE),
  subtransientPct: quantity('subtransientPct', { above: 0, min: 0.1, max: 200 }),
  rOverX: plain({ min: 0, max: 100 }).optional(),
  xOverR: plain({ min: 0.01, max: 1e6 }).optional(),
  state: z.enum(['off', 'running', 'either']),
});

const busLoad = z.strictObject({ name: label().optional(), bus: label(), kw: quantity('kw', NOT_NEGATIVE) });

/** The network of a site with several buses; what its parts have to do with each other is checked by network-rules.ts. */
export const networkSchema = z.strictObject({
  buses: listOf(z.strictObject({ name: label() }), 1, 40),
  couplers: listOf(coupler, 0, 40).optional(),
  cables: listOf(cable, 0, 100).optional(),
  generators: listOf(generator, 0, 20).optional(),
  motors: listOf(busLoad, 0, 400).optional(),
  resistive: listOf(busLoad, 0, 400).optional(),
  capacitors: listOf(
    stageGroupSchema.extend({ name: label().optional(), bus: label(), switched: z.boolean().optional() }),
    0,
    40,
  ).optional(),
  banks: listOf(
    z.strictObject({ name: label().optional(), bus: label(), stages: listOf(stageGroupSchema, 1, 24) }),
    0,
    10,
  ).optional(),
  bankBus: label().optional(),
  couplingPoint: label().optional(),
  transformerOut: z.boolean().optional(),
});
