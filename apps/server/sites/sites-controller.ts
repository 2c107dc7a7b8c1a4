import { randomUUID } from 'node:crypto';
import { Body, Controller, Delete, Get, Headers, HttpCode, Param, Post, Put, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { siteSchema } from '#libs/contract/site-schema.js';
import { STATE_WORDS } from '#libs/present/review-words.js';
import { latestRevisions } from '#libs/store/revisions.js';
import { deleteSite, insertSite, replaceSite } from '#libs/store/sites.js';
import { Store } from '#libs/store/store.js';
import { StoredSite } from '#libs/store/stored-site.js';
import { type Actor, actorOf, CurrentActor } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { findSite } from './find-site.js';
import { tagOf, versionSeen } from './version-tag.js';

/** Sites: the body is the site file, and what is kept is the file as it was given. */
@Controller('api/sites')
export class SitesController {
  constructor(private readonly store: Store) {}

  @Get()
  @Needs('viewer', 'Lists the sites, each with its latest revision.')
  async list(@CurrentActor() { organisationId }: Actor) {
    const sites = await this.store.read((manager) =>
      manager.find(StoredSite, { where: { organisationId }, order: { number: 'ASC' } }),
    );
    const revisions = await this.store.read((manager) => latestRevisions(manager, organisationId));
    const latest = new Map(
      revisions.map(({ siteId, ...mark }) => [siteId, { ...mark, stateText: STATE_WORDS[mark.state] }]),
    );
    return { sites: sites.map((site) => ({ ...headOf(site), latest: latest.get(site.id) ?? null })) };
  }

  @Post()
  @Needs('planner', 'Adds a site. The body is the site file.')
  async create(
    @CurrentActor() { organisationId }: Actor,
    @Body({ schema: siteSchema }) document: object,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const { name } = await readSiteWithMathjs(document);
    const site = await this.store.write((manager) =>
      insertSite(manager, { id: randomUUID(), organisationId, name, document }, new Date()),
    );
    reply.header('location', `/api/sites/${site.id}`);
    return answerWith(site, reply);
  }

  @Get(':siteId')
  @Needs('viewer', 'Gives a site with its file; the ETag is its version.')
  async get(
    @CurrentActor() actor: Actor,
    @Param('siteId') siteId: string,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    return answerWith(await findSite(this.store, actor, siteId), reply);
  }

  @Put(':siteId')
  @Needs('planner', 'Replaces a site’s file, if it still has the version named in If-Match.')
  async replace(
    @Param('siteId') siteId: string,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: siteSchema }) document: object,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const version = versionSeen(seen, true) ?? 0;
    const actor = actorOf(reply.request);
    const { id } = await findSite(this.store, actor, siteId);
    const { name } = await readSiteWithMathjs(document);
    await this.store.write((manager) => replaceSite(manager, { id, name, document }, version, new Date()));
    return answerWith(await findSite(this.store, actor, id), reply);
  }

  @Delete(':siteId')
  @HttpCode(204)
  @Needs('planner', 'Removes a site with its records, revisions and proposals; If-Match is heeded where given.')
  async remove(
    @CurrentActor() actor: Actor,
    @Param('siteId') siteId: string,
    @Headers('if-match') seen: string | undefined,
  ) {
    const version = versionSeen(seen, false);
    const { id } = await findSite(this.store, actor, siteId);
    await this.store.write((manager) => deleteSite(manager, id, version));
  }
}

function headOf({ document: _, lastRevision: __, organisationId: ___, ...head }: StoredSite) {
  return head;
}

function answerWith(site: StoredSite, reply: FastifyReply) {
  reply.header('etag', tagOf(site.version));
  return { ...headOf(site), site: site.document };
}
