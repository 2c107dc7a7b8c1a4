import type { MessagePort } from 'node:worker_threads';
import { type Reevaluation, type Result, reevaluateBank, type SiteThen } from '#libs/engine/index.js';
import { portWatch } from '#libs/jobs/pool/port-watch.js';
import { packAnswer, type WorkerAnswer } from '#libs/jobs/pool/worker-answer.js';
import { putInWords } from '#libs/present/put-in-words.js';
import { sinceSentences, tonightSentences } from '#libs/present/reevaluation-words.js';

/** A bank then and now, each with its record. */
export interface ReevaluationTask {
  before: SiteThen;
  after: SiteThen;
}

/** What changed, with the result as it is now. */
export interface ReevaluationValue {
  reevaluation: Reevaluation;
  /** what to do first, and since when, in words */
  tonight: string[];
  since: string[];
  /** the bank judged as it measures */
  result: Result;
}

/** Judges a bank again; runs in a worker thread. */
export function computeReevaluation({
  task,
  port,
}: {
  task: ReevaluationTask;
  port: MessagePort;
}): Promise<WorkerAnswer<ReevaluationValue>> {
  return packAnswer(async () => {
    const { reevaluation, after } = reevaluateBank(task.before, task.after, portWatch(port));
    return {
      reevaluation,
      tonight: tonightSentences(reevaluation),
      since: sinceSentences(reevaluation),
      result: putInWords(after.result),
    };
  });
}
