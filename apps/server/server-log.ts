import type { LoggerService } from '@nestjs/common';
import { destination, type Logger, pino } from 'pino';

/** The server's log: one JSON object a line, on stderr. */
export class ServerLog implements LoggerService {
  readonly #pino: Logger;

  constructor(level: string) {
    this.#pino = pino({ level, base: null }, destination(2));
  }

  /** Something of ours went wrong. */
  fault(error: unknown): void {
    this.#pino.error({ err: error }, 'fault');
  }

  /** A request was answered. */
  answered(line: { method: string; route: string; status: number; ms: number }): void {
    this.#pino.info(line, 'answered');
  }

  /** Something happened that an operator may want to know. */
  tell(message: string, values: object = {}): void {
    this.#pino.info(values, message);
  }

  log(message: unknown): void {
    this.#pino.debug(String(message));
  }

  error(message: unknown, ...rest: unknown[]): void {
    this.#pino.error({ rest }, String(message));
  }

  warn(message: unknown): void {
    this.#pino.warn(String(message));
  }
}
