import { availableParallelism } from 'node:os';
import { fileURLToPath } from 'node:url';
import { MessageChannel, receiveMessageOnPort } from 'node:worker_threads';
import { Piscina } from 'piscina';
import { unpackAnswer, type WorkerAnswer } from './worker-answer.js';

/** How one task is run. */
export interface TaskOptions {
  /** ends the task, and with it the thread it runs in */
  signal?: AbortSignal;
  /** @param fraction share of the task that is done, 0 … 1 */
  report?: (fraction: number) => void;
  /** columns of the task that are handed over and not copied: whoever asked has them no more */
  handedOver?: readonly (ArrayBufferView | null)[];
}

/**
 * Threads that run the functions a worker file exports. Each function takes `{ task, port }` and gives a `WorkerAnswer`.
 */
export class WorkerPool {
  readonly #pool: Piscina;

  /**
   * @param workerFile compiled module
   * @param onFault told when a thread dies while it has no task
   * @param threads most threads at a time; absent, one a core but one, two at least
   */
  constructor(
    workerFile: URL,
    onFault: (error: unknown) => void,
    threads: number = Math.max(2, availableParallelism() - 1),
  ) {
    this.#pool = new Piscina({
      filename: fileURLToPath(workerFile),
      minThreads: 1,
      maxThreads: threads,
      idleTimeout: 30_000,
      // A worker is compiled code: it must not take over conditions its parent resolves sources with. And it is
      // imported, not required: a thread ended while it requires a module takes the whole process down (Node 20).
      execArgv: ['--no-experimental-require-module'],
    });
    // Without a listener the event would end the process.
    this.#pool.on('error', onFault);
  }

  /**
   * Runs an exported function in a thread.
   * @param name of the export
   * @param task what it is given, copied but for what is handed over
   * @returns what it returns, copied
   * @throws InputProblem where it throws one, an AbortError where it was ended, else the fault
   */
  async run<T>(name: string, task: unknown, { signal, report, handedOver = [] }: TaskOptions = {}): Promise<T> {
    const { port1, port2 } = new MessageChannel();
    port1.on('message', (fraction: number) => report?.(fraction));
    try {
      const buffers = new Set(handedOver.flatMap((column) => (column === null ? [] : [column.buffer as ArrayBuffer])));
      const options = { name, transferList: [port2, ...buffers], ...(signal === undefined ? {} : { signal }) };
      const answer = (await this.#pool.run({ task, port: port2 }, options)) as WorkerAnswer<T>;
      // The answer comes by another way and may have overtaken the last reports.
      for (let late = receiveMessageOnPort(port1); late !== undefined; late = receiveMessageOnPort(port1)) {
        report?.(late.message as number);
      }
      return unpackAnswer(answer);
    } finally {
      port1.close();
    }
  }

  /** Ends the threads, whatever they do. */
  async close(): Promise<void> {
    await this.#pool.destroy();
  }
}
