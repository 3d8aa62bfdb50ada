import { createHash } from 'node:crypto';
import { canonicalJson } from '@foldwright/shared/part/canonical-json';
import * as z from 'zod/mini';
import type { WorkshopScope } from '../database/workshop-scope';
import { Problem } from '../http/problem';

/** What a caller wants done at most once. */
export interface OnceKey {
  readonly userId: string;
  /** Id of the route's contract, so that one key may serve two routes. */
  readonly route: string;
  /** The caller's Idempotency-Key. */
  readonly key: string;
  /** What was asked for; the same key with something else is refused. */
  readonly request: unknown;
}

const hashOf = (request: unknown): string => createHash('sha256').update(canonicalJson(request)).digest('hex');

const checkSame = (stored: string, request: unknown): void => {
  if (stored === hashOf(request)) return;
  throw new Problem('already-exists', {
    detail: 'This key was used for something else before.',
    next: 'Send a new Idempotency-Key.',
  });
};

/** The answer an earlier call under this key got, or undefined. For work that has steps outside of the transaction. */
export async function earlierAnswer<S extends z.ZodMiniType>(
  scope: WorkshopScope,
  { userId, route, key, request }: OnceKey,
  answerSchema: S,
): Promise<z.output<S> | undefined> {
  const row = await scope.rows.idempotencyKeys.findOne({ userId, route, key });
  if (row === null) return undefined;
  checkSame(row.requestHash, request);
  return z.parse(answerSchema, row.answer);
}

/**
 * Do something once under a key, inside the caller's transaction: the key, the work and its answer are stored together.
 * A second call that comes while the first runs waits for it, then gets the same answer.
 * @throws Problem `already-exists` when the key was used for another request
 */
export async function once<S extends z.ZodMiniType>(
  scope: WorkshopScope,
  onceKey: OnceKey,
  answerSchema: S,
  work: () => Promise<z.output<S>>,
): Promise<z.output<S>> {
  const { userId, route, key, request } = onceKey;
  // ON CONFLICT waits for a transaction that holds the same key, and sees its outcome.
  const claimed = await scope.sql(
    `INSERT INTO idempotency_keys (id, workshop_id, user_id, route, key, request_hash)
     VALUES (gen_random_uuid(), $1, $2, $3, $4, $5) ON CONFLICT DO NOTHING RETURNING id`,
    [scope.workshopId, userId, route, key, hashOf(request)],
  );
  if (claimed.length === 0) {
    const answer = await earlierAnswer(scope, onceKey, answerSchema);
    if (answer === undefined) throw new Error('A claimed key has no row.');
    return answer;
  }
  const answer = await work();
  await scope.rows.idempotencyKeys.changeWhere({ userId, route, key }, { answer });
  return answer;
}
