import type { Problem } from '#libs/engine/index.js';
import type { DeskAnswered, DeskAsked } from './look.js';

/** The engine refused the inputs. */
export class InputRefused extends Error {
  override readonly name = 'InputRefused';

  constructor(readonly problems: readonly Problem[]) {
    super('the engine refused the inputs');
  }
}

type Waiting = { resolve: (answer: DeskAnswered) => void; reject: (error: Error) => void };
type Asked = DeskAsked extends infer One ? (One extends DeskAsked ? Omit<One, 'ticket'> : never) : never;

/** One worker with the engine in it. */
export class DeskLink {
  readonly #worker = new Worker(new URL('./desk-worker.ts', import.meta.url), { type: 'module' });
  readonly #waiting = new Map<number, Waiting>();
  #ticket = 0;

  constructor() {
    this.#worker.onmessage = ({ data }: MessageEvent<DeskAnswered>) => this.#settle(data);
    this.#worker.onerror = ({ message }) => {
      for (const { reject } of this.#waiting.values()) reject(new Error(message || 'the engine did not start'));
      this.#waiting.clear();
    };
  }

  /**
   * @returns the answer to a question
   * @throws InputRefused where the engine refuses the inputs, Error where it failed
   */
  ask<K extends keyof Answers>(asked: Asked, key: K): Promise<Answers[K]> {
    const ticket = ++this.#ticket;
    return new Promise((resolve, reject) => {
      this.#waiting.set(ticket, { resolve: (answer) => resolve((answer as unknown as Answers)[key]), reject });
      this.#worker.postMessage({ ...asked, ticket });
    });
  }

  close(): void {
    this.#worker.terminate();
  }

  #settle(answer: DeskAnswered): void {
    const waiting = this.#waiting.get(answer.ticket);
    this.#waiting.delete(answer.ticket);
    if (waiting === undefined) return;
    if ('problems' in answer) waiting.reject(new InputRefused(answer.problems));
    else if ('fault' in answer) waiting.reject(new Error(answer.fault));
    else waiting.resolve(answer);
  }
}

/** What each question is answered with. */
type AnswerOf<K extends string> = Extract<DeskAnswered, Record<K, unknown>>[K &
  keyof Extract<DeskAnswered, Record<K, unknown>>];
interface Answers {
  opened: AnswerOf<'opened'>;
  look: AnswerOf<'look'>;
  warm: AnswerOf<'warm'>;
  firm: AnswerOf<'firm'>;
  trace: AnswerOf<'trace'>;
}
