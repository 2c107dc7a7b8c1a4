import { ask } from '../api/ask.js';
import type { RecordShown, ReviewShown, RevisionHeadShown, RevisionShown, SiteShown } from '../api/shown.js';
import { type DeskState, documentToKeep } from './desk-state.js';

/**
 * What the server keeps of a site: records, revisions, the latest revision with its review.
 * @param path of the site
 */
export async function fetchKept(path: string): Promise<Pick<DeskState, 'records' | 'revisions' | 'kept' | 'review'>> {
  const { records } = (await ask<{ records: RecordShown[] }>(`${path}/records`)).body;
  const { revisions } = (await ask<{ revisions: RevisionHeadShown[] }>(`${path}/revisions`)).body;
  const latest = revisions[0];
  const kept = latest === undefined ? null : (await ask<RevisionShown>(latest.links.self)).body;
  const review = latest === undefined ? null : (await ask<ReviewShown>(`${latest.links.self}/review`)).body;
  return { records, revisions, kept, review };
}

/** Saves the site file over the version that was loaded. */
export async function saveDocument(path: string, state: DeskState, kind: 'plan' | 'assess'): Promise<SiteShown> {
  const headers = { 'if-match': `"${state.site!.version}"` };
  return (await ask<SiteShown>(path, { method: 'PUT', json: documentToKeep(state, kind), headers })).body;
}
