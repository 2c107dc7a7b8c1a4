import { randomUUID } from 'node:crypto';
import { Injectable } from '@nestjs/common';
import { Question } from '#libs/contract/question.js';
import { WorkerPool } from '#libs/jobs/pool/worker-pool.js';
import { insertRecord } from '#libs/store/records.js';
import type { Store } from '#libs/store/store.js';
import { StoredRecord } from '#libs/store/stored-record.js';
import type { ReadTask, ReadValue } from '../planning/read-file.js';
import type { SpooledFile } from './spool.js';
import type { UploadOptions } from './upload-options.js';

/** A meter file that was read, on its way into the database. */
export interface ReadRecord {
  file: SpooledFile;
  read: Exclude<ReadValue, { questions: unknown }>;
}

type Manager = Parameters<Parameters<Store['write']>[0]>[0];

/** Reads meter files in a worker thread and stores what they hold, whole or not at all. */
@Injectable()
export class RecordImport {
  constructor(private readonly pool: WorkerPool) {}

  /**
   * @param siteTimeZone zone local stamps are in, unless the options say another
   * @param file on disk
   * @param options what the sender says about it
   * @returns what it holds
   * @throws InputProblem where the file cannot be read, Question where it can be read in several ways
   */
  async read(siteTimeZone: string, file: SpooledFile, options: UploadOptions): Promise<ReadRecord> {
    const task: ReadTask = { path: file.path, sizeBytes: file.bytes, siteTimeZone, ...options };
    const read = await this.pool.run<ReadValue>('readFile', task);
    if ('questions' in read) throw new Question(read.questions);
    return { file, read };
  }

  /**
   * Stores what was read; call it inside a write.
   * @returns the stored record
   */
  async insert(manager: Manager, siteId: string, { file, read }: ReadRecord): Promise<StoredRecord> {
    const id = randomUUID();
    const facts = {
      id,
      siteId,
      hash: read.hash,
      summary: read.summary,
      quality: read.quality,
      fileName: file.name,
      fileHash: file.sha256,
      fileBytes: file.bytes,
      createdAt: new Date(),
    };
    await insertRecord(manager, facts, read.record, read.columns);
    return manager.findOneByOrFail(StoredRecord, { id });
  }
}
