import { Body, Controller, Get, Headers, HttpCode, Param, Post, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import {
  type AcceptFinding,
  acceptFindingSchema,
  type Approve,
  approveSchema,
  type Comment,
  type Commission,
  commentSchema,
  commissionSchema,
  type HandCheckGiven,
  handCheckSchema,
  type Reason,
  reasonSchema,
  type SendForReview,
  type Supersede,
  submitSchema,
  supersedeSchema,
} from '#libs/contract/review-schema.js';
import { InputProblem } from '#libs/engine/index.js';
import type { ReviewAct } from '#libs/review/review-act.js';
import { entriesOf } from '#libs/store/audit-log.js';
import { IssuedPaper } from '#libs/store/issued-paper.js';
import { readReview, type VersionedReview } from '#libs/store/reviews.js';
import { Store } from '#libs/store/store.js';
import { ContractPipe } from '../contract-pipe.js';
import { actorOf } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { findRevision, type RevisionPath } from '../planning/find-revision.js';
import { findSite } from '../sites/find-site.js';
import { tagOf, versionSeen } from '../sites/version-tag.js';
import { figureIds } from './review-inputs.js';
import { type Asked, Reviews } from './reviews.js';
import { showReview } from './show-review.js';
import { stalenessOf } from './staleness.js';

const PIPES = [new ContractPipe()];

/** The review of a revision: every act names in If-Match the version it was decided on. */
@Controller('api/sites/:siteId/revisions/:revision')
export class ReviewController {
  constructor(
    private readonly store: Store,
    private readonly reviews: Reviews,
  ) {}

  @Get('review')
  @Needs('viewer', 'Says where the review of a revision stands, with its log; the ETag is its version.')
  async get(@Param() path: RevisionPath, @Res() reply: FastifyReply) {
    const revision = await findRevision(this.store, actorOf(reply.request), path);
    return this.#answer(path, await this.store.read((manager) => readReview(manager, revision.id)), reply);
  }

  @Get('approved.pdf')
  @Needs('viewer', 'Gives the paper of the approval, the same bytes for ever.')
  async paper(@Param() path: RevisionPath, @Res() reply: FastifyReply) {
    const { id, number, revision } = await findRevision(this.store, actorOf(reply.request), path);
    const paper = await this.store.read((manager) => manager.findOneBy(IssuedPaper, { revisionId: id }));
    if (paper === null) {
      throw new InputProblem([{ code: 'not-found', expected: 'a revision that was approved', found: `${revision}` }]);
    }
    return reply
      .type('application/pdf')
      .header('etag', `"${paper.sha256}"`)
      .header('content-disposition', `inline; filename="${number}-revision-${revision}-approved.pdf"`)
      .send(paper.bytes);
  }

  @Post('review/submit')
  @HttpCode(200)
  @Needs('planner', 'Sends a draft for review; findings and decisive figures are frozen with it.')
  async submit(
    @Param() path: RevisionPath,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: submitSchema, pipes: PIPES }) { note, signature }: SendForReview,
    @Res() reply: FastifyReply,
  ) {
    const design = signature === undefined ? null : { capacity: 'design' as const, ...signature };
    return this.#answer(
      path,
      await this.reviews.submit(await this.#asked(path, seen, reply), note ?? null, design),
      reply,
    );
  }

  @Post('review/findings')
  @HttpCode(200)
  @Needs('reviewer', 'Accepts one finding, with the reason.')
  async accept(
    @Param() path: RevisionPath,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: acceptFindingSchema, pipes: PIPES }) { finding, reason }: AcceptFinding,
    @Res() reply: FastifyReply,
  ) {
    return this.#act({ act: 'acceptFinding', finding, reason }, path, seen, reply);
  }

  @Post('review/hand-checks')
  @HttpCode(200)
  @Needs('reviewer', 'Enters a figure worked out by hand; more than 2 % from the plan’s is flagged.')
  async handCheck(
    @Param() path: RevisionPath,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: handCheckSchema, pipes: PIPES }) { figure, value }: HandCheckGiven,
    @Res() reply: FastifyReply,
  ) {
    return this.#act({ act: 'handCheck', figure, value }, path, seen, reply);
  }

  @Post('review/comments')
  @HttpCode(200)
  @Needs('planner', 'Comments on a figure, or on the whole plan.')
  async comment(
    @Param() path: RevisionPath,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: commentSchema, pipes: PIPES }) { figure, text }: Comment,
    @Res() reply: FastifyReply,
  ) {
    const revision = await findRevision(this.store, actorOf(reply.request), path);
    if (figure !== undefined && !figureIds(revision).includes(figure)) {
      const expected = 'the id of a figure of this revision';
      throw new InputProblem([{ code: 'not-found', path: 'figure', expected, found: JSON.stringify(figure) }]);
    }
    return this.#act({ act: 'comment', figure: figure ?? null, text }, path, seen, reply);
  }

  @Post('review/return')
  @HttpCode(200)
  @Needs('reviewer', 'Returns a revision to draft, with the reason.')
  async return(
    @Param() path: RevisionPath,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: reasonSchema, pipes: PIPES }) { reason }: Reason,
    @Res() reply: FastifyReply,
  ) {
    return this.#act({ act: 'return', reason }, path, seen, reply);
  }

  @Post('review/own-approval')
  @HttpCode(200)
  @Needs('administrator', 'Allows whoever prepared the plan to approve it; the paper says so.')
  async allowOwnApproval(
    @Param() path: RevisionPath,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: reasonSchema, pipes: PIPES }) { reason }: Reason,
    @Res() reply: FastifyReply,
  ) {
    return this.#act({ act: 'allowOwnApproval', reason }, path, seen, reply);
  }

  @Post('review/approve')
  @HttpCode(200)
  @Needs('reviewer', 'Approves a revision: plan and paper are frozen, earlier approved ones of its kind superseded.')
  async approve(
    @Param() path: RevisionPath,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: approveSchema, pipes: PIPES }) { password, ...signed }: Approve,
    @Res() reply: FastifyReply,
  ) {
    const asked = await this.#asked(path, seen, reply);
    return this.#answer(path, await this.reviews.approve(asked, { capacity: 'checking', ...signed }, password), reply);
  }

  @Post('review/supersede')
  @HttpCode(200)
  @Needs('reviewer', 'Puts another approved revision in the place of an approved one.')
  async supersede(
    @Param() path: RevisionPath,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: supersedeSchema, pipes: PIPES }) { by, reason }: Supersede,
    @Res() reply: FastifyReply,
  ) {
    return this.#answer(path, await this.reviews.supersede(await this.#asked(path, seen, reply), by, reason), reply);
  }

  @Post('review/withdraw')
  @HttpCode(200)
  @Needs('planner', 'Withdraws a revision, with the reason; an approved one needs a reviewer.')
  async withdraw(
    @Param() path: RevisionPath,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: reasonSchema, pipes: PIPES }) { reason }: Reason,
    @Res() reply: FastifyReply,
  ) {
    return this.#act({ act: 'withdraw', reason }, path, seen, reply);
  }

  @Post('review/commissioning')
  @HttpCode(200)
  @Needs('planner', 'Records an approved bank as installed, signed by whoever put it into service.')
  async commission(
    @Param() path: RevisionPath,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: commissionSchema, pipes: PIPES }) { record, ...signed }: Commission,
    @Res() reply: FastifyReply,
  ) {
    const act: ReviewAct = { act: 'commission', signature: { capacity: 'installation', ...signed }, record };
    return this.#act(act, path, seen, reply);
  }

  async #act(act: ReviewAct, path: RevisionPath, seen: string | undefined, reply: FastifyReply) {
    return this.#answer(path, await this.reviews.act(await this.#asked(path, seen, reply), act), reply);
  }

  async #asked(path: RevisionPath, header: string | undefined, reply: FastifyReply): Promise<Asked> {
    const actor = actorOf(reply.request);
    const seen = versionSeen(header, true) ?? 0;
    const site = await findSite(this.store, actor, path.siteId);
    return { actor, site, revision: await findRevision(this.store, actor, path), seen };
  }

  async #answer(path: RevisionPath, review: VersionedReview, reply: FastifyReply) {
    const actor = actorOf(reply.request);
    const site = await findSite(this.store, actor, path.siteId);
    const revision = await findRevision(this.store, actor, path);
    const entries = await this.store.read((manager) => entriesOf(manager, revision.id));
    const stale = ['draft', 'forReview'].includes(review.review.state)
      ? await stalenessOf(this.store, site, revision)
      : null;
    return reply.header('etag', tagOf(review.version)).send(showReview(review, { revision, entries, stale }));
  }
}
