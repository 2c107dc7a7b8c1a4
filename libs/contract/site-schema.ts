import * as z from 'zod';
import { SPECTRUM_NAMES } from '#libs/engine/index.js';
import { bankSchema } from './bank-schema.js';
import { catalogueSchema } from './catalogue-schema.js';
import { estimateSchema } from './estimate-schema.js';
import { financeSchema } from './finance-schema.js';
import { limitsSchema } from './limits-schema.js';
import { networkSchema } from './network-schema.js';
import { sitePapersSchema } from './paper-schema.js';
import { currentTransformerSchema, generatorRuleSchema, placeSchema } from './place-schema.js';
import { pricesSchema } from './prices-schema.js';
import {
  currency,
  label,
  listOf,
  localDay,
  NOT_NEGATIVE,
  POSITIVE,
  POWER_FACTOR,
  type ProblemParams,
  plain,
  quantity,
  type Range,
} from './schema-parts.js';
import { siteRules } from './site-rules.js';
import { supplySchema } from './supply-schema.js';
import { tariffSchema } from './tariff-schema.js';
import { isTimeZone } from './time-zone.js';

const PERCENT: Range = { min: 0, max: 100 };
const DELAY: Range = { min: 0, max: 31_536_000 };

const bus = z.strictObject({
  nominalV: quantity('nominalV', { min: 50, max: 1e6 }),
  highestV: quantity('highestV', { min: 50, max: 1e6 }).optional(),
});

const settings = z.strictObject({
  setPointPowerFactor: plain(POWER_FACTOR).optional(),
  mode: z.enum(['nearestLevel', 'oneByOne']).optional(),
  responseRatio: plain({ above: 0, max: 1 }).optional(),
  stepDelayS: quantity('stepDelayS', DELAY).optional(),
  reconnectDelayS: quantity('reconnectDelayS', DELAY).optional(),
  wear: z.enum(['even', 'inOrder']).optional(),
});

const recordedBank = z.discriminatedUnion('state', [
  z.strictObject({ state: z.literal('none') }),
  z.strictObject({ state: z.literal('out') }),
  z.strictObject({ state: z.literal('fixed'), kvar: quantity('kvar', NOT_NEGATIVE) }),
  z.strictObject({ state: z.literal('logged') }),
  z.strictObject({
    state: z.literal('switching'),
    bank: bankSchema.optional(),
    control: settings.optional(),
    loadPowerFactor: z.strictObject({ min: plain(POWER_FACTOR), max: plain(POWER_FACTOR) }).optional(),
  }),
  z.strictObject({ state: z.literal('unknown') }),
]);

const control = settings.extend({
  currentTransformer: currentTransformerSchema.optional(),
  generator: generatorRuleSchema.optional(),
});

const order = (pct: Range) => z.strictObject({ orderH: plain({ above: 1, max: 50 }), pct: quantity('pct', pct) });
const injectedOrder = order({ min: 0, max: 1000 }).extend({
  angleDeg: plain({ min: -360, max: 360 }).optional(),
  sequence: z.literal('zero').optional(),
});

const loads = z.strictObject({
  motorSharePct: quantity('motorSharePct', PERCENT).optional(),
  distorting: listOf(
    z.strictObject({
      name: label(),
      bus: label().optional(),
      fundamentalA: quantity('fundamentalA', NOT_NEGATIVE),
      spectrum: z.enum(SPECTRUM_NAMES).optional(),
      orders: listOf(injectedOrder, 1, 200).optional(),
    }),
    0,
    200,
  ).optional(),
  backgroundPct: listOf(order(PERCENT), 0, 200).optional(),
  dampingKw: z
    .strictObject({
      max: quantity('dampingKw', NOT_NEGATIVE).optional(),
      min: quantity('dampingKw', NOT_NEGATIVE).optional(),
    })
    .optional(),
  summation: z.enum(['exponent', 'arithmetic']).optional(),
  fast: listOf(
    z.strictObject({
      name: label(),
      swingKvar: quantity('swingKvar', NOT_NEGATIVE).optional(),
      swingS: quantity('swingS', POSITIVE).optional(),
    }),
    0,
    100,
  ).optional(),
  measured: z
    .strictObject({
      use: z.enum(['check', 'fit']).optional(),
      place: label().optional(),
      loadKw: quantity('loadKw').optional(),
      bankKvar: quantity('bankKvar', NOT_NEGATIVE),
      date: localDay().optional(),
      voltagePct: listOf(order(PERCENT), 1, 200).optional(),
      currentA: listOf(
        z.strictObject({ orderH: plain({ above: 1, max: 50 }), a: quantity('currentA', NOT_NEGATIVE) }),
        1,
        200,
      ).optional(),
    })
    .optional(),
});

/** Rules between fields look at whatever was readable, so that one wrong field doesn't hide another. */
const rules = z.check<unknown>((payload) => {
  for (const { path, ...problem } of siteRules(payload.value)) {
    payload.issues.push({
      code: 'custom',
      path,
      input: payload.value,
      params: { problem } satisfies ProblemParams,
    });
  }
});
rules._zod.def.when = () => true;

/** The site file and the HTTP body. */
export const siteSchema = z
  .strictObject({
    name: label(),
    asOf: localDay().optional(),
    timeZone: z.string().refine(isTimeZone, { error: 'a time zone such as "Europe/Dublin"' }),
    currency: currency().optional(),
    rules: z.enum(['iec', 'ieee']),
    frequencyHz: quantity('frequencyHz', { min: 10, max: 1000 }),
    bus,
    meteredAt: z.enum(['bus', 'primary']).optional(),
    recordedBank: recordedBank.optional(),
    target: z
      .strictObject({
        powerFactor: plain(POWER_FACTOR).optional(),
        onExport: z.enum(['importOnly', 'absolute']).optional(),
      })
      .optional(),
    control: control.optional(),
    supply: supplySchema,
    loads: loads.optional(),
    network: networkSchema.optional(),
    bank: bankSchema.optional(),
    limits: limitsSchema.optional(),
    place: placeSchema.optional(),
    papers: sitePapersSchema.optional().describe('shared tariff and prices, kept by the server'),
    tariff: tariffSchema.optional(),
    prices: pricesSchema.optional(),
    catalogue: catalogueSchema.optional(),
    finance: financeSchema.optional(),
    estimate: estimateSchema.optional(),
  })
  .check(rules)
  .meta({ id: 'Site' });

/** A site as the schema reads it, its quantities in whichever form they were given. */
export type SiteGiven = z.output<typeof siteSchema>;
