import { Controller, Get, Param, Query, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { frozenSite } from '#libs/contract/frozen-site.js';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { zoneTableOf } from '#libs/contract/time-zone.js';
import { InputProblem, type SiteThen } from '#libs/engine/index.js';
import { WorkerPool } from '#libs/jobs/pool/worker-pool.js';
import { againWords } from '#libs/present/again-words.js';
import { catalogueOf } from '#libs/present/catalogue-of.js';
import { inLanguage } from '#libs/present/language.js';
import { LANGUAGES, type Language, languageOf } from '#libs/present/languages.js';
import { readRecord } from '#libs/store/records.js';
import type { Revision } from '#libs/store/revision.js';
import { Store } from '#libs/store/store.js';
import type { StoredSite } from '#libs/store/stored-site.js';
import { actorOf } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { findRevision, type RevisionPath } from '../planning/find-revision.js';
import { Planning } from '../planning/planning.js';
import { revisionHead } from '../planning/show-revision.js';
import { findSite } from '../sites/find-site.js';
import type { ReevaluationPaperTask, ReevaluationTask, ReevaluationValue } from './compute-reevaluation.js';
import { siteThen } from './site-then.js';

/** A bank as it stands now, beside what a revision found. */
@Controller('api/sites/:siteId/revisions/:revision/reevaluation')
export class ReevaluationController {
  constructor(
    private readonly store: Store,
    private readonly pool: WorkerPool,
    private readonly planning: Planning,
  ) {}

  @Get()
  @Needs(
    'viewer',
    'Judges the site’s bank by its latest record beside a revision: what to do first, what changed, what mends it. Nothing is kept.',
  )
  async reevaluate(@Param() path: RevisionPath, @Res() reply: FastifyReply) {
    const { revision, task } = await this.#asked(path, reply);
    const value = await this.pool.run<ReevaluationValue>('computeReevaluation', task);
    return reply.send({ revision: revisionHead(revision), ...value });
  }

  @Get('proposal.pdf')
  @Needs('viewer', 'Draws the same as a paper, a draft of no revision: ?language=en or de. Nothing is kept.')
  async proposal(@Param() path: RevisionPath, @Query() query: { language?: unknown }, @Res() reply: FastifyReply) {
    const language = askedLanguage(query.language);
    const { revision, task } = await this.#asked(path, reply);
    const reason = inLanguage(catalogueOf(language), () => againWords(revision));
    const paper: ReevaluationPaperTask = { ...task, reason, language };
    const bytes = await this.pool.run<Uint8Array>('computeReevaluationPaper', paper);
    const filename = `${revision.number}-revision-${revision.revision}-again.pdf`;
    return reply
      .type('application/pdf')
      .header('content-disposition', `inline; filename="${filename}"`)
      .send(Buffer.from(bytes));
  }

  async #asked(path: RevisionPath, { request }: FastifyReply): Promise<{ revision: Revision; task: ReevaluationTask }> {
    const actor = actorOf(request);
    const revision = await findRevision(this.store, actor, path);
    const after = await this.#now(await findSite(this.store, actor, path.siteId));
    return { revision, task: { before: await siteThen(this.store, revision), after } };
  }

  async #now(stored: StoredSite): Promise<SiteThen> {
    const site = frozenSite(await readSiteWithMathjs(stored.document), Date.now() / 1000);
    const latest = await this.planning.recordOf(stored.id, undefined);
    const record = latest === null ? null : await this.store.read((manager) => readRecord(manager, latest.id));
    if (record === null) {
      const expected = 'a load record of this site: upload a meter file first';
      throw new InputProblem([{ code: 'missing', path: 'recordId', expected, found: 'none' }]);
    }
    return { site, record, zone: zoneTableOf(site.timeZone, record) };
  }
}

/** @throws InputProblem where no paper comes in what was asked for */
function askedLanguage(asked: unknown): Language {
  if (asked === undefined) return 'en';
  const known = languageOf(asked);
  if (known !== null) return known;
  const found = JSON.stringify(String(asked).slice(0, 60));
  throw new InputProblem([{ code: 'out-of-range', path: 'language', expected: LANGUAGES.join(' or '), found }]);
}
