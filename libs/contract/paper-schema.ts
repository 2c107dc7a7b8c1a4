import * as z from 'zod';
import { pricesSchema } from './prices-schema.js';
import type { RuleBreach } from './rule-breach.js';
import { label, localDay, type ProblemParams } from './schema-parts.js';
import { tariffRules } from './tariff-rules.js';
import { tariffSchema } from './tariff-schema.js';

const NAME = 80;

const head = {
  name: label(NAME).describe('what sites refer to it by'),
  date: localDay().describe('the day from which it holds'),
  after: z.int().min(1).optional().describe('the version this one follows; absent for the first of its name'),
};

const rules = z.check<unknown>((payload) => {
  for (const { path, ...problem } of paperRules(payload.value)) {
    payload.issues.push({ code: 'custom', path, input: payload.value, params: { problem } satisfies ProblemParams });
  }
});
rules._zod.def.when = () => true;

/** A tariff or a price book that several sites refer to: a version that never changes. */
export const paperSchema = z
  .discriminatedUnion('kind', [
    z.strictObject({ kind: z.literal('tariff'), ...head, document: tariffSchema }),
    z.strictObject({ kind: z.literal('prices'), ...head, document: pricesSchema }),
  ])
  .check(rules)
  .meta({ id: 'Paper' });

export type PaperGiven = z.output<typeof paperSchema>;

function paperRules(paper: unknown): RuleBreach[] {
  const { kind, document } = (paper ?? {}) as { kind?: unknown; document?: unknown };
  if (kind !== 'tariff') return [];
  return tariffRules(document).map((breach) => ({ ...breach, path: ['document', ...breach.path] }));
}

const reference = z.strictObject({
  name: label(NAME),
  version: z.int().min(1).optional().describe('absent, the latest'),
});

/** Which shared papers a site, or one plan of it, takes. */
export const sitePapersSchema = z.strictObject({
  tariff: reference.optional(),
  prices: reference.optional(),
});
