import { Controller, Get, Param, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { STATE_WORDS } from '#libs/present/review-words.js';
import { IssuedPaper } from '#libs/store/issued-paper.js';
import { ProposalFile } from '#libs/store/proposal-file.js';
import { readReview } from '#libs/store/reviews.js';
import type { Revision } from '#libs/store/revision.js';
import type { RevisionLink } from '#libs/store/revision-link.js';
import { linkedRevision, noLink } from '#libs/store/revision-links.js';
import { Store } from '#libs/store/store.js';
import { isToken, tokenHash } from '../people/secret-token.js';
import { revisionHead, revisionJson } from '../planning/show-revision.js';
import { Public } from '../public.js';
import { linkedPage } from './linked-page.js';

/** What a link to a revision leads to: that revision, read only, and nothing beside it. */
@Controller()
export class LinkedController {
  constructor(private readonly store: Store) {}

  @Get('links/:token')
  @Public('Shows the revision a link leads to on a page without scripts.')
  async show(@Param('token') token: string, @Res() reply: FastifyReply) {
    const { link, revision } = await this.#find(token);
    const { review } = await this.store.read((manager) => readReview(manager, revision.id));
    const page = linkedPage(revision, { state: review.state, expiresAt: link.expiresAt, base: `/api/links/${token}` });
    return kept(reply).type('text/html; charset=utf-8').send(page);
  }

  @Get('api/links/:token')
  @Public('Gives the revision a link leads to.')
  async get(@Param('token') token: string, @Res() reply: FastifyReply) {
    const { revision } = await this.#find(token);
    const { review } = await this.store.read((manager) => readReview(manager, revision.id));
    const self = `/api/links/${token}`;
    const links = { self, proposal: `${self}/proposal.pdf`, record: null };
    const head = { ...revisionHead(revision), state: review.state, stateText: STATE_WORDS[review.state], links };
    return kept(reply).type('application/json').send(revisionJson(revision, head));
  }

  @Get('api/links/:token/proposal.pdf')
  @Public('Gives the paper of the revision a link leads to: as it was approved, before that the draft.')
  async proposal(@Param('token') token: string, @Res() reply: FastifyReply) {
    const { id, number, revision } = (await this.#find(token)).revision;
    const issued = await this.store.read((manager) => manager.findOneBy(IssuedPaper, { revisionId: id }));
    const paper =
      issued ?? (await this.store.read((manager) => manager.findOneByOrFail(ProposalFile, { revisionId: id })));
    const name = `${number}-revision-${revision}${issued === null ? '' : '-approved'}.pdf`;
    return kept(reply)
      .type('application/pdf')
      .header('content-disposition', `inline; filename="${name}"`)
      .send(paper.bytes);
  }

  async #find(token: string): Promise<{ link: RevisionLink; revision: Revision }> {
    if (!isToken(token)) throw noLink();
    return this.store.read((manager) => linkedRevision(manager, tokenHash(token), new Date()));
  }
}

/** A link that was revoked must not go on in a cache. */
function kept(reply: FastifyReply): FastifyReply {
  return reply.header('cache-control', 'private, no-store');
}
