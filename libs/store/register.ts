import { createHash } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { recordBytes } from '#libs/contract/record-hash.js';
import { chainFaults } from '#libs/review/audit-chain.js';
import { afterEvent, newReview, type Review } from '#libs/review/review.js';
import type { FrozenPlanMark } from '#libs/review/review-act.js';
import { AuditEntry } from './audit-entry.js';
import { type AuditContent, sha256 } from './audit-log.js';
import { IssuedPaper } from './issued-paper.js';
import { planHash } from './plan-hash.js';
import { ProposalFile } from './proposal-file.js';
import { readRecord } from './records.js';
import { ReviewStanding } from './review-standing.js';
import { Revision } from './revision.js';

/** Something the register says that does not agree with its log. */
export interface RegisterFault {
  fault: 'log' | 'history' | 'standing' | 'plan' | 'record' | 'draftPaper' | 'issuedPaper';
  /** line of the log, where one is concerned */
  sequence: number | null;
  revisionId: string | null;
}

/** What the log says of a revision. */
interface Told {
  review: Review;
  draft: FrozenPlanMark | null;
  lines: number;
  last: number;
}

const LINES_AT_ONCE = 500;

/**
 * Reads the whole log and holds what is stored against it: the chain, where each review stands by its lines, and of the
 * revisions in it the frozen plan, the record behind an approval, the draft paper and the issued one.
 * @param manager a read's manager
 * @param only the revision whose plan and papers are held against the log; absent, every one
 * @returns every disagreement; none where nothing was altered
 */
export async function registerFaults(manager: EntityManager, only?: string): Promise<RegisterFault[]> {
  const faults: RegisterFault[] = [];
  const entries = await readLog(manager);
  for (const { sequence } of chainFaults(entries, sha256)) faults.push({ fault: 'log', sequence, revisionId: null });
  const told = new Map<string, Told>();
  for (const entry of entries) {
    const { sequence, revisionId } = entry;
    if (!tellInto(told, entry)) faults.push({ fault: 'history', sequence, revisionId });
  }
  faults.push(...(await standingFaults(manager, told)));
  for (const [revisionId, one] of told) {
    if (only !== undefined && only !== revisionId) continue;
    for (const fault of await frozenFaults(manager, revisionId, one))
      faults.push({ fault, sequence: null, revisionId });
  }
  return [...faults, ...(await strayFaults(manager, told))];
}

async function readLog(manager: EntityManager): Promise<AuditEntry[]> {
  const entries: AuditEntry[] = [];
  for (;;) {
    const page = { order: { sequence: 'ASC' }, skip: entries.length, take: LINES_AT_ONCE } as const;
    const more = await manager.find(AuditEntry, page);
    entries.push(...more);
    if (more.length < LINES_AT_ONCE) return entries;
  }
}

/** Follows one line; false where it cannot be read, or is not of the revision it stands with. */
function tellInto(told: Map<string, Told>, { content, revisionId, sequence }: AuditEntry): boolean {
  try {
    const { at, by, act, ...of } = JSON.parse(content) as AuditContent;
    if (of.revisionId !== revisionId) return false;
    const before = told.get(revisionId) ?? { review: newReview(), draft: null, lines: 0, last: 0 };
    const draft = act.act === 'prepare' || act.act === 'submit' ? act : before.draft;
    const review = afterEvent(before.review, { at, by, act });
    told.set(revisionId, { review, draft, lines: before.lines + 1, last: sequence });
    return true;
  } catch {
    return false;
  }
}

async function standingFaults(manager: EntityManager, told: Map<string, Told>): Promise<RegisterFault[]> {
  const rows = await manager.find(ReviewStanding);
  const stood = new Set(rows.map(({ revisionId }) => revisionId));
  const wrong = rows.filter(({ revisionId, state, version, lastSequence }) => {
    const one = told.get(revisionId);
    return one === undefined || state !== one.review.state || version !== one.lines || lastSequence !== one.last;
  });
  // A draft goes with its site; what was issued does not.
  const lost = [...told].filter(([id, { review }]) => !stood.has(id) && review.approval !== null).map(([id]) => id);
  const ids = [...wrong.map(({ revisionId }) => revisionId), ...lost];
  return ids.map((revisionId) => ({ fault: 'standing', sequence: null, revisionId }));
}

async function frozenFaults(manager: EntityManager, revisionId: string, told: Told): Promise<RegisterFault['fault'][]> {
  const { draft, review } = told;
  const { approval } = review;
  const revision = await readable(manager.findOneBy(Revision, { id: revisionId }));
  if (revision === null) return approval === null ? [] : ['plan'];
  const marks = [draft, approval].filter((mark) => mark !== null);
  const faults: RegisterFault['fault'][] = [];
  if (revision === 'unreadable' || !isPlan(revision, marks)) faults.push('plan');
  if (draft !== null && !isPaper(await manager.findOneBy(ProposalFile, { revisionId }), draft))
    faults.push('draftPaper');
  if (approval === null) return faults;
  const issued = await readable(manager.findOneBy(IssuedPaper, { revisionId }));
  if (issued === 'unreadable' || !isPaper(issued, approval)) faults.push('issuedPaper');
  if (revision !== 'unreadable' && !(await isRecord(manager, revision))) faults.push('record');
  return faults;
}

/** A value that was altered may not even be read any more. */
async function readable<T>(read: Promise<T>): Promise<T | 'unreadable'> {
  return read.catch(() => 'unreadable' as const);
}

function isPlan(revision: Revision, marks: readonly FrozenPlanMark[]): boolean {
  if (Number.isNaN(revision.createdAt.getTime()) || sha256(revision.inputs) !== revision.contentHash) return false;
  const hash = planHash(revision);
  return marks.every((mark) => mark.planHash === hash);
}

function isPaper(file: Pick<ProposalFile, 'bytes' | 'sha256'> | null, { paper }: FrozenPlanMark): boolean {
  return file !== null && file.sha256 === paper.sha256 && sha256(file.bytes) === paper.sha256;
}

/** Whether the intervals an approved plan rests on are still the ones that were hashed. */
async function isRecord(manager: EntityManager, { recordId, recordHash }: Revision): Promise<boolean> {
  if (recordId === null) return recordHash === null;
  const record = await readable(readRecord(manager, recordId));
  if (record === null || record === 'unreadable') return false;
  const hash = createHash('sha256');
  for (const chunk of recordBytes(record)) hash.update(chunk);
  return hash.digest('hex') === recordHash;
}

/** A paper that nobody approved. */
async function strayFaults(manager: EntityManager, told: Map<string, Told>): Promise<RegisterFault[]> {
  const papers = await manager.find(IssuedPaper, { select: { revisionId: true } });
  return papers
    .filter(({ revisionId }) => told.get(revisionId)?.review.approval == null)
    .map(({ revisionId }) => ({ fault: 'issuedPaper', sequence: null, revisionId }));
}
