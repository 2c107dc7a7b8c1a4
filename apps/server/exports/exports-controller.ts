import { Readable } from 'node:stream';
import { Controller, Get, Param, Query, Res } from '@nestjs/common';
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
import { findRevision, type RevisionPath } from '../planning/find-revision.js';
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

  @Get('export')
  @Needs('viewer', 'Gives the site file to be taken back as it is: ?form=json, csv or xlsx.')
  async site(@Param('siteId') siteId: string, @Query() query: object, @Res() reply: FastifyReply) {
    const { document } = await findSite(this.store, actorOf(reply.request), siteId);
    const form = formAsked(query);
    return attached(reply, 'site', form).send(documentFile(document, form));
  }

  @Get('records/:recordId/export')
  @Needs('viewer', 'Gives a load record to be uploaded again with the same hash: ?form=json, csv or xlsx.')
  async record(
    @Param('siteId') siteId: string,
    @Param('recordId') recordId: string,
    @Query() query: object,
    @Res() reply: FastifyReply,
  ) {
    const site = await findSite(this.store, actorOf(reply.request), siteId);
    const { id } = await findRecord(this.store, site, recordId);
    const form = formAsked(query);
    const record = await this.store.read((manager) => readRecord(manager, id));
    if (record === null) throw new Error(`record ${id} vanished`);
    return attached(reply, 'record', form).send(Readable.from(keptRecordChunks(record, form)));
  }

  @Get('revisions/:revision/plan')
  @Needs('viewer', 'Gives a plan with all its parts: ?form=json, csv (path, kind, value) or xlsx (a sheet a part).')
  async plan(@Param() path: RevisionPath, @Query() query: object, @Res() reply: FastifyReply) {
    return this.#ofRevision({ path, query, reply }, 'plan', (result, form) =>
      planFile(result, planTables(result), form),
    );
  }

  @Get('revisions/:revision/calculation')
  @Needs('viewer', 'Gives the calculation sheet of a plan: every figure with formula, working and source.')
  async calculation(@Param() path: RevisionPath, @Query() query: object, @Res() reply: FastifyReply) {
    return this.#ofRevision({ path, query, reply }, 'calculation', (result, form) =>
      calculationFile(result.figures, calculationTable(result), form),
    );
  }

  async #ofRevision(
    { path, query, reply }: { path: RevisionPath; query: object; reply: FastifyReply },
    name: string,
    fileOf: (result: Result | EstimateResult, form: TableForm) => Uint8Array | string,
  ) {
    const revision = await findRevision(this.store, actorOf(reply.request), path);
    const form = formAsked(query);
    return attached(reply, name, form).send(fileOf(JSON.parse(revision.result) as Result | EstimateResult, form));
  }
}

/** @throws InputProblem for a form that isn't made, or another parameter */
function formAsked(query: object): TableForm {
  const { form = 'json', ...rest } = query as Record<string, unknown>;
  const [unknown] = Object.keys(rest);
  if (unknown !== undefined) {
    const path = JSON.stringify(unknown.slice(0, 60));
    throw new InputProblem([{ code: 'unknown-key', path, expected: 'form', found: 'another parameter' }]);
  }
  const known = TABLE_FORMS.find((one) => one === form);
  if (known !== undefined) return known;
  const found = JSON.stringify(String(form).slice(0, 60));
  throw new InputProblem([{ code: 'out-of-range', path: 'form', expected: TABLE_FORMS.join(', '), found }]);
}

function attached(reply: FastifyReply, name: string, form: TableForm): FastifyReply {
  return reply.type(TYPES[form]).header('content-disposition', `attachment; filename="${name}.${form}"`);
}
