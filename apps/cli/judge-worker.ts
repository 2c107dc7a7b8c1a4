// The thread that plans and judges: the program's own stays free to say how far it is, and to hear an interruption.
import type { MessagePort } from 'node:worker_threads';
import { type PlanInputs, planContent } from '#libs/contract/plan-content.js';
import {
  assessEstimate,
  type BankTonight,
  type EstimateOutcome,
  type EstimateResult,
  firmOutcome,
  installedTonight,
  isEstimate,
  type LoadRecord,
  type Outcome,
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
import { putEstimateInWords, putInWords } from '#libs/present/put-in-words.js';
import { type SiteRow, siteRow } from '#libs/present/sites-table.js';
import { estimateReport, resultReport } from '#libs/present/terminal-report.js';
import { withTonight } from '#libs/present/tonight-words.js';
import { frozenInputs, textHash } from './frozen-inputs.js';
import type { PaperSheet } from './paper-sheet.js';

/** A site to plan or judge. */
export interface JudgeTask {
  kind: Outcome['kind'];
  site: Site;
  /** null where the site's own estimate stands in for it */
  record: LoadRecord | null;
  zone: ZoneTable;
  /** null where no proposal is wanted */
  sheet: PaperSheet | null;
  /** the answer in full is sent back, to be written out in other forms */
  wantsOutcome: boolean;
}

/** An answer in words, with what prints it. */
export interface Judged {
  result: Result | EstimateResult;
  report: string;
  row: SiteRow;
  proposal: Uint8Array | null;
  outcome: Outcome | EstimateOutcome | null;
  /** what the answer depends on, where the outcome is sent back */
  inputs: PlanInputs | null;
}

/** Share of the whole at which planning, and weighing with the inputs moved, are done. */
const FIRM = 0.95;

/** Plans or judges a site, puts the answer in words and draws its proposal where one is wanted. */
export function judgeTask({ task, port }: { task: JudgeTask; port: MessagePort }): Promise<WorkerAnswer<Judged>> {
  return packAnswer(async () => {
    const watch = portWatch(port);
    const outcome = task.record === null ? byEstimate(task, watch) : byRecord(task, task.record, watch);
    // A bank that stands there and is over a limit comes with what to do at once.
    const tonight = installedTonight(outcome, task.site);
    return {
      result: task.kind === 'plan' ? outcome.result : withTonight(outcome.result, tonight),
      report: isEstimate(outcome) ? estimateReport(outcome, tonight) : resultReport(outcome, tonight),
      row: siteRow(outcome),
      proposal: task.sheet === null ? null : await proposalOf(outcome, task, { ...task.sheet, tonight }),
      outcome: task.wantsOutcome ? outcome : null,
      inputs: task.wantsOutcome ? frozenInputs(task) : null,
    };
  });
}

function byRecord({ kind, site, zone }: JudgeTask, record: LoadRecord, watch: Watch): Outcome {
  const computed = firmOutcome(kind, { site, record, zone }, partOfWatch(watch, 0, FIRM));
  return { ...computed, result: putInWords(computed.result) };
}

function byEstimate({ kind, site, zone }: JudgeTask, watch: Watch): EstimateOutcome {
  const judge = kind === 'plan' ? planEstimate : assessEstimate;
  const computed = withRobustness(judge(site, zone), partOfWatch(watch, 0, FIRM));
  return { ...computed, result: putEstimateInWords(computed.result) };
}

/** The drawing of papers is loaded only where one is wanted. */
async function proposalOf(
  outcome: Outcome | EstimateOutcome,
  task: JudgeTask,
  more: PaperSheet & { tonight: BankTonight | null },
): Promise<Uint8Array> {
  const { renderProposal } = await import('#libs/proposal/render-proposal.js');
  const inputs = frozenInputs(task);
  const contentHash = textHash(planContent(inputs));
  return renderProposal(outcome, {
    number: contentHash.slice(0, 8),
    revision: 0,
    state: 'draft, not reviewed',
    preparedBy: null,
    contentHash,
    recordHash: inputs.recordHash,
    engineVersion: inputs.engineVersion,
    date: outcome.site.asOf,
    ...more,
  });
}
