import type { MessagePort } from 'node:worker_threads';
import {
  assessBank,
  type LoadRecord,
  type Outcome,
  planBank,
  type Result,
  type Site,
  withRobustness,
  type ZoneTable,
} from '#libs/engine/index.js';
import { portWatch } from '#libs/jobs/pool/port-watch.js';
import { packAnswer, type WorkerAnswer } from '#libs/jobs/pool/worker-answer.js';
import { bankName, proposedWords } from '#libs/present/proposed-words.js';
import { putInWords } from '#libs/present/put-in-words.js';
import type { ProposalFrame } from '#libs/proposal/proposal-frame.js';
import { renderProposal } from '#libs/proposal/render-proposal.js';
import type { RivalSummary } from '#libs/store/revision.js';
import { recordHash } from './read-file.js';

/** Frozen inputs of a plan or an assessment, and what its proposal says of itself. */
export interface PlanTask {
  kind: 'plan' | 'assess';
  site: Site;
  record: LoadRecord;
  recordHash: string;
  zone: ZoneTable;
  frame: ProposalFrame;
}

export interface PlanValue {
  result: Result;
  /** what is proposed or judged, in one sentence */
  proposed: string;
  rival: RivalSummary | null;
  proposal: Uint8Array;
}

/** Plans or judges a bank and renders the proposal; runs in a worker thread. */
export function computePlan({ task, port }: { task: PlanTask; port: MessagePort }): Promise<WorkerAnswer<PlanValue>> {
  return packAnswer(async () => {
    const { site, record, zone } = task;
    if (recordHash(record) !== task.recordHash) throw new Error('the stored record is not the one that was hashed');
    const watch = portWatch(port);
    const judged = task.kind === 'plan' ? planBank(site, record, zone, watch) : assessBank(site, record, zone, watch);
    const computed = withRobustness(judged);
    const outcome = { ...computed, result: putInWords(computed.result) };
    return {
      result: outcome.result,
      proposed: proposedWords(outcome),
      rival: rivalSummary(outcome),
      proposal: await renderProposal(outcome, task.frame),
    };
  });
}

function rivalSummary({ rival }: Outcome): RivalSummary | null {
  if (rival === null) return null;
  const { bank, verdict, levelsOver, levelsAll } = rival;
  return { name: bankName(bank.groups), verdict, levelsOver, levelsAll };
}
