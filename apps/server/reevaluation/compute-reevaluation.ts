import { createHash } from 'node:crypto';
import type { MessagePort } from 'node:worker_threads';
import { planContent } from '#libs/contract/plan-content.js';
import {
  ENGINE_VERSION,
  type Reevaluated,
  type Reevaluation,
  type Result,
  reevaluateBank,
  type SiteThen,
  withRobustness,
} from '#libs/engine/index.js';
import { partOfWatch } from '#libs/jobs/pool/part-of-watch.js';
import { portWatch } from '#libs/jobs/pool/port-watch.js';
import { packAnswer, type WorkerAnswer } from '#libs/jobs/pool/worker-answer.js';
import type { Language } from '#libs/present/languages.js';
import { putInWords } from '#libs/present/put-in-words.js';
import { sinceSentences } from '#libs/present/reevaluation-words.js';
import { tonightSentences, withTonight } from '#libs/present/tonight-words.js';
import { renderProposal } from '#libs/proposal/render-proposal.js';
import { recordHash } from '../planning/read-file.js';

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
      result: withTonight(putInWords(after.result), reevaluation),
    };
  });
}

/** A bank then and now, and why it is looked at, for a paper. */
export interface ReevaluationPaperTask extends ReevaluationTask {
  reason: string;
  language: Language;
}

/** Share of the whole at which the bank is judged; ranges are sought in the rest. */
const JUDGED = 0.6;

/** Judges a bank again and draws it as a paper; runs in a worker thread. */
export function computeReevaluationPaper({
  task,
  port,
}: {
  task: ReevaluationPaperTask;
  port: MessagePort;
}): Promise<WorkerAnswer<Uint8Array>> {
  return packAnswer(async () => {
    const watch = portWatch(port);
    const judged = reevaluateBank(task.before, task.after, partOfWatch(watch, 0, JUDGED));
    return paperOf(judged, task, withRobustness(judged.after, partOfWatch(watch, JUDGED, 1)));
  });
}

function paperOf(
  { reevaluation }: Reevaluated,
  { before, after, reason, language }: ReevaluationPaperTask,
  firm: Reevaluated['after'],
): Promise<Uint8Array> {
  const contentHash = hashOf([after, before]);
  return renderProposal(
    { ...firm, result: putInWords(firm.result) },
    {
      ...{ number: contentHash.slice(0, 8), revision: 0, state: 'draft, not reviewed', preparedBy: null },
      ...{ contentHash, engineVersion: ENGINE_VERSION, date: firm.site.asOf, reason, reevaluation, language },
    },
  );
}

/** Hash of both sites with their records: the same inputs give the same paper. */
function hashOf(inputs: readonly SiteThen[]): string {
  const hash = createHash('sha256');
  for (const { site, record, zone } of inputs) {
    const content = { site, zone, recordHash: recordHash(record), engineVersion: ENGINE_VERSION };
    hash.update(planContent({ kind: 'assess', ...content }));
  }
  return hash.digest('hex');
}
