import { Body, Controller, Get, Inject, Param, Post, Query, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { type PlanRequest, planRequestSchema } from '#libs/contract/plan-request-schema.js';
import type { Jobs } from '#libs/jobs/jobs.js';
import { ProposalFile } from '#libs/store/proposal-file.js';
import { Revision } from '#libs/store/revision.js';
import { Store } from '#libs/store/store.js';
import { ContractPipe } from '../contract-pipe.js';
import { showJob } from '../jobs/show-job.js';
import { type Actor, actorOf, CurrentActor, LOCAL_ACTOR } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { findSite } from '../sites/find-site.js';
import { JOBS } from '../tokens.js';
import { findRevision } from './find-revision.js';
import type { FrozenPlan } from './plan-request.js';
import { Planning } from './planning.js';
import { personOf } from '../review/person-of.js';
import { refuseEnded } from './refuse-ended.js';
import { revisionHead, revisionJson } from './show-revision.js';
import { waitS } from './wait-time.js';

/** Plans and assessments of a site: asked for as jobs, kept as numbered revisions. */
@Controller('api/sites/:siteId')
export class PlanningController {
  constructor(
    private readonly store: Store,
    private readonly planning: Planning,
    @Inject(JOBS) private readonly jobs: Jobs,
  ) {}

  @Post('plans')
  @Needs(
    'planner',
    'Designs a bank for the site as it stands: 202 with the job, or 201 with the revision within ?wait=seconds.',
  )
  async plan(
    @Param('siteId') siteId: string,
    @Query() query: Record<string, unknown>,
    @Body({ schema: planRequestSchema, pipes: [new ContractPipe()] }) body: PlanRequest,
    @Res() reply: FastifyReply,
  ) {
    return this.#ask('plan', siteId, { body, waitS: waitS(query) }, reply);
  }

  @Post('assessments')
  @Needs('planner', 'Judges the site’s own bank: 202 with the job, or 201 with the revision within ?wait=seconds.')
  async assess(
    @Param('siteId') siteId: string,
    @Query() query: Record<string, unknown>,
    @Body({ schema: planRequestSchema, pipes: [new ContractPipe()] }) body: PlanRequest,
    @Res() reply: FastifyReply,
  ) {
    return this.#ask('assess', siteId, { body, waitS: waitS(query) }, reply);
  }

  @Get('revisions')
  @Needs('viewer', 'Lists the revisions of a site, the latest first.')
  async list(@CurrentActor() actor: Actor, @Param('siteId') siteId: string) {
    const { id } = await findSite(this.store, actor, siteId);
    const revisions = await this.store.read((manager) =>
      manager.find(Revision, { where: { siteId: id }, order: { revision: 'DESC' } }),
    );
    return { revisions: revisions.map(revisionHead) };
  }

  @Get('revisions/:revision')
  @Needs('viewer', 'Gives a revision: frozen inputs, hashes, engine version and the result.')
  async get(@Param('siteId') siteId: string, @Param('revision') revision: string, @Res() reply: FastifyReply) {
    return this.#send(await findRevision(this.store, actorOf(reply.request), { siteId, revision }), reply);
  }

  @Get('revisions/:revision/proposal.pdf')
  @Needs('viewer', 'Gives the proposal of a revision, the same bytes at every download.')
  async proposal(@Param('siteId') siteId: string, @Param('revision') revision: string, @Res() reply: FastifyReply) {
    const {
      id,
      number,
      revision: count,
    } = await findRevision(this.store, actorOf(reply.request), { siteId, revision });
    const file = await this.store.read((manager) => manager.findOneByOrFail(ProposalFile, { revisionId: id }));
    return reply
      .type('application/pdf')
      .header('etag', `"${file.sha256}"`)
      .header('content-disposition', `inline; filename="${number}-revision-${count}.pdf"`)
      .send(file.bytes);
  }

  async #ask(
    kind: FrozenPlan['kind'],
    siteId: string,
    { body, waitS }: { body: PlanRequest; waitS: number },
    reply: FastifyReply,
  ) {
    const actor = actorOf(reply.request);
    const site = await findSite(this.store, actor, siteId);
    // With an account a plan carries its name, whatever is typed.
    const author = actor === LOCAL_ACTOR ? body.author : actor.name;
    const asked = await this.planning.ask(
      kind,
      site,
      { ...body, ...(author === undefined ? {} : { author }) },
      personOf(actor),
    );
    if ('contentHash' in asked) return this.#send(asked, reply.status(200));
    const job = waitS === 0 ? asked : await this.jobs.result(asked.id, waitS);
    if (job.state === 'done') {
      reply.status(201).header('location', showJob(job).links.revision ?? '');
      return this.#send(await findRevision(this.store, actor, { siteId, revision: `${job.revision}` }), reply);
    }
    refuseEnded(job);
    return reply.status(202).header('location', showJob(job).links.self).send(showJob(job));
  }

  #send(revision: Revision, reply: FastifyReply) {
    return reply.type('application/json').header('etag', `"${revision.contentHash}"`).send(revisionJson(revision));
  }
}
