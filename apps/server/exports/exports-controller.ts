import { Readable } from 'node:stream';
import { Controller, Get, Param, Query, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { calculationDocument, planDocument } from '#libs/contract/plan-document.js';
import type { PlanInputs } from '#libs/contract/plan-content.js';
import { type EstimateResult, InputProblem, type Result } from '#libs/engine/index.js';
import { keptRecordChunks } from '#libs/meter-files/kept-record/write-kept-record.js';
import { calculationFile, planFile } from '#libs/meter-files/plan-file.js';
import { documentFile } from '#libs/meter-files/site-document.js';
import { TABLE_FORMS, type TableForm } from '#libs/meter-files/write-tables.js';
import { calculationTable, planTables } from '#libs/present/result-tables.js';
import { sha256 } from '#libs/store/audit-log.js';
import { readRecord } from '#libs/store/records.js';
import type { Revision } from '#libs/store/revision.js';
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

/** Site, record, plan and calculation sheet as files, each taken back with the same hash. */
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
  @Needs(
    'viewer',
    'Gives a plan with all its parts and its frozen inputs, to be taken back: ?form=json, csv (path, kind, value) or xlsx.',
  )
  async plan(@Param() path: RevisionPath, @Query() query: object, @Res() reply: FastifyReply) {
    return this.#ofRevision({ path, query, reply }, 'plan', ({ inputs }, result, form) =>
      planFile(planDocument(result, JSON.parse(inputs) as PlanInputs, sha256), planTables(result), form),
    );
  }

  @Get('revisions/:revision/calculation')
  @Needs('viewer', 'Gives the calculation sheet of a plan: every figure with formula, working and source.')
  async calculation(@Param() path: RevisionPath, @Query() query: object, @Res() reply: FastifyReply) {
    return this.#ofRevision({ path, query, reply }, 'calculation', ({ contentHash }, result, form) =>
      calculationFile(calculationDocument(result, contentHash, sha256), calculationTable(result), form),
    );
  }

  async #ofRevision(
    { path, query, reply }: { path: RevisionPath; query: object; reply: FastifyReply },
    name: string,
    fileOf: (revision: Revision, result: Result | EstimateResult, form: TableForm) => Uint8Array,
  ) {
    const revision = await findRevision(this.store, actorOf(reply.request), path);
    const form = formAsked(query);
    const result = JSON.parse(revision.result) as Result | EstimateResult;
    return attached(reply, name, form).send(fileOf(revision, result, form));
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
