import type { BankInput } from '#libs/engine/index.js';
import type { SiteDocument, SiteShown } from '../api/shown.js';
import type { DeskState } from './desk-state.js';

/** What was typed and not kept yet, so that a reload or a lost connection loses nothing. */
export interface Draft {
  /** version of the site it was typed on */
  version: number;
  document: SiteDocument;
  trial: BankInput | null;
}

const keyOf = (siteId: string) => `varwright:draft:${siteId}`;

/** @returns the draft of a site, null where there is none or it cannot be read */
function readDraft(siteId: string): Draft | null {
  try {
    const text = localStorage.getItem(keyOf(siteId));
    return text === null ? null : (JSON.parse(text) as Draft);
  } catch {
    return null;
  }
}

/** Storage that is full or forbidden loses the draft's survival, not the typing. */
export function keepDraft(siteId: string, draft: Draft): void {
  try {
    localStorage.setItem(keyOf(siteId), JSON.stringify(draft));
  } catch {}
}

export function dropDraft(siteId: string): void {
  try {
    localStorage.removeItem(keyOf(siteId));
  } catch {}
}

/** A site as it is opened: with what was typed on it, and the other version beside it where that came meanwhile. */
export function withDraft(site: SiteShown): Pick<DeskState, 'site' | 'document' | 'trial' | 'theirs'> {
  const draft = readDraft(site.id);
  if (draft === null) return { site, document: site.site, trial: null, theirs: null };
  const { version, document, trial } = draft;
  return { site: { ...site, version }, document, trial, theirs: version === site.version ? null : site };
}
