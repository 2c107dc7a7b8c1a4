import type { MessagePort } from 'node:worker_threads';
import type { EstimateResult, Result } from '#libs/engine/index.js';
import { portWatch } from '#libs/jobs/pool/port-watch.js';
import { packAnswer, type WorkerAnswer } from '#libs/jobs/pool/worker-answer.js';
import { type FigureFile, renderFigures } from '#libs/proposal/render-figures.js';
import { judged, type PlanTask } from './compute-plan.js';

/** Frozen inputs of a plan, and the result that is kept of them. */
export interface FiguresTask extends Omit<PlanTask, 'frame'> {
  kept: Result | EstimateResult;
}

/** Parts of a result that its figures are drawn from and its ranges leave alone. */
const DRAWN = ['requirement', 'bank', 'control', 'operation', 'network', 'duties'] as const;

/**
 * Draws the figures of a plan; runs in a worker thread.
 * @returns null where the engine as it is gives another result than the one that is kept
 */
export function computeFigures({
  task,
  port,
}: {
  task: FiguresTask;
  port: MessagePort;
}): Promise<WorkerAnswer<FigureFile[] | null>> {
  return packAnswer(async () => {
    const outcome = judged(task, portWatch(port));
    const isKept = DRAWN.every((part) => JSON.stringify(outcome.result[part]) === JSON.stringify(task.kept[part]));
    return isKept ? renderFigures(outcome) : null;
  });
}
