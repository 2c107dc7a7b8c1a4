import { createHash } from 'node:crypto';
import { createReadStream } from 'node:fs';
import type { MessagePort } from 'node:worker_threads';
import type { MeterMap } from '#libs/contract/meter-map.js';
import { Question, type QuestionAsked } from '#libs/contract/question.js';
import { recordBytes } from '#libs/contract/record-hash.js';
import { type LoadRecord, type RecordSummary, summarizeRecord } from '#libs/engine/index.js';
import { portWatch } from '#libs/jobs/pool/port-watch.js';
import { packAnswer, type WorkerAnswer } from '#libs/jobs/pool/worker-answer.js';
import { fileChunks } from '#libs/meter-files/file-chunks.js';
import { headerText } from '#libs/meter-files/header-text.js';
import type { MeterReading } from '#libs/meter-files/meter-format.js';
import { note } from '#libs/meter-files/note.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';
import { extendRecord } from '#libs/meter-files/record/extend-record.js';
import { qualityInWords, recordInWords } from '#libs/present/put-in-words.js';
import { type MonthColumn, packRecord } from '#libs/store/pack-record.js';

/** A meter file on disk and what is said about it. */
export interface ReadTask {
  path: string;
  sizeBytes: number;
  siteTimeZone: string;
  format?: string;
  timeZone?: string;
  map?: MeterMap;
  /** the kept answers that stand in the map */
  kept?: { name: string; version: number };
  /** the record that the file extends */
  earlier?: MeterReading;
}

/** What the file holds, ready to be stored; or what has to be asked first. */
export type ReadValue = { header: string | null } & (
  | { questions: readonly QuestionAsked[] }
  /** the file adds nothing to the record it was to extend */
  | { unchanged: true }
  | {
      record: LoadRecord;
      quality: MeterReading['quality'];
      summary: RecordSummary;
      hash: string;
      columns: MonthColumn[];
    }
);

/** Reads a meter file; runs in a worker thread. */
export function readFile({ task, port }: { task: ReadTask; port: MessagePort }): Promise<WorkerAnswer<ReadValue>> {
  return packAnswer(async () => {
    const header = await headerHash(task.path);
    try {
      return { header, ...(await readTask(task, port)) };
    } catch (error) {
      // Its questions would not come through as part of a problem.
      if (error instanceof Question) return { header, questions: error.questions };
      throw error;
    }
  });
}

async function readTask({ path, kept, earlier, ...options }: ReadTask, port: MessagePort) {
  const read = await readMeterFile(fileChunks(path), { ...options, watch: portWatch(port) });
  const own = kept === undefined ? read : { ...read, record: noted(read.record, kept) };
  const { map = {}, siteTimeZone: timeZone } = options;
  const reading = earlier === undefined ? own : extendRecord(earlier, own, { map, timeZone });
  if (reading === earlier) return { unchanged: true as const };
  const { record, quality } = reading;
  const summary = recordInWords(summarizeRecord(record));
  return { record, quality: qualityInWords(quality), summary, hash: recordHash(record), columns: packRecord(record) };
}

function noted(record: LoadRecord, kept: { name: string; version: number }): LoadRecord {
  return { ...record, notes: [...record.notes, note('kept-answers-used', kept)] };
}

/** SHA-256 of a file's header row, null where it has none that shows. */
async function headerHash(path: string): Promise<string | null> {
  const text = await headerText(createReadStream(path, { end: 65_535 })).catch(() => null);
  return text === null ? null : createHash('sha256').update(text).digest('hex');
}

/** SHA-256 of a record's bytes, 64 hexadecimal digits. */
export function recordHash(record: LoadRecord): string {
  const hash = createHash('sha256');
  for (const chunk of recordBytes(record)) hash.update(chunk);
  return hash.digest('hex');
}
