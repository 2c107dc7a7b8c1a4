import type { Site } from '#libs/engine/index.js';
import { readBySchema } from './schema-problems.js';
import { siteSchema } from './site-schema.js';
import { understandSite } from './understand-site.js';

/**
 * A site file or an HTTP body as a site: checked in full, quantities as numbers in the unit of their name.
 * @param json what JSON.parse gave
 * @returns the site, optional parts as given, every quantity in the engine's one form
 * @throws InputProblem with every problem and its path
 */
export function readSite(json: unknown): Site {
  return understandSite(readBySchema(siteSchema, json), json);
}
