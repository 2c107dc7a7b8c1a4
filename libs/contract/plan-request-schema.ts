import * as z from 'zod';
import { label } from './schema-parts.js';

/** Body of a request for a plan or an assessment. */
export const planRequestSchema = z
  .strictObject({
    recordId: label(36).optional().describe('the load record to plan with; absent, the latest of the site'),
    author: label(200).optional().describe('printed as "prepared by"'),
    reason: label(2000).optional().describe('why this revision is made'),
  })
  .meta({ id: 'PlanRequest' });

export type PlanRequest = z.output<typeof planRequestSchema>;
