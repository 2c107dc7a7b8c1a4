import * as z from 'zod';
import { meterMapSchema } from './meter-map-schema.js';
import { label } from './schema-parts.js';

/** Answers about meter files that are kept under a name; which file counts in an overlap is decided for each file anew. */
export const keptMapSchema = z
  .strictObject({
    name: label(80).describe('what the answers are kept under; no two have the same'),
    map: meterMapSchema.omit({ overlap: true }).meta({ id: 'KeptMeterMap' }),
    header: z
      .string()
      .regex(/^[0-9a-f]{64}$/, { error: 'the "header" of an uploaded file, 64 hexadecimal digits' })
      .optional()
      .describe('of the file they were made for, as its upload was answered with: they are offered for its like'),
  })
  .meta({ id: 'KeptMap' });

export type KeptMapGiven = z.output<typeof keptMapSchema>;
