import { ask, Refused } from '../api/ask.js';
import type { PaperShown, SiteDocument } from '../api/shown.js';

export const PAPER_KINDS = ['tariff', 'prices'] as const;
export type PaperKind = (typeof PAPER_KINDS)[number];

/** A shared paper as a site names it; without a version, the latest. */
export interface PaperNamed {
  name: string;
  version?: number;
}

/** The shared papers a site names, with what they say. */
export type HeldPapers = Partial<Record<PaperKind, PaperShown & { document: object }>>;

/** The shared paper that stands in for a part of the site file, undefined for none. */
export function paperNamed(document: SiteDocument | null, kind: PaperKind): PaperNamed | undefined {
  return (document?.papers as Partial<Record<PaperKind, PaperNamed>> | undefined)?.[kind];
}

/**
 * The version of a paper that is meant.
 * @param papers as the server lists them, the latest version of a name first
 */
export function versionMeant(
  papers: readonly PaperShown[],
  kind: PaperKind,
  { name, version }: PaperNamed,
): PaperShown | undefined {
  return papers
    .filter((paper) => paper.kind === kind && paper.name === name && (version ?? paper.version) === paper.version)
    .reduce<PaperShown | undefined>(
      (latest, one) => (latest !== undefined && latest.version > one.version ? latest : one),
      undefined,
    );
}

/** Fetches the papers a site names; one that is not there is left out, and refused once a plan is asked for. */
export async function fetchHeldPapers(document: SiteDocument | null): Promise<HeldPapers> {
  const held: HeldPapers = {};
  const named = PAPER_KINDS.filter((kind) => paperNamed(document, kind) !== undefined);
  if (named.length === 0) return held;
  const { papers } = (await ask<{ papers: PaperShown[] }>('/api/papers')).body;
  for (const kind of named) {
    const meant = versionMeant(papers, kind, paperNamed(document, kind)!);
    if (meant === undefined) continue;
    try {
      held[kind] = (await ask<PaperShown & { document: object }>(`/api/papers/${meant.id}`)).body;
    } catch (error) {
      if (!(error instanceof Refused)) throw error;
    }
  }
  return held;
}

/** The site file with the shared papers it names in place, as the engine takes it. */
export function withHeldPapers(document: SiteDocument, held: HeldPapers): SiteDocument {
  const { papers, ...rest } = document;
  if (papers === undefined) return document;
  const whole: SiteDocument = rest;
  for (const kind of PAPER_KINDS) {
    const paper = held[kind];
    if (paper !== undefined && paperNamed(document, kind)?.name === paper.name)
      whole[kind] = { name: paper.name, ...paper.document };
  }
  return whole;
}
