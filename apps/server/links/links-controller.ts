import { randomUUID } from 'node:crypto';
import { Body, Controller, Delete, Get, HttpCode, Param, Post, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { type NewLink, newLinkSchema } from '#libs/contract/link-schema.js';
import { RevisionLink } from '#libs/store/revision-link.js';
import { linksOf, noLink, revokeLink } from '#libs/store/revision-links.js';
import { Store } from '#libs/store/store.js';
import { ContractPipe } from '../contract-pipe.js';
import { type Actor, actorOf, CurrentActor } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { makeToken, tokenHash } from '../people/secret-token.js';
import { findRevision } from '../planning/find-revision.js';
import { isId } from '../sites/find-site.js';

/** Links that show one revision to people without an account. */
@Controller('api/sites/:siteId/revisions/:revision/links')
export class LinksController {
  constructor(private readonly store: Store) {}

  @Get()
  @Needs('planner', 'Lists the links to a revision, those that hold no more too; the links themselves are not kept.')
  async list(@CurrentActor() actor: Actor, @Param('siteId') siteId: string, @Param('revision') revision: string) {
    const { id } = await findRevision(this.store, actor, { siteId, revision });
    return { links: (await this.store.read((manager) => linksOf(manager, id))).map(showLink) };
  }

  @Post()
  @Needs('planner', 'Makes a link that shows this revision alone, read only; it is shown this once.')
  async make(
    @Param('siteId') siteId: string,
    @Param('revision') revision: string,
    @Body({ schema: newLinkSchema, pipes: [new ContractPipe()] }) { days }: NewLink,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const actor = actorOf(reply.request);
    const { id: revisionId } = await findRevision(this.store, actor, { siteId, revision });
    const token = makeToken();
    const createdAt = new Date();
    const row: RevisionLink = {
      ...{ id: randomUUID(), revisionId, tokenHash: tokenHash(token), madeBy: actor.name, createdAt },
      expiresAt: new Date(createdAt.getTime() + days * 86_400_000),
      revokedAt: null,
    };
    await this.store.write((manager) => manager.insert(RevisionLink, row));
    reply.header('cache-control', 'no-store');
    return { ...showLink(row), path: `/links/${token}` };
  }

  @Delete(':linkId')
  @HttpCode(204)
  @Needs('planner', 'Revokes a link.')
  async revoke(
    @CurrentActor() actor: Actor,
    @Param('siteId') siteId: string,
    @Param('revision') revision: string,
    @Param('linkId') id: string,
  ) {
    const { id: revisionId } = await findRevision(this.store, actor, { siteId, revision });
    if (!isId(id)) throw noLink();
    await this.store.write((manager) => revokeLink(manager, { id, revisionId }, new Date()));
  }
}

function showLink({ tokenHash: _, revisionId: __, ...shown }: RevisionLink) {
  return shown;
}
