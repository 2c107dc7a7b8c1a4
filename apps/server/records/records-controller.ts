import { Controller, Delete, Get, HttpCode, Param, Post, Req, Res } from '@nestjs/common';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { InputProblem } from '#libs/engine/index.js';
import { recordColumns } from '#libs/meter-files/record-columns.js';
import { readRecord } from '#libs/store/records.js';
import { Revision } from '#libs/store/revision.js';
import { noSite } from '#libs/store/sites.js';
import { Store } from '#libs/store/store.js';
import { StoredRecord } from '#libs/store/stored-record.js';
import { StoredSite } from '#libs/store/stored-site.js';
import { Public } from '../public.js';
import { findSite } from '../sites/find-site.js';
import { findRecord } from './find-record.js';
import { RecordImport } from './record-import.js';
import { showRecord } from './show-record.js';
import { Spool, type SpooledFile } from './spool.js';
import { readUploadOptions } from './upload-options.js';

/** Load records of a site, uploaded as meter files. */
@Controller('api/sites/:siteId/records')
export class RecordsController {
  constructor(
    private readonly store: Store,
    private readonly spool: Spool,
    private readonly importer: RecordImport,
  ) {}

  @Get()
  @Public('Lists the load records of a site, the latest first.')
  async list(@Param('siteId') siteId: string) {
    const { id, document } = await findSite(this.store, siteId);
    const records = await this.store.read((manager) =>
      manager.find(StoredRecord, { where: { siteId: id }, order: { createdAt: 'DESC', id: 'ASC' } }),
    );
    const site = await readSiteWithMathjs(document);
    return { records: records.map((record) => showRecord(record, site)) };
  }

  @Post()
  @Public('Reads a meter file: the body itself, or the field "file" of a form beside "format", "timeZone" and "map".')
  async upload(
    @Param('siteId') siteId: string,
    @Req() request: FastifyRequest,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const site = await findSite(this.store, siteId);
    const fromQuery = readUploadOptions(request.query as Record<string, unknown>);
    let file: SpooledFile | null = null;
    try {
      const upload = await this.spool.receive(request);
      file = upload.file;
      const options = { ...fromQuery, ...readUploadOptions(upload.fields) };
      const { timeZone } = site.document as { timeZone: string };
      const read = await this.importer.read(timeZone, file, options);
      const record = await this.store.write(async (manager) => {
        if (!(await manager.existsBy(StoredSite, { id: site.id }))) throw noSite(site.id);
        return this.importer.insert(manager, site.id, read);
      });
      reply.header('location', `/api/sites/${site.id}/records/${record.id}`);
      return showRecord(record, await readSiteWithMathjs(site.document));
    } finally {
      await this.spool.discard(file);
    }
  }

  @Get(':recordId')
  @Public('Gives a load record: what was read, from which file, in what quality.')
  async get(@Param('siteId') siteId: string, @Param('recordId') recordId: string) {
    const { id, document } = await findSite(this.store, siteId);
    const record = await findRecord(this.store, id, recordId);
    return showRecord(record, await readSiteWithMathjs(document));
  }

  @Get(':recordId/columns')
  @Public('Gives the valid intervals of a load record as columns.')
  async columns(@Param('siteId') siteId: string, @Param('recordId') recordId: string) {
    const { id } = await findRecord(this.store, siteId, recordId);
    const record = await this.store.read((manager) => readRecord(manager, id));
    if (record === null) throw new Error(`record ${id} vanished`);
    return recordColumns(record);
  }

  @Delete(':recordId')
  @HttpCode(204)
  @Public('Removes a load record that no revision was made from.')
  async remove(@Param('siteId') siteId: string, @Param('recordId') recordId: string) {
    const { id } = await findRecord(this.store, siteId, recordId);
    await this.store.write(async (manager) => {
      const uses = await manager.countBy(Revision, { recordId: id });
      if (uses > 0) {
        const expected = 'a record that no revision was made from';
        throw new InputProblem([{ code: 'conflict', expected, found: `${uses} made from it` }]);
      }
      await manager.delete(StoredRecord, { id });
    });
  }
}
