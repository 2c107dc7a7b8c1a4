import * as z from 'zod';

/** Body of a new link to a revision. */
export const newLinkSchema = z
  .strictObject({ days: z.int().min(1).max(365).default(30).describe('until it expires') })
  .meta({ id: 'NewLink' });

export type NewLink = z.output<typeof newLinkSchema>;
