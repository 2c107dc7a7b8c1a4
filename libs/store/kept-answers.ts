import { type EntityManager, LessThan } from 'typeorm';
import { KeptAnswer } from './kept-answer.js';

/** Whose key it is: a key of one person says nothing about another's. */
export type AnswerKey = Pick<KeptAnswer, 'organisationId' | 'personId' | 'key'>;

/** So long an answer is kept [ms]. */
const KEEP_MS = 24 * 3600 * 1000;

/**
 * Claims a key for a request, if nobody did; call it inside a write.
 * @param manager the write's manager
 * @param key whose key
 * @param claimed what the request is known by, and a mark of its own
 * @param now moment of the request
 * @returns what stands under the key: with the request's own mark it is this request's to fulfil
 */
export async function claimAnswer(
  manager: EntityManager,
  key: AnswerKey,
  claimed: Pick<KeptAnswer, 'claim' | 'fingerprint'>,
  now: Date,
): Promise<KeptAnswer> {
  await manager.delete(KeptAnswer, { createdAt: LessThan(new Date(now.getTime() - KEEP_MS)) });
  const row: KeptAnswer = { ...key, ...claimed, status: null, headers: null, body: null, createdAt: now };
  await manager.createQueryBuilder().insert().into(KeptAnswer).values(row).orIgnore().execute();
  return manager.findOneByOrFail(KeptAnswer, { ...key });
}

/** Keeps the answer of a claimed request. */
export async function keepAnswer(
  manager: EntityManager,
  key: AnswerKey,
  answer: Pick<KeptAnswer, 'status' | 'headers' | 'body'>,
): Promise<void> {
  await manager.update(KeptAnswer, { ...key }, answer);
}

/** Frees the key of a request that changed nothing. */
export async function forgetAnswer(manager: EntityManager, key: AnswerKey): Promise<void> {
  await manager.delete(KeptAnswer, { ...key });
}
