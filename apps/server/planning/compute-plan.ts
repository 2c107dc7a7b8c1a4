import type { MessagePort } from 'node:worker_threads';
import {
  assessBank,
  assessEstimate,
  type BankOutcome,
  type EstimateOutcome,
  type EstimateResult,
  firmOutcome,
  installedTonight,
  isEstimate,
  type LoadRecord,
  type Outcome,
  planBank,
  planEstimate,
  type Result,
  type Site,
  type Watch,
  withRobustness,
  type ZoneTable,
} from '#libs/engine/index.js';
import { partOfWatch } from '#libs/jobs/pool/part-of-watch.js';
import { portWatch } from '#libs/jobs/pool/port-watch.js';
import { packAnswer, type WorkerAnswer } from '#libs/jobs/pool/worker-answer.js';
import { bankName, estimateWords, proposedWords } from '#libs/present/proposed-words.js';
import { putEstimateInWords, putInWords } from '#libs/present/put-in-words.js';
import { withTonight } from '#libs/present/tonight-words.js';
import type { ProposalFrame } from '#libs/proposal/proposal-frame.js';
import { renderProposal } from '#libs/proposal/render-proposal.js';
import type { RivalSummary } from '#libs/store/revision.js';
import { recordHash } from './read-file.js';

/** Frozen inputs of a plan or an assessment, and what its proposal says of itself. */
export interface PlanTask {
  kind: 'plan' | 'assess';
  site: Site;
  /** null, as is its hash, where the site's own estimate stands in for it */
  record: LoadRecord | null;
  recordHash: string | null;
  zone: ZoneTable;
  frame: ProposalFrame;
}

/** Share of the whole at which planning, and weighing with the inputs moved, are done; the paper is drawn in the rest. */
const FIRM = 0.95;

export interface PlanValue {
  result: Result | EstimateResult;
  /** what is proposed or judged, in one sentence */
  proposed: string;
  rival: RivalSummary | null;
  proposal: Uint8Array;
}

/** Plans or judges a bank and renders the proposal; runs in a worker thread. */
export function computePlan({ task, port }: { task: PlanTask; port: MessagePort }): Promise<WorkerAnswer<PlanValue>> {
  return packAnswer(async () => {
    const { record } = task;
    const outcome = record === null ? byEstimate(task) : byRecord(task, record, portWatch(port));
    // A bank that stands there and is over a limit comes with what to do at once; such a paper stays a draft.
    const tonight = installedTonight(outcome, task.site);
    return {
      result: task.kind === 'plan' ? outcome.result : withTonight(outcome.result, tonight),
      proposed: isEstimate(outcome) ? estimateWords(outcome) : proposedWords(outcome),
      rival: rivalSummary(outcome),
      proposal: await renderProposal(outcome, { ...task.frame, tonight }),
    };
  });
}

function byRecord(task: PlanTask, record: LoadRecord, watch: Watch): Outcome {
  requireHashed(task, record);
  const { kind, site, zone } = task;
  const computed = firmOutcome(kind, { site, record, zone }, partOfWatch(watch, 0, FIRM));
  return { ...computed, result: putInWords(computed.result) };
}

function requireHashed(task: Omit<PlanTask, 'frame'>, record: LoadRecord): void {
  if (recordHash(record) !== task.recordHash) throw new Error('the stored record is not the one that was hashed');
}

/**
 * The outcome of frozen inputs without its ranges, in words.
 * @param task frozen inputs
 * @param watch hears of progress
 */
export function judged(task: Omit<PlanTask, 'frame'>, watch: Watch): Outcome | EstimateOutcome {
  const { record, kind, site, zone } = task;
  if (record !== null) {
    requireHashed(task, record);
    const outcome = (kind === 'plan' ? planBank : assessBank)(site, record, zone, watch);
    return { ...outcome, result: putInWords(outcome.result) };
  }
  const outcome = (kind === 'plan' ? planEstimate : assessEstimate)(site, zone);
  return { ...outcome, result: putEstimateInWords(outcome.result) };
}

function byEstimate({ kind, site, zone }: PlanTask): EstimateOutcome {
  const computed = withRobustness((kind === 'plan' ? planEstimate : assessEstimate)(site, zone));
  return { ...computed, result: putEstimateInWords(computed.result) };
}

function rivalSummary({ rival }: BankOutcome): RivalSummary | null {
  if (rival === null) return null;
  const { bank, verdict, levelsOver, levelsAll } = rival;
  return { name: bankName(bank.groups), verdict, levelsOver, levelsAll };
}
