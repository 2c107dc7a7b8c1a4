import { Controller, Delete, Get, HttpCode, Param, Post, Req, Res } from '@nestjs/common';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { InputProblem } from '#libs/engine/index.js';
import { recordColumns } from '#libs/meter-files/record-columns.js';
import { readRecord } from '#libs/store/records.js';
import { Revision } from '#libs/store/revision.js';
import { Store } from '#libs/store/store.js';
import { StoredRecord } from '#libs/store/stored-record.js';
import { type Actor, actorOf, CurrentActor } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { findSite } from '../sites/find-site.js';
import { findRecord } from './find-record.js';
import { showRecord } from './show-record.js';
import { UploadIntake } from './upload-intake.js';

/** Load records of a site, uploaded as meter files. */
@Controller('api/sites/:siteId/records')
export class RecordsController {
  constructor(
    private readonly store: Store,
    private readonly intake: UploadIntake,
  ) {}

  @Get()
  @Needs('viewer', 'Lists the load records of a site, the latest first.')
  async list(@CurrentActor() actor: Actor, @Param('siteId') siteId: string) {
    const { id, document } = await findSite(this.store, actor, siteId);
    const records = await this.store.read((manager) =>
      manager.find(StoredRecord, { where: { siteId: id }, order: { createdAt: 'DESC', id: 'ASC' } }),
    );
    const site = await readSiteWithMathjs(document);
    return { records: records.map((record) => showRecord(record, site)) };
  }

  @Post()
  @Needs(
    'planner',
    'Reads a meter file: the body itself, or the field "file" of a form beside "format", "timeZone" and "map".',
  )
  async upload(
    @Param('siteId') siteId: string,
    @Req() request: FastifyRequest,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    return this.intake.take(await findSite(this.store, actorOf(request), siteId), null, request, reply);
  }

  @Get(':recordId')
  @Needs('viewer', 'Gives a load record: what was read, from which file, in what quality.')
  async get(@CurrentActor() actor: Actor, @Param('siteId') siteId: string, @Param('recordId') recordId: string) {
    const site = await findSite(this.store, actor, siteId);
    const record = await findRecord(this.store, site, recordId);
    return showRecord(record, await readSiteWithMathjs(site.document));
  }

  @Get(':recordId/revisions')
  @Needs('viewer', 'Lists the revisions of a load record up to the latest, which comes first.')
  async revisions(@CurrentActor() actor: Actor, @Param('siteId') siteId: string, @Param('recordId') recordId: string) {
    const site = await findSite(this.store, actor, siteId);
    const record = await findRecord(this.store, site, recordId);
    const all = await this.store.read((manager) => manager.findBy(StoredRecord, { siteId: site.id }));
    const read = await readSiteWithMathjs(site.document);
    return { records: lineOf(record, all).map((revision) => showRecord(revision, read)) };
  }

  @Post(':recordId/revisions')
  @Needs(
    'planner',
    'Extends or corrects a load record by a further meter file: the next revision, or 200 where it adds nothing.',
  )
  async extend(
    @Param('siteId') siteId: string,
    @Param('recordId') recordId: string,
    @Req() request: FastifyRequest,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const site = await findSite(this.store, actorOf(request), siteId);
    return this.intake.take(site, await findRecord(this.store, site, recordId), request, reply);
  }

  @Get(':recordId/columns')
  @Needs('viewer', 'Gives the valid intervals of a load record as columns.')
  async columns(@CurrentActor() actor: Actor, @Param('siteId') siteId: string, @Param('recordId') recordId: string) {
    const { id } = await findRecord(this.store, await findSite(this.store, actor, siteId), recordId);
    const record = await this.store.read((manager) => readRecord(manager, id));
    if (record === null) throw new Error(`record ${id} vanished`);
    return recordColumns(record);
  }

  @Delete(':recordId')
  @HttpCode(204)
  @Needs('planner', 'Removes a load record that no plan and no later revision was made from.')
  async remove(@CurrentActor() actor: Actor, @Param('siteId') siteId: string, @Param('recordId') recordId: string) {
    const { id } = await findRecord(this.store, await findSite(this.store, actor, siteId), recordId);
    await this.store.write(async (manager) => {
      const uses = await manager.countBy(Revision, { recordId: id });
      if (uses > 0) {
        const expected = 'a record that no revision was made from';
        throw new InputProblem([{ code: 'conflict', expected, found: `${uses} made from it` }]);
      }
      if (await manager.existsBy(StoredRecord, { previousId: id })) {
        const expected = 'the latest revision of its record';
        throw new InputProblem([{ code: 'conflict', expected, found: 'one that was extended' }]);
      }
      await manager.delete(StoredRecord, { id });
    });
  }
}

/** Every revision of one record, the latest first. */
function lineOf(record: StoredRecord, all: readonly StoredRecord[]): StoredRecord[] {
  const line = [record];
  for (let next = all.find(({ previousId }) => previousId === line[0]!.id); next !== undefined; ) {
    line.unshift(next);
    next = all.find(({ previousId }) => previousId === line[0]!.id);
  }
  for (let before = all.find(({ id }) => id === record.previousId); before !== undefined; ) {
    line.push(before);
    before = all.find(({ id }) => id === line.at(-1)!.previousId);
  }
  return line;
}
