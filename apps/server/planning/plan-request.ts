import type { Site, ZoneTable } from '#libs/engine/index.js';

/** What a job of planning needs, frozen when it is asked for. */
export interface FrozenPlan {
  kind: 'plan' | 'assess';
  /** as given, validated, `asOf` filled in */
  site: Site;
  zone: ZoneTable;
  /** both null where the site's own estimate stands in for a record */
  recordId: string | null;
  recordHash: string | null;
  author: string | null;
  reason: string | null;
  /** sheet and logo of the proposal; absent where none was asked for */
  paper?: 'A4' | 'Letter';
  /** base64 */
  logo?: string;
}
