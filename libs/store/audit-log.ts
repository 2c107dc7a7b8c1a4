import { createHash } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { CHAIN_START, nextEntry, type Sha256 } from '#libs/review/audit-chain.js';
import type { ReviewEvent } from '#libs/review/review-act.js';
import { AuditEntry } from './audit-entry.js';
import type { Revision } from './revision.js';

/** SHA-256 as the log and the papers are known by. */
export const sha256: Sha256 = (content) => createHash('sha256').update(content).digest('hex');

/** What a line of the log holds: the event, and which revision it is of. */
export interface AuditContent extends ReviewEvent {
  siteId: string;
  revisionId: string;
  number: string;
  revision: number;
}

/**
 * Adds a line to the log; call it inside a write.
 * @param manager the write's manager
 * @param of the revision it speaks of
 * @param event what happened
 * @returns the line
 */
export async function appendEvent(
  manager: EntityManager,
  of: Pick<Revision, 'id' | 'siteId' | 'number' | 'revision'>,
  event: ReviewEvent,
): Promise<AuditEntry> {
  await waitForEnd(manager);
  const [last = CHAIN_START] = await manager.find(AuditEntry, { order: { sequence: 'DESC' }, take: 1 });
  const content: AuditContent = {
    ...event,
    siteId: of.siteId,
    revisionId: of.id,
    number: of.number,
    revision: of.revision,
  };
  const entry: AuditEntry = { ...nextEntry(last, content, sha256), revisionId: of.id };
  await manager.insert(AuditEntry, entry);
  return entry;
}

/** Any number of this program's own, other than its other locks. */
const LOG_LOCK = 7_183_504;

/** On SQLite writes take turns anyway; on PostgreSQL two would chain to the same line. */
async function waitForEnd(manager: EntityManager): Promise<void> {
  if (manager.dataSource.options.type !== 'postgres') return;
  await manager.query('SELECT pg_advisory_xact_lock($1)', [LOG_LOCK]);
}

/** The lines of one revision, oldest first. */
export function entriesOf(manager: EntityManager, revisionId: string): Promise<AuditEntry[]> {
  return manager.find(AuditEntry, { where: { revisionId }, order: { sequence: 'ASC' } });
}

/** What a line says happened. */
export function eventOf({ content }: Pick<AuditEntry, 'content'>): ReviewEvent {
  const { at, by, act } = JSON.parse(content) as AuditContent;
  return { at, by, act };
}
