import { useEffect, useState } from 'react';
import type { Problem } from '#libs/engine/index.js';
import { ask, NoConnection, Refused } from '../api/ask.js';
import type { ReevaluationShown, RevisionHeadShown, SiteShown } from '../api/shown.js';

/** The site with every revision it can be held against. */
export interface HeldSite {
  site: SiteShown;
  revisions: RevisionHeadShown[];
}

/** What came of an asking: not yet anything, an answer, or why there is none. */
export type Asked<T> =
  | { state: 'asked' }
  | { state: 'answered'; answer: T }
  | { state: 'refused'; detail: string; problems: readonly Problem[] };

/** A site and its revisions. */
export function useHeldSite(siteId: string): Asked<HeldSite> {
  return useAsked(siteId, async () => {
    const site = (await ask<SiteShown>(`/api/sites/${siteId}`)).body;
    const { revisions } = (await ask<{ revisions: RevisionHeadShown[] }>(`/api/sites/${siteId}/revisions`)).body;
    return { site, revisions };
  });
}

/** The site's bank judged again beside one revision. */
export function useReevaluation(siteId: string, revision: number): Asked<ReevaluationShown> {
  const path = `/api/sites/${siteId}/revisions/${revision}/reevaluation`;
  return useAsked(path, async () => (await ask<ReevaluationShown>(path)).body);
}

/** Asks once for each key; an answer that comes after another key is dropped. */
function useAsked<T>(key: string, asking: () => Promise<T>): Asked<T> {
  const [heard, setHeard] = useState<{ key: string; asked: Asked<T> } | null>(null);
  // biome-ignore lint/correctness/useExhaustiveDependencies: what is asked follows from the key
  useEffect(() => {
    let isLeft = false;
    const hear = (asked: Asked<T>) => {
      if (!isLeft) setHeard({ key, asked });
    };
    asking().then(
      (answer) => hear({ state: 'answered', answer }),
      (error: unknown) => hear(refusalOf(error)),
    );
    return () => {
      isLeft = true;
    };
  }, [key]);
  return heard?.key === key ? heard.asked : { state: 'asked' };
}

function refusalOf(error: unknown): Asked<never> {
  if (error instanceof NoConnection)
    return {
      state: 'refused',
      detail: 'The server does not answer. Start it again, then load this page.',
      problems: [],
    };
  if (error instanceof Refused)
    return { state: 'refused', detail: error.problem.detail, problems: error.problem.problems };
  throw error;
}
