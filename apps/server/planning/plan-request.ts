import type { Site, ZoneTable } from '#libs/engine/index.js';
import type { Language } from '#libs/present/languages.js';
import type { Person } from '#libs/review/review-act.js';

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
  /** who asked for it, and so cannot approve it alone; absent in jobs that were queued before anybody was named */
  preparedBy?: Person;
  /** sheet, language and logo of the proposal; absent where none was asked for */
  paper?: 'A4' | 'Letter';
  language?: Language;
  /** base64 */
  logo?: string;
}
