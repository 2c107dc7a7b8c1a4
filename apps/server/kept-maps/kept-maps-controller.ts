import { randomUUID } from 'node:crypto';
import { Body, Controller, Delete, Get, Headers, HttpCode, Param, Post, Put, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { type KeptMapGiven, keptMapSchema } from '#libs/contract/kept-map-schema.js';
import { KeptMap } from '#libs/store/kept-map.js';
import { deleteKeptMap, insertKeptMap, type KeptMapContent, noKeptMap, replaceKeptMap } from '#libs/store/kept-maps.js';
import { Store } from '#libs/store/store.js';
import { ContractPipe } from '../contract-pipe.js';
import { Public } from '../public.js';
import { isId } from '../sites/find-site.js';
import { tagOf, versionSeen } from '../sites/version-tag.js';

/** Answers about meter files, kept under names to be chosen at an upload. */
@Controller('api/kept-maps')
export class KeptMapsController {
  constructor(private readonly store: Store) {}

  @Get()
  @Public('Lists the answers that are kept, by name.')
  async list() {
    return { keptMaps: await this.store.read((manager) => manager.find(KeptMap, { order: { name: 'ASC' } })) };
  }

  @Post()
  @Public('Keeps answers about a meter file under a name.')
  async create(
    @Body({ schema: keptMapSchema, pipes: [new ContractPipe()] }) body: KeptMapGiven,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const kept = await this.store.write((manager) => insertKeptMap(manager, randomUUID(), contentOf(body), new Date()));
    reply.header('location', `/api/kept-maps/${kept.id}`);
    return answerWith(kept, reply);
  }

  @Get(':keptMapId')
  @Public('Gives kept answers; the ETag is their version.')
  async get(@Param('keptMapId') id: string, @Res({ passthrough: true }) reply: FastifyReply) {
    return answerWith(await this.#find(id), reply);
  }

  @Put(':keptMapId')
  @Public('Replaces kept answers, if they still have the version named in If-Match.')
  async replace(
    @Param('keptMapId') keptMapId: string,
    @Headers('if-match') seen: string | undefined,
    @Body({ schema: keptMapSchema, pipes: [new ContractPipe()] }) body: KeptMapGiven,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const version = versionSeen(seen, true) ?? 0;
    const { id } = await this.#find(keptMapId);
    await this.store.write((manager) => replaceKeptMap(manager, { id, version }, contentOf(body), new Date()));
    return answerWith(await this.#find(id), reply);
  }

  @Delete(':keptMapId')
  @HttpCode(204)
  @Public('Forgets kept answers; records read with them stay. If-Match is heeded where given.')
  async remove(@Param('keptMapId') keptMapId: string, @Headers('if-match') seen: string | undefined) {
    const version = versionSeen(seen, false);
    const { id } = await this.#find(keptMapId);
    await this.store.write((manager) => deleteKeptMap(manager, id, version));
  }

  async #find(id: string): Promise<KeptMap> {
    const kept = isId(id) ? await this.store.read((manager) => manager.findOneBy(KeptMap, { id })) : null;
    if (kept === null) throw noKeptMap(JSON.stringify(id.slice(0, 60)));
    return kept;
  }
}

function contentOf({ name, map, header }: KeptMapGiven): KeptMapContent {
  return { name, map, header: header ?? null };
}

function answerWith(kept: KeptMap, reply: FastifyReply): KeptMap {
  reply.header('etag', tagOf(kept.version));
  return kept;
}
