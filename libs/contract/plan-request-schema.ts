import * as z from 'zod';
import { sitePapersSchema } from './paper-schema.js';
import { label } from './schema-parts.js';

/** Body of a request for a plan or an assessment. */
export const planRequestSchema = z
  .strictObject({
    recordId: label(36).optional().describe('the load record to plan with; absent, the latest of the site'),
    papers: sitePapersSchema
      .optional()
      .describe('shared papers for this plan in place of the site’s own: the same year under next year’s tariff'),
    author: label(200).optional().describe('printed as "prepared by"'),
    reason: label(2000).optional().describe('why this revision is made'),
  })
  .meta({ id: 'PlanRequest' });

export type PlanRequest = z.output<typeof planRequestSchema>;
