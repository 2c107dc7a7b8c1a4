import { randomUUID } from 'node:crypto';
import { Body, Controller, Delete, Get, Headers, HttpCode, Param, Post, Put, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { type KeptMapGiven, keptMapSchema } from '#libs/contract/kept-map-schema.js';
import { KeptMap } from '#libs/store/kept-map.js';
import { deleteKeptMap, insertKeptMap, type KeptMapContent, noKeptMap, replaceKeptMap } from '#libs/store/kept-maps.js';
import { Store } from '#libs/store/store.js';
import { ContractPipe } from '../contract-pipe.js';
import { type Actor, actorOf, CurrentActor } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { isId } from '../sites/find-site.js';
import { tagOf, versionSeen } from '../sites/version-tag.js';

/** Answers about meter files, kept under names to be chosen at an upload. */
@Controller('api/kept-maps')
export class KeptMapsController {
  constructor(private readonly store: Store) {}

  @Get()
  @Needs('viewer', 'Lists the answers that are kept, by name.')
  async list(@CurrentActor() { organisationId }: Actor) {
    const kept = await this.store.read((manager) =>
      manager.find(KeptMap, { where: { organisationId }, order: { name: 'ASC' } }),
    );
    return { keptMaps: kept.map(shown) };
  }

  @Post()
  @Needs('planner', 'Keeps answers about a meter file under a name.')
  async create(
    @CurrentActor() actor: Actor,
    @Body({ schema: keptMapSchema, pipes: [new ContractPipe()] }) body: KeptMapGiven,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const content = contentOf(body, actor);
    const kept = await this.store.write((manager) => insertKeptMap(manager, randomUUID(), content, new Date()));
    reply.header('location', `/api/kept-maps/${kept.id}`);
    return answerWith(kept, reply);
  }

  @Get(':keptMapId')
  @Needs('viewer', 'Gives kept answers; the ETag is their version.')
  async get(
    @CurrentActor() actor: Actor,
    @Param('keptMapId') id: string,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    return answerWith(await this.#find(actor, id), reply);
  }

  @Put(':keptMapId')
  @Needs('planner', 'Replaces kept answers, if they still have the version named in If-Match.')
  async replace(
    @Param('keptMapId') keptMapId: string,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: keptMapSchema, pipes: [new ContractPipe()] }) body: KeptMapGiven,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const version = versionSeen(seen, true) ?? 0;
    const actor = actorOf(reply.request);
    const { id } = await this.#find(actor, keptMapId);
    const content = contentOf(body, actor);
    await this.store.write((manager) => replaceKeptMap(manager, { id, version }, content, new Date()));
    return answerWith(await this.#find(actor, id), reply);
  }

  @Delete(':keptMapId')
  @HttpCode(204)
  @Needs('planner', 'Forgets kept answers; records read with them stay. If-Match is heeded where given.')
  async remove(
    @CurrentActor() actor: Actor,
    @Param('keptMapId') keptMapId: string,
    @Headers('if-match') seen: string | undefined,
  ) {
    const version = versionSeen(seen, false);
    const { id } = await this.#find(actor, keptMapId);
    await this.store.write((manager) => deleteKeptMap(manager, id, version));
  }

  async #find({ organisationId }: Actor, id: string): Promise<KeptMap> {
    const own = { id, organisationId };
    const kept = isId(id) ? await this.store.read((manager) => manager.findOneBy(KeptMap, own)) : null;
    if (kept === null) throw noKeptMap(JSON.stringify(id.slice(0, 60)));
    return kept;
  }
}

function contentOf({ name, map, header }: KeptMapGiven, { organisationId }: Actor): KeptMapContent {
  return { organisationId, name, map, header: header ?? null };
}

function shown({ organisationId: _, ...kept }: KeptMap) {
  return kept;
}

function answerWith(kept: KeptMap, reply: FastifyReply) {
  reply.header('etag', tagOf(kept.version));
  return shown(kept);
}
