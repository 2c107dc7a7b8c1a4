import { Controller, Get, Param, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { entriesOf } from '#libs/store/audit-log.js';
import { readReview } from '#libs/store/reviews.js';
import { Store } from '#libs/store/store.js';
import { actorOf } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { findRevision, type RevisionPath } from '../planning/find-revision.js';
import { findSite } from '../sites/find-site.js';
import { compared, differencesOf } from './differences.js';
import { differencesPage } from './differences-page.js';
import { personOf } from './person-of.js';
import { reviewPage } from './review-page.js';
import { REVIEW_SCRIPT } from './review-script.js';
import { showReview } from './show-review.js';
import { stalenessOf } from './staleness.js';

/** The pages of a revision: its review, and what differs from another. */
@Controller()
export class ReviewPageController {
  constructor(private readonly store: Store) {}

  @Get('review.js')
  @Needs('viewer', 'Gives the script of the review’s page.')
  script(@Res() reply: FastifyReply) {
    return reply.type('text/javascript; charset=utf-8').header('cache-control', 'no-cache').send(REVIEW_SCRIPT);
  }

  @Get('sites/:siteId/revisions/:revision/review')
  @Needs('viewer', 'Shows the review of a revision, with what may be done next.')
  async review(@Param() path: RevisionPath, @Res() reply: FastifyReply) {
    const actor = actorOf(reply.request);
    const site = await findSite(this.store, actor, path.siteId);
    const revision = await findRevision(this.store, actor, path);
    const found = await this.store.read((manager) => readReview(manager, revision.id));
    const entries = await this.store.read((manager) => entriesOf(manager, revision.id));
    const isOpen = found.review.state === 'draft' || found.review.state === 'forReview';
    const stale = isOpen ? await stalenessOf(this.store, site, revision) : null;
    const shown = showReview(found, { revision, entries, stale });
    return this.#page(reviewPage({ shown, revision, siteName: site.name, viewer: personOf(actor) }), reply);
  }

  @Get('sites/:siteId/revisions/:revision/differences/:other')
  @Needs('viewer', 'Shows where two revisions differ.')
  async differences(@Param() path: RevisionPath & { other: string }, @Res() reply: FastifyReply) {
    const actor = actorOf(reply.request);
    const before = await findRevision(this.store, actor, path);
    const after = await findRevision(this.store, actor, { siteId: path.siteId, revision: path.other });
    return this.#page(differencesPage(before, after, differencesOf(compared(before), compared(after))), reply);
  }

  #page(text: string, reply: FastifyReply) {
    return reply.type('text/html; charset=utf-8').header('cache-control', 'no-cache').send(text);
  }
}
