import { createHash } from 'node:crypto';
import type { MeterMap } from '#libs/contract/meter-map.js';
import { Question, type QuestionAsked } from '#libs/contract/question.js';
import { recordBytes } from '#libs/contract/record-hash.js';
import { type LoadRecord, type RecordSummary, summarizeRecord } from '#libs/engine/index.js';
import { packAnswer, type WorkerAnswer } from '#libs/jobs/pool/worker-answer.js';
import { fileChunks } from '#libs/meter-files/file-chunks.js';
import type { MeterReading } from '#libs/meter-files/meter-format.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';
import { recordInWords } from '#libs/present/put-in-words.js';
import { type MonthColumn, packRecord } from '#libs/store/pack-record.js';

/** A meter file on disk and what is said about it. */
export interface ReadTask {
  path: string;
  sizeBytes: number;
  siteTimeZone: string;
  format?: string;
  timeZone?: string;
  map?: MeterMap;
}

/** What the file holds, ready to be stored; or what has to be asked first. */
export type ReadValue =
  | { questions: readonly QuestionAsked[] }
  | {
      record: LoadRecord;
      quality: MeterReading['quality'];
      summary: RecordSummary;
      hash: string;
      columns: MonthColumn[];
    };

/** Reads a meter file; runs in a worker thread. */
export function readFile({ task }: { task: ReadTask }): Promise<WorkerAnswer<ReadValue>> {
  return packAnswer(async () => {
    try {
      return await readTask(task);
    } catch (error) {
      // Its questions would not come through as part of a problem.
      if (error instanceof Question) return { questions: error.questions };
      throw error;
    }
  });
}

async function readTask({ path, ...options }: ReadTask): Promise<ReadValue> {
  const { record, quality } = await readMeterFile(fileChunks(path), options);
  const summary = recordInWords(summarizeRecord(record));
  return { record, quality, summary, hash: recordHash(record), columns: packRecord(record) };
}

/** SHA-256 of a record's bytes, 64 hexadecimal digits. */
export function recordHash(record: LoadRecord): string {
  const hash = createHash('sha256');
  for (const chunk of recordBytes(record)) hash.update(chunk);
  return hash.digest('hex');
}
