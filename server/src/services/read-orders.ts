import type { Order as OrderContract } from '@foldwright/shared/contracts/orders';
import type { Database } from '../database/database';
import type { Member } from '../http/visitor';
import { presentWithTimeline, presentWithTimelines } from './order-rows';

/** One order with its timeline. @throws Problem `not-found` */
export async function readOrder(database: Database, { workshopId }: Member, orderId: string): Promise<OrderContract> {
  return database.inWorkshop(workshopId, async (scope) =>
    presentWithTimeline(scope, await scope.rows.orders.get(orderId)),
  );
}

/** Orders of a workshop, newest first. */
export async function listOrders(database: Database, { workshopId }: Member): Promise<OrderContract[]> {
  return database.inWorkshop(workshopId, async (scope) =>
    presentWithTimelines(scope, await scope.rows.orders.list({ order: [['number', 'DESC']] })),
  );
}
