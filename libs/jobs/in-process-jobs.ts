import { setTimeout as sleep } from 'node:timers/promises';
import { InputProblem } from '#libs/engine/index.js';
import { Job } from '#libs/store/job.js';
import {
  beat,
  cancelJob,
  claimJob,
  finishJob,
  insertJob,
  type JobRequest,
  releaseJob,
  UNFINISHED,
} from '#libs/store/jobs.js';
import type { Store } from '#libs/store/store.js';
import type { Jobs } from './jobs.js';

/** What a runner is given beside the job. */
export interface Hands {
  /** aborted when the work is not wanted any more */
  signal: AbortSignal;
  /** @param fraction share done, 0 … 1 */
  report(fraction: number): void;
}

/** Does a job's work, and ends it with `finishJob` in the same write as its results. */
export type Runner = (job: Job, hands: Hands) => Promise<void>;

/** What in-process jobs need to know. */
export interface InProcessOptions {
  store: Store;
  /** by kind of job */
  runners: Record<string, Runner>;
  /** @returns the error as it is stored with the job and shown to whoever asked */
  describe: (error: unknown) => object;
  /** told of faults, which nobody waits for */
  onFault: (error: unknown) => void;
  /** jobs at a time */
  atOnce?: number;
  /** silence after which a worker counts as gone [s] */
  leaseS?: number;
}

const MOST_ATTEMPTS = 3;
const LOOK_MS = 100;
const IDLE_MS = 1000;

/** Jobs done by this process, which takes one after the other from the table; the work itself is left to the runners. */
export class InProcessJobs implements Jobs {
  readonly #options: Required<InProcessOptions>;
  readonly #working = new Map<number, { stop: AbortController; ended: Promise<void> }>();
  #open = true;
  #wake = new AbortController();
  readonly #loop: Promise<void>;

  constructor(options: InProcessOptions) {
    this.#options = { atOnce: 1, leaseS: 10, ...options };
    this.#loop = this.#takeTurns();
  }

  async submit(request: JobRequest): Promise<Job> {
    const job = await this.#options.store.write((manager) => insertJob(manager, request, new Date()));
    this.#wake.abort();
    return job;
  }

  async *progress(id: number, { afterStep = 0, signal }: { afterStep?: number; signal?: AbortSignal } = {}) {
    let seen = afterStep;
    while (!signal?.aborted) {
      const job = await this.#find(id);
      const isOver = !UNFINISHED.includes(job.state);
      if (job.step > seen || isOver) {
        seen = job.step;
        yield job;
      }
      if (isOver) return;
      await quietSleep(LOOK_MS, signal);
    }
  }

  async cancel(id: number): Promise<Job> {
    const cancelled = await this.#options.store.write((manager) => cancelJob(manager, id, new Date()));
    this.#working.get(id)?.stop.abort();
    const job = await this.#find(id);
    if (cancelled || job.state === 'cancelled') return job;
    throw new InputProblem([{ code: 'conflict', expected: 'a job that is not finished', found: job.state }]);
  }

  async result(id: number, waitS: number): Promise<Job> {
    for await (const job of this.progress(id, { signal: AbortSignal.timeout(waitS * 1000) })) {
      if (!UNFINISHED.includes(job.state)) return job;
    }
    return this.#find(id);
  }

  /** Stops taking jobs, ends those that run and puts them back in the queue. */
  async close(): Promise<void> {
    this.#open = false;
    this.#wake.abort();
    // a claim on its way first: it would take again what is put back here, and give it back as one attempt more
    await this.#loop;
    for (const { stop } of this.#working.values()) stop.abort();
    await Promise.all([...this.#working.values()].map(({ ended }) => ended));
  }

  async #find(id: number): Promise<Job> {
    const job = await this.#options.store.read((manager) => manager.findOneBy(Job, { id }));
    if (job === null) throw new InputProblem([{ code: 'not-found', expected: 'a job that exists', found: `${id}` }]);
    return job;
  }

  async #takeTurns(): Promise<void> {
    while (this.#open) {
      const job = this.#working.size < this.#options.atOnce ? await this.#claim() : null;
      if (job !== null) this.#start(job);
      else await this.#rest();
    }
  }

  async #claim(): Promise<Job | null> {
    try {
      return await claimJob(this.#options.store, Date.now() / 1000, this.#options.leaseS);
    } catch (error) {
      this.#options.onFault(error);
      return null;
    }
  }

  async #rest(): Promise<void> {
    await quietSleep(IDLE_MS, this.#wake.signal);
    if (this.#wake.signal.aborted) this.#wake = new AbortController();
  }

  #start(job: Job): void {
    const stop = new AbortController();
    const ended = this.#work(job, stop)
      .catch(this.#options.onFault)
      .finally(() => {
        this.#working.delete(job.id);
        this.#wake.abort();
      });
    this.#working.set(job.id, { stop, ended });
    if (!this.#open) stop.abort();
  }

  async #work(job: Job, stop: AbortController): Promise<void> {
    const { runners } = this.#options;
    const pulse = this.#pulse(job, stop);
    try {
      const runner = runners[job.kind];
      if (runner === undefined) throw new Error(`nothing runs a job of kind ${job.kind}`);
      if (job.attempt > MOST_ATTEMPTS) throw new Error(`given up after ${MOST_ATTEMPTS} attempts that were cut off`);
      await runner(job, { signal: stop.signal, report: pulse.report });
    } catch (error) {
      // Cancelled, or taken over by another worker: the row is not ours any more. Or we are closing.
      if (stop.signal.aborted) await this.#giveBack(job);
      else await this.#fail(job, error);
    } finally {
      await pulse.end();
    }
  }

  async #giveBack(job: Job): Promise<void> {
    if (!this.#open) await this.#options.store.write((manager) => releaseJob(manager, job));
  }

  async #fail(job: Job, error: unknown): Promise<void> {
    const { store, describe, onFault } = this.#options;
    if (!(error instanceof InputProblem)) onFault(error);
    const end = { state: 'failed', error: describe(error), revision: null, finishedAt: new Date() } as const;
    await store.write((manager) => finishJob(manager, job, end));
  }

  /** Says regularly that the worker lives and how far it is; stops it once the claim is lost. */
  #pulse(job: Job, stop: AbortController): { report: (fraction: number) => void; end: () => Promise<void> } {
    const { store, leaseS, onFault } = this.#options;
    let progress = 0;
    let beating: Promise<void> | null = null;
    const say = async () => {
      try {
        const now = { nowS: Date.now() / 1000, progress };
        if (!(await store.write((manager) => beat(manager, job, now)))) stop.abort();
      } catch (error) {
        onFault(error);
      }
      beating = null;
    };
    const pulse = () => {
      if (!stop.signal.aborted) beating ??= say();
    };
    const timer = setInterval(pulse, (leaseS * 1000) / 4);
    return {
      report: (fraction) => {
        progress = Math.min(1, Math.max(progress, fraction));
        pulse();
      },
      end: async () => {
        clearInterval(timer);
        await beating;
      },
    };
  }
}

async function quietSleep(ms: number, signal?: AbortSignal): Promise<void> {
  try {
    await sleep(ms, undefined, signal === undefined ? {} : { signal });
  } catch {
    // Woken early.
  }
}
