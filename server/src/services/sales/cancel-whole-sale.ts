import type { WorkshopScope } from '../../database/workshop-scope';
import type { Sale } from '../../models/sale';
import type { StockTarget } from '../stock/shelf';
import { announceStock, targetOf } from '../stock/shelf';
import { releaseItem, serveWaitingSales } from './reserve';
import type { TellTools } from './tell-sale';
import { tellSale } from './tell-sale';

/**
 * Cancel a sale of which nothing was shipped: what is kept for it is free again and goes to whoever waits for it, and what
 * was paid goes back. Only with the shelf locked.
 * @param sale its row, locked in this transaction
 */
export async function cancelWholeSale(
  scope: WorkshopScope,
  sale: Sale,
  reason: string,
  tools: TellTools,
): Promise<void> {
  const now = tools.now();
  const freed: StockTarget[] = [];
  const touched: string[] = [];
  for (const item of await scope.rows.saleItems.list({ where: { saleId: sale.id }, order: [['position', 'ASC']] })) {
    if (item.reserved > 0) {
      touched.push(await releaseItem(scope, sale, item, item.reserved, now));
      freed.push(targetOf(item));
    }
    await scope.rows.saleItems.change(item, { reserved: 0, cancelled: item.quantity });
  }
  for (const line of await scope.rows.saleLines.list({ where: { saleId: sale.id } })) {
    await scope.rows.saleLines.change(line, { cancelled: line.quantity });
  }
  const details = { reason, isWhole: true };
  await tellSale(
    scope,
    sale,
    [{ key: 'cancelled:whole', kind: 'cancelled', at: now, source: sale.id, details }],
    tools,
  );
  for (const target of freed) await serveWaitingSales(scope, target, tools);
  announceStock(scope, touched);
}
