import { createHash } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { recordBytes } from '#libs/contract/record-hash.js';
import { createLoadRecord, type RecordSummary } from '#libs/engine/index.js';
import type { Person, ReviewAct } from '#libs/review/review-act.js';
import { IssuedPaper } from '#libs/store/issued-paper.js';
import { FIRST_ORGANISATION } from '#libs/store/organisation.js';
import { frozenMark } from '#libs/store/plan-hash.js';
import { insertRecord } from '#libs/store/records.js';
import { carryOut, type VersionedReview } from '#libs/store/reviews.js';
import type { Revision } from '#libs/store/revision.js';
import { insertRevision } from '#libs/store/revisions.js';
import { insertSite } from '#libs/store/sites.js';
import type { Store } from '#libs/store/store.js';
import { signature } from './made-review.js';

export const NOW = new Date('2026-01-31T10:20:30.456Z');
export const PLANNER: Person = { id: 'p1', name: 'R. Aldane', role: 'planner' };
export const REVIEWER: Person = { id: 'p2', name: 'M. Okafor', role: 'reviewer' };

const sha256 = (content: string | Uint8Array) => createHash('sha256').update(content).digest('hex');

/** A paper in the shape of a proposal: what it says of itself, something else, an end. */
export function madePaper(revision: Pick<Revision, 'number' | 'revision' | 'contentHash'>, state: string): Buffer {
  const about = `(Proposal ${revision.number}, revision ${revision.revision}, ${state}) (${revision.contentHash})`;
  return Buffer.from(`%PDF-1.7\n${about}\n300 kvar are needed, 298.4 kvar effective.\n${about}\n%%EOF\n`);
}

/** A site with a short record and a revision of it, nobody having reviewed it. */
export async function storedRevision(store: Store, id: string, count = 1): Promise<Revision> {
  const record = createLoadRecord({
    ...{ intervalS: 900, repaired: 0, duplicates: 0, notes: [], voltageV: null, connectedKvar: null, standby: null },
    beginS: Float64Array.from({ length: 200 }, (_, i) => 1_735_689_600 + i * 900),
    activeKw: Float64Array.from({ length: 200 }, (_, i) => 200 + (i % 7)),
    laggingKvar: Float64Array.from({ length: 200 }, (_, i) => 150 + (i % 5)),
    leadingKvar: new Float64Array(200),
  });
  const hash = createHash('sha256');
  for (const chunk of recordBytes(record)) hash.update(chunk);
  const recordHash = hash.digest('hex');
  const inputs = JSON.stringify({ kind: 'plan', name: id, count });
  const revision: Revision = {
    ...{ id: `${id}-${count}`, siteId: id, number: 'P-0001', revision: count, kind: 'plan', recordId: `${id}-record` },
    ...{ recordHash, inputs, engineVersion: '0.1.0', contentHash: sha256(inputs) },
    result: JSON.stringify({ verdict: 'watch', bank: { effectiveKvar: 298.4 }, reasons: ['near a limit'] }),
    ...{
      proposed: 'eight stages.',
      rival: null,
      verdict: 'watch',
      createdAt: NOW,
      author: 'R. Aldane',
      reason: 'first',
      paperForm: null,
    },
  };
  const bytes = madePaper(revision, 'draft, not reviewed');
  await store.write(async (manager) => {
    if (count === 1) {
      await insertSite(manager, { id, organisationId: FIRST_ORGANISATION, name: 'Alder Works', document: {} }, NOW);
      const facts = {
        ...{ id: `${id}-record`, siteId: id, hash: recordHash, summary: {} as RecordSummary, quality: {} },
        ...{ fileName: null, fileHash: recordHash, fileBytes: 1, fileHeader: null, createdAt: NOW },
      };
      await insertRecord(manager, facts, record);
    }
    const standing = await insertRevision(manager, { revision, proposal: { bytes, sha256: sha256(bytes) } });
    if (standing !== revision) throw new Error(`no place for revision ${count}`);
    await act(manager, revision, PLANNER, { act: 'prepare', ...frozenMark(revision, bytes) });
  });
  return revision;
}

function act(manager: EntityManager, revision: Revision, by: Person, what: ReviewAct): Promise<VersionedReview> {
  return carryOut(manager, revision, { by, act: what, now: NOW, seen: null });
}

/** Sends a revision for review and approves it, with a finding accepted and a figure checked by hand. */
export async function approve(store: Store, revision: Revision): Promise<Buffer> {
  const draft = madePaper(revision, 'draft, not reviewed');
  const paper = madePaper(revision, 'approved');
  await store.write(async (manager) => {
    await act(manager, revision, PLANNER, {
      ...{ act: 'submit', note: 'the reactor first', signature: signature('design') },
      findings: [{ id: 'F1', level: 'to be accepted', what: 'near a limit', value: '', limit: '', consequence: '' }],
      figures: [{ id: 'bank.effectiveKvar', label: 'effective', value: 298.4, unit: 'kvar' }],
      ...frozenMark(revision, draft),
    });
    await act(manager, revision, REVIEWER, { act: 'acceptFinding', finding: 'F1', reason: 'seen on site' });
    await act(manager, revision, REVIEWER, { act: 'handCheck', figure: 'bank.effectiveKvar', value: 300 });
    await act(manager, revision, REVIEWER, {
      act: 'approve',
      signature: signature('checking'),
      ...frozenMark(revision, paper),
    });
    const issued = { revisionId: revision.id, bytes: paper, sha256: sha256(paper) };
    await manager.insert(IssuedPaper, issued);
  });
  return paper;
}
