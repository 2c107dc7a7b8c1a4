import { randomUUID } from 'node:crypto';
import { Injectable } from '@nestjs/common';
import { mergedMap } from '#libs/contract/merged-map.js';
import type { MeterMap } from '#libs/contract/meter-map.js';
import { Question } from '#libs/contract/question.js';
import type { TaskOptions, WorkerPool } from '#libs/jobs/pool/worker-pool.js';
import type { MeterReading } from '#libs/meter-files/meter-format.js';
import { KeptMap } from '#libs/store/kept-map.js';
import { noKeptMap } from '#libs/store/kept-maps.js';
import { holdLatest, insertRecord, readRecord } from '#libs/store/records.js';
import { noSite } from '#libs/store/sites.js';
import type { Store } from '#libs/store/store.js';
import { StoredRecord } from '#libs/store/stored-record.js';
import { StoredSite } from '#libs/store/stored-site.js';
import type { ReadTask, ReadValue } from '../planning/read-file.js';
import { QuestionWithOffer } from './question-with-offer.js';
import type { SpooledFile } from './spool.js';
import type { UploadOptions } from './upload-options.js';

/** What is to be made of a meter file. */
export interface ImportOrder {
  siteId: string;
  siteTimeZone: string;
  file: SpooledFile;
  format?: string;
  timeZone?: string;
  map?: MeterMap;
  /** the kept answers that stand in the map */
  kept?: { name: string; version: number };
  /** the record it extends, null where it makes one of its own */
  previousId: string | null;
}

/** A meter file that was read, on its way into the database. */
export interface ReadRecord {
  order: ImportOrder;
  previous: StoredRecord | null;
  read: Exclude<ReadValue, { questions: unknown }>;
}

type Manager = Parameters<Parameters<Store['write']>[0]>[0];

/** Reads meter files in a worker thread and stores what they hold, whole or not at all. */
@Injectable()
export class RecordImport {
  constructor(
    private readonly store: Store,
    private readonly pool: WorkerPool,
  ) {}

  /**
   * An order with the kept answers it names put in; what the sender answers wins.
   * @throws InputProblem `not-found` where there are none of that name
   */
  async order(
    site: Pick<StoredSite, 'id' | 'organisationId' | 'document'>,
    file: SpooledFile,
    options: UploadOptions,
    previousId: string | null = null,
  ): Promise<ImportOrder> {
    const { format, timeZone, map, keptMap } = options;
    const order: ImportOrder = {
      siteId: site.id,
      siteTimeZone: (site.document as { timeZone: string }).timeZone,
      file,
      previousId,
      ...(format === undefined ? {} : { format }),
      ...(timeZone === undefined ? {} : { timeZone }),
      ...(map === undefined ? {} : { map }),
    };
    if (keptMap === undefined) return order;
    const named = { organisationId: site.organisationId, name: keptMap };
    const kept = await this.store.read((manager) => manager.findOneBy(KeptMap, named));
    if (kept === null) throw noKeptMap(JSON.stringify(keptMap.slice(0, 80)));
    const { name, version } = kept;
    return { ...order, map: mergedMap(kept.map, map ?? {}), kept: { name, version } };
  }

  /**
   * @param order the file and what is said about it
   * @param hands hear of the progress, and may end the reading
   * @returns what it holds
   * @throws InputProblem where the file cannot be read, Question where it can be read in several ways
   */
  async read(order: ImportOrder, hands: TaskOptions = {}): Promise<ReadRecord> {
    const { file, siteId, previousId, ...said } = order;
    const previous = previousId === null ? null : await this.#previous(previousId);
    const task: ReadTask = { ...said, path: file.path, sizeBytes: file.bytes };
    if (previous !== null) task.earlier = previous.reading;
    const read = await this.pool.run<ReadValue>('readFile', task, hands);
    if (!('questions' in read)) return { order, previous: previous?.stored ?? null, read };
    const offered = order.kept === undefined ? await this.offeredFor(siteId, read.header) : [];
    throw offered.length === 0 ? new Question(read.questions) : new QuestionWithOffer(read.questions, offered);
  }

  /**
   * Stores what was read; call it inside a write.
   * @returns the stored record; the one that was to be extended where the file adds nothing to it
   * @throws InputProblem where site or record are gone, or somebody else has extended the record meanwhile
   */
  async insert(manager: Manager, { order, previous, read }: ReadRecord): Promise<StoredRecord> {
    const { siteId, file } = order;
    if (!(await manager.existsBy(StoredSite, { id: siteId }))) throw noSite(siteId);
    if (previous !== null) await holdLatest(this.store, manager, previous);
    if ('unchanged' in read) return previous!;
    const id = randomUUID();
    const facts = {
      id,
      siteId,
      revision: (previous?.revision ?? 0) + 1,
      previousId: previous?.id ?? null,
      hash: read.hash,
      summary: read.summary,
      quality: read.quality,
      fileName: file.name,
      fileHash: file.sha256,
      fileBytes: file.bytes,
      fileHeader: read.header,
      createdAt: new Date(),
    };
    await insertRecord(manager, facts, read.record, read.columns);
    return manager.findOneByOrFail(StoredRecord, { id });
  }

  /** Stores what was read, in a write of its own. */
  keep(read: ReadRecord): Promise<StoredRecord> {
    return this.store.write((manager) => this.insert(manager, read));
  }

  /** A record that was stored. */
  stored(id: string): Promise<StoredRecord> {
    return this.store.read((manager) => manager.findOneByOrFail(StoredRecord, { id }));
  }

  /** Kept answers of the site’s organisation that were made for a file with the same header; never taken unasked. */
  async offeredFor(siteId: string, header: string | null): Promise<Pick<KeptMap, 'id' | 'name'>[]> {
    if (header === null) return [];
    const site = await this.store.read((manager) => manager.findOneBy(StoredSite, { id: siteId }));
    if (site === null) return [];
    const { organisationId } = site;
    const kept = await this.store.read((manager) =>
      manager.find(KeptMap, { where: { organisationId, header }, order: { name: 'ASC' } }),
    );
    return kept.map(({ id, name }) => ({ id, name }));
  }

  async #previous(id: string): Promise<{ stored: StoredRecord; reading: MeterReading }> {
    const stored = await this.store.read((manager) => manager.findOneByOrFail(StoredRecord, { id }));
    await this.store.read((manager) => holdLatest({ skipsLocked: false }, manager, stored));
    const record = await this.store.read((manager) => readRecord(manager, id));
    if (record === null) throw new Error(`record ${id} vanished`);
    return { stored, reading: { record, quality: stored.quality as MeterReading['quality'] } };
  }
}
