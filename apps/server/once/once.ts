import { createHash, randomUUID } from 'node:crypto';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { canonicalJson } from '#libs/contract/canonical-json.js';
import { InputProblem } from '#libs/engine/index.js';
import type { KeptAnswer } from '#libs/store/kept-answer.js';
import { type AnswerKey, claimAnswer, forgetAnswer, keepAnswer } from '#libs/store/kept-answers.js';
import type { Store } from '#libs/store/store.js';
import { knownActor } from '../people/actor.js';
import { RefusedRequest } from '../refused-request.js';

const KEPT_HEADERS = ['content-type', 'location', 'etag'];

/**
 * Does once what a client may have to ask for twice: a POST with an Idempotency-Key is answered with the first answer
 * when it comes again. What failed changed nothing, and its key is free again.
 */
export class Once {
  readonly #claimed = new WeakMap<FastifyRequest, AnswerKey>();

  constructor(private readonly store: Store) {}

  /**
   * Claims the key of a request whose body was read.
   * @param request which
   * @param content what tells its body from another
   * @returns the first answer where this request was answered before, null where it is to be done
   * @throws RefusedRequest or InputProblem where the key belongs to another request, or to one that is still being done
   */
  async begin(request: FastifyRequest, content: unknown): Promise<KeptAnswer | null> {
    const given = request.headers['idempotency-key'];
    const actor = knownActor(request);
    if (given === undefined || actor === undefined || request.method !== 'POST') return null;
    const key: AnswerKey = {
      organisationId: actor.organisationId,
      personId: actor.personId,
      key: readKey(String(given)),
    };
    const claim = randomUUID();
    const fingerprint = fingerprintOf(request, content);
    const standing = await this.store.write((manager) => claimAnswer(manager, key, { claim, fingerprint }, new Date()));
    if (standing.claim === claim) {
      this.#claimed.set(request, key);
      return null;
    }
    refuseOther(standing, fingerprint);
    return standing;
  }

  /**
   * Keeps the answer of a request that claimed a key, before it is sent.
   * @param payload as it is sent
   */
  async end(request: FastifyRequest, reply: FastifyReply, payload: unknown): Promise<void> {
    const key = this.#claimed.get(request);
    if (key === undefined) return;
    this.#claimed.delete(request);
    const { statusCode: status } = reply;
    if (status >= 300) return void (await this.store.write((manager) => forgetAnswer(manager, key)));
    const isSecret = String(reply.getHeader('cache-control') ?? '').includes('no-store');
    const body = isSecret || typeof payload !== 'string' ? null : payload;
    await this.store.write((manager) => keepAnswer(manager, key, { status, headers: headersOf(reply), body }));
  }
}

/** Puts status and headers of a kept answer on a reply, and says that it is one. */
export function replay(reply: FastifyReply, { status, headers }: KeptAnswer): FastifyReply {
  return reply
    .status(status ?? 200)
    .headers(headers ?? {})
    .header('idempotent-replayed', 'true');
}

/** The same where the route itself returns the body. */
export function replayed(reply: FastifyReply, answer: KeptAnswer): string {
  replay(reply, answer);
  return answer.body ?? '';
}

function readKey(given: string): string {
  if (/^[\x21-\x7e]{1,200}$/.test(given)) return given;
  throw new RefusedRequest(400, 'The request cannot be read', {
    code: 'usage',
    expected: 'an Idempotency-Key of 1 to 200 visible letters',
    found: JSON.stringify(given.slice(0, 60)),
  });
}

function fingerprintOf({ method, url }: FastifyRequest, content: unknown): string {
  const text = `${method} ${url}\n${content === undefined ? '' : canonicalJson(content)}`;
  return createHash('sha256').update(text).digest('hex');
}

function refuseOther({ fingerprint, status, body }: KeptAnswer, asked: string): void {
  if (fingerprint !== asked) {
    const expected = 'a key of its own for each request';
    const problem = { code: 'conflict', path: 'Idempotency-Key', expected, found: 'the key of another' } as const;
    throw new RefusedRequest(422, 'Used for something else', problem);
  }
  const found = status === null ? 'one that is being done, or was cut off: look whether it was' : 'one that was done';
  const expected = status === null ? 'a request that has ended' : 'a request whose answer may be shown again';
  if (status === null || body === null) throw new InputProblem([{ code: 'conflict', expected, found }]);
}

function headersOf(reply: FastifyReply): Record<string, string> {
  return Object.fromEntries(
    KEPT_HEADERS.flatMap((name) => {
      const value = reply.getHeader(name);
      return value === undefined ? [] : [[name, String(value)]];
    }),
  );
}
