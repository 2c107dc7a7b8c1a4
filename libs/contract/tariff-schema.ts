import * as z from 'zod';
import {
  label,
  listOf,
  localDay,
  localMonth,
  NOT_NEGATIVE,
  POSITIVE,
  POWER_FACTOR,
  plain,
  quantity,
  whole,
} from './schema-parts.js';

const months = listOf(whole(1, 12), 1, 12);
const reactive = z.enum(['lagging', 'leading', 'both', 'net']);
const price = plain();
const pricesByWindow = z.record(label(), price);
const hour = plain({ min: 0, max: 24 });

const tariffWindow = z.strictObject({
  name: label(),
  months: months.optional(),
  days: listOf(whole(1, 8), 1, 8).optional(),
  hours: listOf(z.tuple([hour, hour]), 1, 48).optional(),
});

const scaleBounds = {
  pctDecimals: whole(0, 6).optional(),
  minPct: quantity('minPct').optional(),
  maxPct: quantity('maxPct').optional(),
};

const bandEnd = plain({ min: 0, max: 1 });

const scale = z.discriminatedUnion('form', [
  z.strictObject({
    form: z.literal('points'),
    reference: plain(POWER_FACTOR),
    below: listOf(z.strictObject({ downTo: bandEnd, pctPerPoint: plain() }), 1, 40).optional(),
    above: listOf(z.strictObject({ upTo: bandEnd, pctPerPoint: plain() }), 1, 40).optional(),
    cumulative: z.boolean().optional(),
    count: z.enum(['exact', 'orPart', 'whole']).optional(),
    ...scaleBounds,
  }),
  z.strictObject({
    form: z.literal('steps'),
    steps: listOf(z.strictObject({ from: bandEnd, pct: quantity('pct') }), 1, 100),
    ...scaleBounds,
  }),
  z.strictObject({
    form: z.literal('ratio'),
    reference: plain(POWER_FACTOR),
    belowPct: quantity('belowPct'),
    abovePct: quantity('abovePct'),
    ...scaleBounds,
  }),
]);

const common = {
  name: label(),
  months: months.optional(),
  windows: listOf(label(), 1, 40).optional(),
  taxed: z.boolean().optional(),
  per: z.enum(['month', 'day', 'hour', 'interval']).optional(),
  reactive: reactive.optional(),
};

/** Formed once a month, whatever its length. */
const { per: _, ...monthly } = common;

const billedQuantity = {
  wholeUnits: z.enum(['up', 'down', 'nearest']).optional(),
  minimum: plain(NOT_NEGATIVE).optional(),
  ratchet: z
    .strictObject({ pct: quantity('pct', { min: 0, max: 1000 }), months: whole(1, 60), of: months.optional() })
    .optional(),
};

const clause = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('fixed'), ...common, amountPerMonth: plain() }),
  z.strictObject({
    kind: z.literal('energy'),
    ...common,
    of: z.enum(['kWh', 'kVAh']).optional(),
    pricePerUnit: price.optional(),
    prices: pricesByWindow.optional(),
    blocks: listOf(z.strictObject({ upTo: plain(POSITIVE).nullable(), pricePerUnit: price }), 1, 40).optional(),
  }),
  z.strictObject({ kind: z.literal('energyByFactor'), ...common, pricePerUnit: price, scale }),
  z.strictObject({
    kind: z.literal('kvarhBeyondRatio'),
    ...common,
    freeRatio: plain(NOT_NEGATIVE).optional(),
    pricePerUnit: price.optional(),
    tiers: listOf(z.strictObject({ aboveRatio: plain(NOT_NEGATIVE), pricePerUnit: price }), 1, 40).optional(),
    cumulative: z.boolean().optional(),
    byWindow: z.boolean().optional(),
  }),
  z.strictObject({
    kind: z.literal('kvarBeyondRatio'),
    ...common,
    ...billedQuantity,
    ratio: plain(NOT_NEGATIVE),
    at: z.enum(['maxKvar', 'maxKw']).optional(),
    pricePerUnit: price,
  }),
  z.strictObject({
    kind: z.literal('demand'),
    ...common,
    ...billedQuantity,
    basis: z.enum(['kW', 'kVA', 'kWOrKvaShare']),
    kvaShare: plain({ above: 0, max: 10 }).optional(),
    scale: scale.optional(),
    pricePerUnit: price.optional(),
    prices: pricesByWindow.optional(),
  }),
  z.strictObject({
    kind: z.literal('contractedDemand'),
    ...monthly,
    basis: z.enum(['kW', 'kVA', 'kWOrKvaShare']),
    kvaShare: plain({ above: 0, max: 10 }).optional(),
    wholeUnits: billedQuantity.wholeUnits,
    contracted: plain(NOT_NEGATIVE),
    pricePerUnit: price,
    overrunPricePerUnit: price,
    tolerancePct: quantity('tolerancePct', { min: 0, max: 1000 }).optional(),
    leastPct: quantity('leastPct', { min: 0, max: 100 }).optional(),
  }),
  z.strictObject({
    kind: z.literal('percent'),
    ...common,
    scale,
    applies: z.union([z.literal('all'), listOf(label(), 1, 100)], { error: '"all" or a list of earlier clauses' }),
  }),
  z.strictObject({ kind: z.literal('formula'), ...common, expression: label(1000) }),
]);

/** A tariff; what its parts have to do with each other is checked by tariff-rules.ts. */
export const tariffSchema = z.strictObject({
  name: label().optional(),
  decimals: whole(0, 6).nullable().optional(),
  taxPct: quantity('taxPct', { min: 0, max: 1000 }).optional(),
  demandS: quantity('demandS', { above: 0, min: 1, max: 86_400 }).optional(),
  factor: z
    .strictObject({
      basis: z.enum(['energy', 'atMaxKw', 'maxima']).optional(),
      reactive: reactive.optional(),
      decimals: whole(0, 6).nullable().optional(),
    })
    .optional(),
  holidays: listOf(localDay(), 0, 1000).optional(),
  windows: listOf(tariffWindow, 0, 40).optional(),
  clauses: listOf(clause, 0, 100).optional(),
  billed: listOf(z.strictObject({ month: localMonth(), total: plain() }), 0, 240).optional(),
});
