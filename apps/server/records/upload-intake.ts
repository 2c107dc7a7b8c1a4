import { Inject, Injectable } from '@nestjs/common';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import type { Jobs } from '#libs/jobs/jobs.js';
import type { Job } from '#libs/store/job.js';
import type { StoredRecord } from '#libs/store/stored-record.js';
import type { StoredSite } from '#libs/store/stored-site.js';
import { showJob } from '../jobs/show-job.js';
import { Once, replayed } from '../once/once.js';
import { refuseEnded } from '../planning/refuse-ended.js';
import { JOBS } from '../tokens.js';
import { type FrozenImport, importRequest } from './import-jobs.js';
import { type ImportOrder, RecordImport } from './record-import.js';
import { showRecord } from './show-record.js';
import { Spool, type SpooledFile } from './spool.js';
import { readUploadOptions } from './upload-options.js';

/** The site a record is for, and the record it extends. */
interface Beside {
  site: StoredSite;
  previous: StoredRecord | null;
}

/** Takes a meter file from a request to a record: at once, or as a job that whoever sent it may follow. */
@Injectable()
export class UploadIntake {
  constructor(
    private readonly spool: Spool,
    private readonly importer: RecordImport,
    @Inject(JOBS) private readonly jobs: Jobs,
    private readonly once: Once,
  ) {}

  /**
   * @param site whose record it becomes
   * @param previous the record it extends, null where it makes one of its own
   * @param request its body not read yet
   * @param reply is given status and location
   * @returns the record, or the job that makes it
   */
  async take(site: StoredSite, previous: StoredRecord | null, request: FastifyRequest, reply: FastifyReply) {
    const fromQuery = readUploadOptions(request.query as Record<string, unknown>);
    let file: SpooledFile | null = null;
    try {
      const upload = await this.spool.receive(request);
      file = upload.file;
      const options = { ...fromQuery, ...readUploadOptions(upload.fields) };
      const answered = await this.once.begin(request, { file: file.sha256, fields: upload.fields });
      if (answered !== null) return JSON.parse(replayed(reply, answered)) as object;
      const order = await this.importer.order(site, file, options, previous?.id ?? null);
      if (options.waitS === undefined) return await this.#show(await this.#readNow(order), { site, previous }, reply);
      const asked = await this.jobs.submit(importRequest(this.spool, order));
      // The same file was being read already; else it is the job's from here on.
      if ((asked.request as FrozenImport).file.place === this.spool.placeOf(file)) file = null;
      return await this.#follow(await this.jobs.result(asked.id, options.waitS), { site, previous }, reply);
    } finally {
      await this.spool.discard(file);
    }
  }

  async #readNow(order: ImportOrder): Promise<StoredRecord> {
    return this.importer.keep(await this.importer.read(order));
  }

  async #follow(job: Job, beside: Beside, reply: FastifyReply) {
    if (job.state === 'done') {
      return this.#show(await this.importer.stored(job.recordId!), beside, reply);
    }
    refuseEnded(job);
    reply.status(202).header('location', showJob(job).links.self);
    return showJob(job);
  }

  /** Answers that would have fitted are named beside the record: none was taken that the sender did not name. */
  async #show(record: StoredRecord, { site, previous }: Beside, reply: FastifyReply) {
    reply.status(record.id === previous?.id ? 200 : 201);
    reply.header('location', `/api/sites/${record.siteId}/records/${record.id}`);
    const shown = showRecord(record, await readSiteWithMathjs(site.document));
    return { ...shown, offered: await this.importer.offeredFor(site.id, record.fileHeader) };
  }
}
