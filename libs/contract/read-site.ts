import type { Site } from '#libs/engine/index.js';
import { readBySchema } from './schema-problems.js';
import { siteSchema } from './site-schema.js';

/**
 * A site file or an HTTP body as a site: checked in full, quantities as numbers in the unit of their name.
 * @param json what JSON.parse gave
 * @returns the site, optional parts as given
 * @throws InputProblem with every problem and its path
 */
export function readSite(json: unknown): Site {
  return readBySchema(siteSchema, json);
}
