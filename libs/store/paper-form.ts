import { createHash } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { Job } from './job.js';
import type { Revision } from './revision.js';

/** How a paper was asked for to look; what is absent was not asked for. */
export interface PaperAsked {
  paper?: 'A4' | 'Letter';
  language?: string;
  /** base64 */
  logo?: string;
}

/**
 * By what papers of equal inputs differ.
 * @returns "Letter de logo 1f2e3d4c5b6a7980"; null on A4 in English without a logo
 */
export function paperFormOf({ paper, language, logo }: PaperAsked): string | null {
  const parts = [
    ...(paper === undefined || paper === 'A4' ? [] : [paper]),
    ...(language === undefined || language === 'en' ? [] : [language]),
    ...(logo === undefined ? [] : [`logo ${createHash('sha256').update(logo).digest('hex').slice(0, 16)}`]),
  ];
  return parts.length === 0 ? null : parts.join(' ');
}

/** Sheet, language and logo a stored revision was asked for with: those of the first job that led to it. */
export async function askedPaperOf(
  manager: EntityManager,
  { siteId, revision, kind }: Pick<Revision, 'siteId' | 'revision' | 'kind'>,
): Promise<PaperAsked> {
  const job = await manager.findOne(Job, { where: { siteId, revision, kind }, order: { id: 'ASC' } });
  if (job === null) return {};
  const { paper, language, logo } = job.request as PaperAsked;
  return {
    ...(paper === undefined ? {} : { paper }),
    ...(language === undefined ? {} : { language }),
    ...(logo === undefined ? {} : { logo }),
  };
}
