import { Body, Controller, Get, HttpCode, Inject, Param, Post, Query, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import type { PlanInputs } from '#libs/contract/plan-content.js';
import { againSchema, type ComputeAgain } from '#libs/contract/review-schema.js';
import { ENGINE_VERSION } from '#libs/engine/index.js';
import type { Jobs } from '#libs/jobs/jobs.js';
import { WorkerPool } from '#libs/jobs/pool/worker-pool.js';
import { Revision } from '#libs/store/revision.js';
import { Store } from '#libs/store/store.js';
import { ContractPipe } from '../contract-pipe.js';
import { showJob } from '../jobs/show-job.js';
import { actorOf } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { findRevision, type RevisionPath } from '../planning/find-revision.js';
import { askedSheetOf, frameOf } from '../planning/frame-of.js';
import { Planning } from '../planning/planning.js';
import { refuseEnded } from '../planning/refuse-ended.js';
import { revisionHead } from '../planning/show-revision.js';
import { waitS } from '../planning/wait-time.js';
import { JOBS } from '../tokens.js';
import { type Compared, compared, differencesOf, showDifferences } from './differences.js';
import { personOf } from './person-of.js';
import { recompute } from './recompute.js';

/** Revisions beside each other, and a revision beside what the engine makes of it now. */
@Controller('api/sites/:siteId/revisions/:revision')
export class DifferencesController {
  constructor(
    private readonly store: Store,
    private readonly pool: WorkerPool,
    private readonly planning: Planning,
    @Inject(JOBS) private readonly jobs: Jobs,
  ) {}

  @Get('differences/:other')
  @Needs('viewer', 'Compares two revisions of a site field by field, results included.')
  async differences(@Param() path: RevisionPath & { other: string }, @Res() reply: FastifyReply) {
    const actor = actorOf(reply.request);
    const before = await findRevision(this.store, actor, path);
    const after = await findRevision(this.store, actor, { siteId: path.siteId, revision: path.other });
    return reply.send({
      ...{ before: revisionHead(before), after: revisionHead(after) },
      ...showDifferences(differencesOf(compared(before), compared(after))),
    });
  }

  @Post('again')
  @HttpCode(200)
  @Needs(
    'planner',
    'Computes a revision again with the engine as it is and compares; with "keep" it becomes a further one.',
  )
  async again(
    @Param() path: RevisionPath,
    @Query() query: Record<string, unknown>,
    @Body({ schema: againSchema, pipes: [new ContractPipe()] }) body: ComputeAgain,
    @Res() reply: FastifyReply,
  ) {
    const revision = await findRevision(this.store, actorOf(reply.request), path);
    return body.keep === true
      ? this.#keep(revision, body, waitS(query), reply)
      : reply.send(await this.#compare(revision));
  }

  /** Nothing is stored: a plan never changes because it was looked at with another engine. */
  async #compare(revision: Revision) {
    const frame = { ...(await frameOf(this.store, revision)), engineVersion: ENGINE_VERSION };
    const now = await recompute({ store: this.store, pool: this.pool }, revision, frame);
    const before = compared(revision);
    const result = JSON.stringify(now.result);
    const { proposed } = now;
    const after: Compared = { ...before, result, proposed, verdict: now.result.verdict, engineVersion: ENGINE_VERSION };
    return {
      revision: revisionHead(revision),
      engineVersion: { before: revision.engineVersion, after: ENGINE_VERSION },
      /** to the bit: every number and every word */
      isSame: result === revision.result && proposed === revision.proposed,
      ...showDifferences(differencesOf(before, after)),
    };
  }

  async #keep(revision: Revision, { author, reason }: ComputeAgain, wait: number, reply: FastifyReply) {
    const { siteId, recordId, recordHash } = revision;
    const { kind, site, zone } = JSON.parse(revision.inputs) as PlanInputs;
    const preparedBy = personOf(actorOf(reply.request));
    const words = { author: author ?? null, reason: reason ?? `Revision ${revision.revision}, computed again.` };
    const sheet = await askedSheetOf(this.store, revision);
    const frozen = { kind, site, zone, recordId, recordHash, ...words, preparedBy, ...sheet };
    const asked = await this.planning.make(siteId, frozen);
    if ('contentHash' in asked) return reply.send(revisionHead(asked));
    const job = wait === 0 ? asked : await this.jobs.result(asked.id, wait);
    refuseEnded(job);
    if (job.state !== 'done') return reply.status(202).header('location', showJob(job).links.self).send(showJob(job));
    const path = { siteId, revision: `${job.revision}` };
    const made = await findRevision(this.store, actorOf(reply.request), path);
    return reply.status(201).header('location', revisionHead(made).links.self).send(revisionHead(made));
  }
}
