import { STATUS_CODES } from 'node:http';
import { type ArgumentsHost, Catch, type ExceptionFilter, HttpException } from '@nestjs/common';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { type ProblemJson, problemJson } from '#libs/contract/error-body.js';
import { InputProblem, type ProblemCode } from '#libs/engine/index.js';
import { StaleVersion } from '#libs/store/stale-version.js';
import { isForPage, refusedPage } from './home/refused-page.js';
import { QuestionWithOffer } from './records/question-with-offer.js';
import { RefusedRequest } from './refused-request.js';
import type { ServerLog } from './server-log.js';
import { tagOf } from './sites/version-tag.js';

/** Answers every error as application/problem+json, a page's with a page; a fault of ours is logged and not told. */
@Catch()
export class ProblemFilter implements ExceptionFilter {
  readonly #log: ServerLog;

  constructor(log: ServerLog) {
    this.#log = log;
  }

  catch(error: unknown, host: ArgumentsHost): void {
    const reply = host.switchToHttp().getResponse<FastifyReply>();
    const problem = describeError(error);
    if (problem.status >= 500) this.#log.fault(error);
    if (reply.sent || reply.raw.headersSent) return;
    if (problem.versions !== undefined) reply.header('etag', tagOf(problem.versions.current));
    reply.status(problem.status);
    if (isForPage(host.switchToHttp().getRequest<FastifyRequest>())) {
      reply.type('text/html; charset=utf-8').send(refusedPage(problem));
      return;
    }
    reply.type('application/problem+json').send(JSON.stringify(problem));
  }
}

/**
 * Any error as the body of an answer.
 * @param error what was thrown
 * @returns the members of application/problem+json
 */
export function describeError(error: unknown): ProblemJson {
  if (error instanceof StoredProblem) return error.problem;
  if (error instanceof RefusedRequest) return { ...problemJson(error), status: error.status, title: error.title };
  if (error instanceof QuestionWithOffer) return { ...problemJson(error), offered: error.offered };
  if (error instanceof StaleVersion) {
    return { ...problemJson(error), versions: { seen: error.seen, current: error.current } };
  }
  if (error instanceof InputProblem) return problemJson(error);
  const status = statusOf(error);
  if (status !== null && status < 500) return refusal(status, (error as Error).message);
  return { ...refusal(500, 'The server’s log has the details.'), title: 'A fault of the server', code: 'fault' };
}

/** A problem that was met by a job and stored with it, on its way to whoever waited for the job. */
export class StoredProblem extends Error {
  readonly problem: ProblemJson;

  constructor(problem: ProblemJson) {
    super(problem.detail);
    this.problem = problem;
  }
}

function statusOf(error: unknown): number | null {
  if (error instanceof HttpException) return error.getStatus();
  const status = error instanceof Error && 'statusCode' in error ? error.statusCode : null;
  return typeof status === 'number' && status >= 400 && status < 600 ? status : null;
}

const CODES: Record<number, ProblemCode> = { 404: 'not-found', 409: 'conflict', 412: 'stale', 413: 'too-large' };

function refusal(status: number, detail: string): ProblemJson {
  const code = CODES[status] ?? 'usage';
  return { type: 'about:blank', title: STATUS_CODES[status] ?? 'Refused', status, detail, code, problems: [] };
}
