import { Readable } from 'node:stream';
import { Controller, Get, Param, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { type EstimateResult, InputProblem, type Result } from '#libs/engine/index.js';
import { keptRecordChunks } from '#libs/meter-files/kept-record/write-kept-record.js';
import { calculationFile, planFile } from '#libs/meter-files/plan-file.js';
import { documentFile } from '#libs/meter-files/site-document.js';
import { TABLE_FORMS, type TableForm } from '#libs/meter-files/write-tables.js';
import { calculationTable, planTables } from '#libs/present/result-tables.js';
import { readRecord } from '#libs/store/records.js';
import { Store } from '#libs/store/store.js';
import { actorOf } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { findRevision } from '../planning/find-revision.js';
import { findRecord } from '../records/find-record.js';
import { findSite } from '../sites/find-site.js';

const TYPES: Record<TableForm, string> = {
  json: 'application/json',
  csv: 'text/csv; charset=utf-8; header=present',
  xlsx: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
};

/** Site, record and plan as files; site and record are taken back with the same hash. */
@Controller('api/sites/:siteId')
export class ExportsController {
  constructor(private readonly store: Store) {}

  @Get('exports/:file')
  @Needs('viewer', 'Gives the site file as site.json, site.csv or site.xlsx, to be taken back as it is.')
  async site(@Param('siteId') siteId: string, @Param('file') file: string, @Res() reply: FastifyReply) {
    const { document } = await findSite(this.store, actorOf(reply.request), siteId);
    const { form } = wanted(file, ['site']);
    return attached(reply, file, form).send(documentFile(document, form));
  }

  @Get('records/:recordId/exports/:file')
  @Needs(
    'viewer',
    'Gives a load record as record.json, record.csv or record.xlsx, to be uploaded again with the same hash.',
  )
  async record(
    @Param('siteId') siteId: string,
    @Param('recordId') recordId: string,
    @Param('file') file: string,
    @Res() reply: FastifyReply,
  ) {
    const site = await findSite(this.store, actorOf(reply.request), siteId);
    const { id } = await findRecord(this.store, site, recordId);
    const { form } = wanted(file, ['record']);
    const record = await this.store.read((manager) => readRecord(manager, id));
    if (record === null) throw new Error(`record ${id} vanished`);
    return attached(reply, file, form).send(Readable.from(keptRecordChunks(record, form)));
  }

  @Get('revisions/:revision/exports/:file')
  @Needs('viewer', 'Gives a plan, or its calculation sheet, as plan or calculation with .json, .csv or .xlsx.')
  async plan(
    @Param('siteId') siteId: string,
    @Param('revision') revision: string,
    @Param('file') file: string,
    @Res() reply: FastifyReply,
  ) {
    const found = await findRevision(this.store, actorOf(reply.request), { siteId, revision });
    const { name, form } = wanted(file, ['plan', 'calculation']);
    const result = JSON.parse(found.result) as Result | EstimateResult;
    const bytes =
      name === 'plan'
        ? planFile(result, planTables(result), form)
        : calculationFile(result.figures, calculationTable(result), form);
    return attached(reply, file, form).send(bytes);
  }
}

/** @throws InputProblem `not-found` for a file that isn't made */
function wanted(file: string, names: readonly string[]): { name: string; form: TableForm } {
  const found = names
    .flatMap((name) => TABLE_FORMS.map((form) => ({ name, form })))
    .find(({ name, form }) => file === `${name}.${form}`);
  if (found !== undefined) return found;
  const expected = names.map((name) => `${name}.json, ${name}.csv, ${name}.xlsx`).join(', ');
  throw new InputProblem([
    { code: 'not-found', expected: `one of ${expected}`, found: JSON.stringify(file.slice(0, 60)) },
  ]);
}

function attached(reply: FastifyReply, file: string, form: TableForm): FastifyReply {
  return reply.type(TYPES[form]).header('content-disposition', `attachment; filename="${file}"`);
}
