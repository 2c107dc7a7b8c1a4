import type { Site, ZoneTable } from '#libs/engine/index.js';
import { canonicalJson } from './canonical-json.js';

/** Everything a result depends on. */
export interface PlanInputs {
  kind: 'plan' | 'assess';
  /** the site as given, validated, `asOf` frozen */
  site: Site;
  /** SHA-256 of the record's bytes, 64 hexadecimal digits; null where the site's own estimate stands in for one */
  recordHash: string | null;
  /** the table of offsets that was used */
  zone: ZoneTable;
  engineVersion: string;
}

/**
 * The text whose SHA-256 is the content hash of a plan or an assessment: equal inputs, equal hash, wherever it is made.
 * @param inputs what the result depends on
 * @returns canonical JSON
 */
export function planContent({ kind, site, recordHash, zone, engineVersion }: PlanInputs): string {
  return canonicalJson({ kind, site, recordHash, zone, engineVersion });
}
