import * as z from 'zod/mini';
import type { AppDependencies } from '../app-dependencies';
import type { Database, SystemReason } from '../database/database';
import { Problem } from '../http/problem';
import type { Order } from '../models/order';
import { countRefusedMessage } from './count-refused-message';
import type { OrderFact } from './order-state';
import type { TellOrderTools } from './tell-order';
import { tellOrder } from './tell-order';
import type { WorkshopScope } from '../database/workshop-scope';

/** A message of an outside service that proved where it comes from. */
export interface ProvenMessage {
  readonly provider: 'payments' | 'cutting';
  readonly eventId: string;
  readonly kind: string;
  readonly orderId: string;
  readonly happenedAt: Date;
  readonly body: Buffer;
}

const workshopRow = z.object({ workshop_id: z.uuid() });

async function findWorkshop(database: Database, reason: SystemReason, orderId: string): Promise<string | undefined> {
  if (!z.safeParse(z.uuid(), orderId).success) return undefined;
  return database.asSystem(reason, async ({ select }) => {
    const [row] = await select('SELECT workshop_id FROM orders WHERE id = $1', [orderId]);
    return row === undefined ? undefined : workshopRow.parse(row).workshop_id;
  });
}

/**
 * Keep a message under its own id and act on it, both or neither; one that was taken before changes nothing. A message
 * about an order that is not ours is let go: to send it again would not help.
 * @param work what the message means, inside the transaction that holds the order
 */
export async function takeMessage(
  { database, queue, publicUrl, now }: Pick<AppDependencies, 'database'> & TellOrderTools,
  reason: SystemReason,
  message: ProvenMessage,
  work: (scope: WorkshopScope, order: Order) => Promise<readonly OrderFact[]>,
): Promise<void> {
  const workshopId = await findWorkshop(database, reason, message.orderId);
  if (workshopId === undefined) return;
  await database.inWorkshop(workshopId, async (scope) => {
    const order = await scope.rows.orders.get(message.orderId, { lock: true });
    const { body, ...rest } = message;
    const stored = await scope.sql(
      `INSERT INTO webhook_events (id, workshop_id, provider, event_id, kind, order_id, happened_at, body, received_at)
       VALUES (gen_random_uuid(), $1, $2, $3, $4, $5, $6, $7, $8)
       ON CONFLICT (provider, event_id) DO NOTHING RETURNING id`,
      [workshopId, rest.provider, rest.eventId, rest.kind, rest.orderId, rest.happenedAt, body.toString('utf8'), now()],
    );
    if (stored.length === 0) return;
    await tellOrder(scope, order, await work(scope, order), { queue, publicUrl, now });
  });
}

/** Refuse a message that proved nothing: counted, not kept. @throws Problem `invalid-input`, always */
export async function refuseMessage(
  { database, now }: Pick<AppDependencies, 'database' | 'now'>,
  provider: ProvenMessage['provider'],
  error: Error,
): Promise<never> {
  await countRefusedMessage(database, provider, now());
  throw new Problem('invalid-input', { detail: error.message, kept: 'Nothing was stored.' });
}
