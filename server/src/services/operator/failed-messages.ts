import * as z from 'zod/mini';
import type { CuttingProgress } from '../../cutting/cutting-service';
import type { Database } from '../../database/database';
import { Problem } from '../../http/problem';
import type { MoneyEvent } from '../../payments/payment-host';

/** A message that proved where it comes from, as it was understood. */
export type ToldMessage =
  | { readonly provider: 'payments'; readonly told: MoneyEvent; readonly body: Buffer }
  | { readonly provider: 'cutting'; readonly told: CuttingProgress; readonly body: Buffer };

const at = z.pipe(
  z.iso.datetime(),
  z.transform((text) => new Date(text)),
);
const base = { id: z.string(), at, orderId: z.string() };
const moneyEvent = z.discriminatedUnion('kind', [
  z.object({
    ...base,
    kind: z.literal('paid'),
    sessionId: z.string(),
    paymentId: z.string(),
    amount: z.object({ amountMinor: z.int(), currency: z.string() }),
  }),
  z.object({ ...base, kind: z.literal('failed'), paymentId: z.string(), message: z.string() }),
  z.object({ ...base, kind: z.literal('checkout-ended'), sessionId: z.string() }),
  z.object({ ...base, kind: z.literal('refunded'), paymentId: z.string(), refundedMinor: z.int() }),
]);
const progress = z.object({
  id: z.string(),
  at,
  orderReference: z.string(),
  step: z.enum(['accepted', 'cutting', 'bending', 'shipped', 'refused']),
  trackingCode: z.nullable(z.string()),
  reason: z.nullable(z.string()),
});
const rowSchema = z.object({ provider: z.enum(['payments', 'cutting']), told: z.unknown(), body: z.string() });

const kindOf = (message: ToldMessage): string =>
  message.provider === 'payments' ? message.told.kind : message.told.step;
const wordsOf = (error: unknown): string => (error instanceof Error ? error.message : String(error)).slice(0, 500);

async function keep(database: Database, message: ToldMessage, error: unknown, now: Date): Promise<void> {
  await database.pool.query(
    `INSERT INTO failed_messages (id, provider, event_id, kind, told, body, error, times, last_at)
     VALUES (gen_random_uuid(), $1, $2, $3, $4, $5, $6, 1, $7)
     ON CONFLICT (provider, event_id)
     DO UPDATE SET error = EXCLUDED.error, times = failed_messages.times + 1, last_at = EXCLUDED.last_at, settled_at = NULL`,
    [
      message.provider,
      message.told.id,
      kindOf(message),
      JSON.stringify(message.told),
      message.body.toString('utf8'),
      wordsOf(error),
      now,
    ],
  );
}

/**
 * Handle a message; one that can't be handled is kept for the operator with what it told, and the sender hears of the
 * failure, so that it tries again.
 */
export async function keepingFailures(
  database: Database,
  message: ToldMessage,
  now: () => Date,
  handle: () => Promise<void>,
): Promise<void> {
  try {
    await handle();
  } catch (error) {
    // What was foreseen is a problem with words of its own; everything else is for the operator.
    if (!(error instanceof Problem)) await keep(database, message, error, now());
    throw error;
  }
  await database.pool.query(
    'UPDATE failed_messages SET settled_at = $3 WHERE provider = $1 AND event_id = $2 AND settled_at IS NULL',
    [message.provider, message.told.id, now()],
  );
}

/** A kept message as it was told. @throws Problem `not-found` */
export async function readFailedMessage(database: Database, messageId: string): Promise<ToldMessage> {
  const { rows } = await database.pool.query('SELECT provider, told, body FROM failed_messages WHERE id = $1', [
    messageId,
  ]);
  const [row] = rows.map((one: unknown) => rowSchema.parse(one));
  if (row === undefined) throw new Problem('not-found', { detail: 'There is no such message.' });
  const body = Buffer.from(row.body, 'utf8');
  return row.provider === 'payments'
    ? { provider: 'payments', told: moneyEvent.parse(row.told), body }
    : { provider: 'cutting', told: progress.parse(row.told), body };
}
