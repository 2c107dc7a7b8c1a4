import { createHash } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import { estimateZone } from '#libs/contract/estimate-zone.js';
import { frozenSite } from '#libs/contract/frozen-site.js';
import { planContent } from '#libs/contract/plan-content.js';
import type { PlanRequest } from '#libs/contract/plan-request-schema.js';
import { zoneTableOf } from '#libs/contract/time-zone.js';
import { ENGINE_VERSION, InputProblem } from '#libs/engine/index.js';
import type { Jobs } from '#libs/jobs/jobs.js';
import { readLogo } from '#libs/proposal/read-logo.js';
import type { Person } from '#libs/review/review-act.js';
import type { Job } from '#libs/store/job.js';
import { paperFormOf } from '#libs/store/paper-form.js';
import type { Revision } from '#libs/store/revision.js';
import { standingRevision } from '#libs/store/revisions.js';
import { Store } from '#libs/store/store.js';
import { StoredRecord } from '#libs/store/stored-record.js';
import type { StoredSite } from '#libs/store/stored-site.js';
import { siteWithPapers } from '../papers/site-with-papers.js';
import { findRecord } from '../records/find-record.js';
import { JOBS } from '../tokens.js';
import type { FrozenPlan } from './plan-request.js';

/** Freezes what a plan is made from and hands it to the jobs. */
@Injectable()
export class Planning {
  constructor(
    private readonly store: Store,
    @Inject(JOBS) private readonly jobs: Jobs,
  ) {}

  /**
   * Asks for a plan or an assessment of the site as it stands now, by its latest record, or its estimate without one.
   * @param by who asks; absent where it is the program itself
   * @returns the revision that equal inputs have led to on an equal paper, else the job that will make it
   * @throws InputProblem where the site, the record or the bank to judge is missing
   */
  async ask(kind: FrozenPlan['kind'], stored: StoredSite, request: PlanRequest, by?: Person): Promise<Revision | Job> {
    const whole = await siteWithPapers(this.store, stored, request.papers);
    const site = frozenSite(whole, Date.now() / 1000);
    if (kind === 'assess' && site.bank === undefined) {
      throw new InputProblem([{ code: 'missing', path: 'bank', expected: 'the bank to judge', found: 'nothing' }]);
    }
    const record = await this.recordOf(stored.id, request.recordId);
    if (record === null && site.estimate === undefined) throw nothingToPlanWith();
    if (request.logo !== undefined) readLogo(Buffer.from(request.logo, 'base64'));
    const zone = record === null ? estimateZone(site) : zoneTableOf(site.timeZone, record);
    const frozen: FrozenPlan = {
      kind,
      site,
      zone,
      recordId: record?.id ?? null,
      recordHash: record?.hash ?? null,
      author: request.author ?? null,
      reason: request.reason ?? null,
      ...(by === undefined ? {} : { preparedBy: by }),
      ...(request.paper === undefined ? {} : { paper: request.paper }),
      ...(request.language === undefined ? {} : { language: request.language }),
      ...(request.logo === undefined ? {} : { logo: request.logo }),
    };
    return this.make(stored.id, frozen);
  }

  /**
   * Asks for the revision that frozen inputs lead to.
   * @param siteId whose revision it becomes
   * @param frozen inputs, and who wants them computed
   * @returns the revision where equal inputs have led to one already, else the job that will make it
   */
  async make(siteId: string, frozen: FrozenPlan): Promise<Revision | Job> {
    const { hash } = contentOf(frozen);
    const paperForm = paperFormOf(frozen);
    const key = { siteId, contentHash: hash, paperForm };
    const standing = await this.store.read((manager) => standingRevision(manager, key));
    if (standing !== null) return standing;
    const inputHash = paperForm === null ? hash : createHash('sha256').update(`${hash} ${paperForm}`).digest('hex');
    const { kind } = frozen;
    return this.jobs.submit({ siteId, kind, inputHash, engineVersion: ENGINE_VERSION, request: frozen });
  }

  /**
   * The record a site is planned by.
   * @param siteId of the site
   * @param recordId a certain one; the latest where absent
   * @returns null where the site has none
   */
  async recordOf(siteId: string, recordId: string | undefined): Promise<StoredRecord | null> {
    if (recordId !== undefined) return findRecord(this.store, { id: siteId }, recordId);
    const [latest] = await this.store.read((manager) =>
      manager.find(StoredRecord, { where: { siteId }, order: { createdAt: 'DESC', id: 'ASC' }, take: 1 }),
    );
    return latest ?? null;
  }
}

/** The text a plan is known by, and its SHA-256. */
export function contentOf({ kind, site, recordHash, zone }: FrozenPlan): { text: string; hash: string } {
  const text = planContent({ kind, site, recordHash, zone, engineVersion: ENGINE_VERSION });
  return { text, hash: createHash('sha256').update(text).digest('hex') };
}

function nothingToPlanWith(): InputProblem {
  const expected = 'a load record of this site, or an estimate in its site file: upload a meter file first';
  return new InputProblem([{ code: 'missing', path: 'recordId', expected, found: 'none' }]);
}
