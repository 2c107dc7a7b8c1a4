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
    paper: z.enum(['A4', 'Letter']).optional().describe('sheet of the proposal, A4 where nothing is said'),
    language: z.enum(['en', 'de']).optional().describe('language of the proposal, English where nothing is said'),
    logo: z
      .base64()
      .max(350_000)
      .optional()
      .describe('the site’s logo for the proposal: a PNG or JPEG file of at most 262 144 bytes and 2 000 000 pixels'),
    reason: label(2000).optional().describe('why this revision is made'),
  })
  .meta({ id: 'PlanRequest' });

export type PlanRequest = z.output<typeof planRequestSchema>;
