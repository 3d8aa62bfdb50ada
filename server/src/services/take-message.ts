import * as z from 'zod/mini';
import type { AppDependencies } from '../app-dependencies';
import type { Database, SystemReason } from '../database/database';
import { Problem } from '../http/problem';
import type { Order } from '../models/order';
import type { Sale } from '../models/sale';
import { countRefusedMessage } from './count-refused-message';
import type { OrderFact } from './order-state';
import type { SaleFact } from './sales/sale-state';
import { tellSale } from './sales/tell-sale';
import type { TellOrderTools } from './tell-order';
import { tellOrder } from './tell-order';
import type { WorkshopScope } from '../database/workshop-scope';

/** A message of an outside service that proved where it comes from. */
export interface ProvenMessage {
  readonly provider: 'payments' | 'cutting';
  readonly eventId: string;
  readonly kind: string;
  /** Id of what it is about: an order to the cutting service, or a sale to a customer. */
  readonly aboutId: string;
  readonly happenedAt: Date;
  readonly body: Buffer;
}

const subjectRow = z.object({ workshop_id: z.uuid(), kind: z.enum(['order', 'sale']) });
type Subject = z.output<typeof subjectRow>;

async function findSubject(database: Database, reason: SystemReason, aboutId: string): Promise<Subject | undefined> {
  if (!z.safeParse(z.uuid(), aboutId).success) return undefined;
  return database.asSystem(reason, async ({ select }) => {
    const [row] = await select(
      `SELECT workshop_id, 'order' AS kind FROM orders WHERE id = $1
       UNION ALL SELECT workshop_id, 'sale' FROM sales WHERE id = $1`,
      [aboutId],
    );
    return row === undefined ? undefined : subjectRow.parse(row);
  });
}

/** What a message means for whatever it is about, inside the transaction that holds its row. */
export interface MessageWork {
  /** @returns the facts that it tells of */
  order(scope: WorkshopScope, order: Order): Promise<readonly OrderFact[]>;
  /** Absent where a service has nothing to do with sales; such a message is let go. */
  readonly sale?: (scope: WorkshopScope, sale: Sale) => Promise<readonly SaleFact[]>;
}

/**
 * Keep a message under its own id and act on it, both or neither; one that was taken before changes nothing. A message
 * about nothing of ours is let go: to send it again would not help.
 */
export async function takeMessage(
  { database, ...tools }: Pick<AppDependencies, 'database'> & TellOrderTools,
  reason: SystemReason,
  message: ProvenMessage,
  work: MessageWork,
): Promise<void> {
  const subject = await findSubject(database, reason, message.aboutId);
  if (subject === undefined) return;
  await database.inWorkshop(subject.workshop_id, async (scope) => {
    if (subject.kind === 'order') {
      const order = await scope.rows.orders.get(message.aboutId, { lock: true });
      if (!(await keepMessage(scope, message, { order: order.id, sale: null }, tools.now()))) return;
      await tellOrder(scope, order, await work.order(scope, order), tools);
    } else if (work.sale !== undefined) {
      const sale = await scope.rows.sales.get(message.aboutId, { lock: true });
      if (!(await keepMessage(scope, message, { order: null, sale: sale.id }, tools.now()))) return;
      await tellSale(scope, sale, await work.sale(scope, sale), tools);
    }
  });
}

/** @returns false when the message was kept before */
async function keepMessage(
  scope: WorkshopScope,
  { provider, eventId, kind, happenedAt, body }: ProvenMessage,
  about: { readonly order: string | null; readonly sale: string | null },
  now: Date,
): Promise<boolean> {
  const stored = await scope.sql(
    `INSERT INTO webhook_events
       (id, workshop_id, provider, event_id, kind, order_id, sale_id, happened_at, body, received_at)
     VALUES (gen_random_uuid(), $1, $2, $3, $4, $5, $6, $7, $8, $9)
     ON CONFLICT (provider, event_id) DO NOTHING RETURNING id`,
    [scope.workshopId, provider, eventId, kind, about.order, about.sale, happenedAt, body.toString('utf8'), now],
  );
  return stored.length > 0;
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
