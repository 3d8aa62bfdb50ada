import type { CuttingService } from '../cutting/cutting-service';
import { CuttingServiceRefused } from '../cutting/cutting-service';
import type { Database } from '../database/database';
import type { FileStore } from '../files/file-store';
import { cutFileOf, drawingOf } from './cut-package';
import { readFacts } from './order-rows';
import type { OrderFact } from './order-state';
import { workDue } from './order-state';
import type { TellOrderTools } from './tell-order';
import { tellOrder } from './tell-order';

export interface OrderWork {
  readonly workshopId: string;
  readonly orderId: string;
}

/**
 * Hand a paid order to the cutting service, with the very files that were released. Done again it changes nothing: the
 * service knows the order by our id. A refusal ends the order and sends the money back.
 * @throws CuttingServiceUnreachable, CuttingServiceNonsense for the queue to try again
 */
export async function submitCuttingOrder(
  tools: { readonly database: Database; readonly files: FileStore; readonly cutting: CuttingService } & TellOrderTools,
  { workshopId, orderId }: OrderWork,
): Promise<void> {
  const { database, files, cutting, now } = tools;
  const due = await database.inWorkshop(workshopId, async (scope) => {
    const order = await scope.rows.orders.get(orderId);
    if (!workDue(await readFacts(scope, orderId)).submission) return null;
    return {
      quoteReference: order.quoteReference,
      quantity: order.quantity,
      cutFile: await cutFileOf(scope, order.revisionId, order.stock),
      drawing: await drawingOf(scope, order.revisionId, order.stock),
    };
  });
  if (due === null) return;

  const { quoteReference, quantity } = due;
  const dxf = (await files.read(due.cutFile)).toString('latin1');
  const drawingPdf = await files.read(due.drawing);
  const tell = (fact: OrderFact, shopOrderReference: string | null) =>
    database.inWorkshop(workshopId, async (scope) => {
      const order = await scope.rows.orders.get(orderId, { lock: true });
      if (shopOrderReference !== null) await scope.rows.orders.change(order, { shopOrderReference });
      await tellOrder(scope, order, [fact], tools);
    });
  try {
    const reference = await cutting.placeOrder({ reference: orderId, quoteReference, quantity, dxf, drawingPdf });
    await tell({ key: 'sent-to-cutter', kind: 'sent-to-cutter', at: now(), source: orderId, details: {} }, reference);
  } catch (error) {
    if (!(error instanceof CuttingServiceRefused)) throw error;
    const details = { reason: error.message };
    await tell({ key: 'refused', kind: 'refused', at: now(), source: `answer:${orderId}`, details }, null);
  }
}
