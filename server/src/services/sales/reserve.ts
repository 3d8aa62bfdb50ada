import { randomUUID } from 'node:crypto';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Sale } from '../../models/sale';
import type { SaleItem } from '../../models/sale-item';
import type { StockPosition } from '../../models/stock-position';
import type { StockTarget } from '../stock/shelf';
import { announceStock, findPosition, moveStock, targetOf } from '../stock/shelf';
import { pieceName } from './piece-words';
import type { TellTools } from './tell-sale';
import { tellSale } from './tell-sale';

/** What is missing of a piece: neither sent nor kept for the sale nor cancelled. */
export const shortOf = (item: Pick<SaleItem, 'quantity' | 'shipped' | 'cancelled' | 'reserved'>): number =>
  item.quantity - item.shipped - item.cancelled - item.reserved;

/** Who moves stock when it follows from something else. */
const BY_ITSELF = 'Foldwright';

/**
 * Keep for a sale what is free of a piece. Only with the shelf locked.
 * @returns how many
 */
async function keepFree(
  scope: WorkshopScope,
  sale: Sale,
  item: SaleItem,
  position: StockPosition,
  now: Date,
  atMost = Infinity,
): Promise<number> {
  const taken = Math.min(shortOf(item), position.onHand - position.reserved, atMost);
  if (taken <= 0) return 0;
  await moveStock(scope, position, {
    key: `reserve:${item.id}:${randomUUID()}`,
    kind: 'reserved',
    onHandChange: 0,
    reservedChange: taken,
    reason: `Kept for sale ${sale.number}`,
    byName: BY_ITSELF,
    at: now,
    saleId: sale.id,
  });
  await scope.rows.saleItems.change(item, { reserved: item.reserved + taken });
  return taken;
}

/**
 * Keep for a sale what is free of each of its pieces: first what its buyer was told would come from the shelf, so that a
 * line that can go at once is not broken up for one that has to wait anyway. Only with the shelf locked.
 * @param promised how many of each line, in the order of the lines
 */
export async function reserveForSale(
  scope: WorkshopScope,
  sale: Sale,
  promised: readonly number[],
  now: Date,
): Promise<void> {
  const items = await scope.rows.saleItems.list({ where: { saleId: sale.id }, order: [['position', 'ASC']] });
  const lines = await scope.rows.saleLines.list({ where: { saleId: sale.id } });
  const touched: string[] = [];
  const keep = async (item: SaleItem, atMost: number): Promise<void> => {
    const position = await findPosition(scope, targetOf(item));
    if (position !== null && (await keepFree(scope, sale, item, position, now, atMost)) > 0) touched.push(position.id);
  };
  for (const item of items) {
    const line = lines.find(({ id }) => id === item.lineId);
    await keep(item, item.perLine * (promised[line?.position ?? -1] ?? 0));
  }
  for (const item of items) await keep(item, Infinity);
  announceStock(scope, touched);
}

/**
 * Put back what is kept for a piece, as much of it as is said. Only with the shelf locked; the caller changes the piece
 * and announces the position.
 * @returns the position's id
 */
export async function releaseItem(
  scope: WorkshopScope,
  sale: Sale,
  item: SaleItem,
  quantity: number,
  now: Date,
): Promise<string> {
  const position = await findPosition(scope, targetOf(item));
  if (position === null) throw new Error(`piece ${item.id} keeps ${quantity} of nothing`);
  await moveStock(scope, position, {
    key: `release:${item.id}:${randomUUID()}`,
    kind: 'released',
    onHandChange: 0,
    reservedChange: -quantity,
    reason: `No longer kept for sale ${sale.number}`,
    byName: BY_ITSELF,
    at: now,
    saleId: sale.id,
  });
  return position.id;
}

/**
 * Something came in or became free: sales that wait for it get it, the oldest first. Only with the shelf locked, and at
 * the end of a transaction.
 */
export async function serveWaitingSales(scope: WorkshopScope, target: StockTarget, tools: TellTools): Promise<void> {
  const position = await findPosition(scope, target);
  if (position === null) return;
  const sales = await scope.rows.sales.list({
    where: { state: ['placed', 'paid', 'partly-shipped'] },
    order: [['number', 'ASC']],
  });
  const where =
    target.kind === 'bracket'
      ? { revisionId: target.revisionId, finishId: target.finishId }
      : { hardwareId: target.hardwareId };
  for (const { id } of sales) {
    if (position.onHand - position.reserved <= 0) break;
    const items = (await scope.rows.saleItems.list({ where: { ...where, saleId: id } })).filter(
      (item) => shortOf(item) > 0,
    );
    if (items.length === 0) continue;
    const sale = await scope.rows.sales.get(id, { lock: true });
    const now = tools.now();
    for (const item of items) {
      const taken = await keepFree(scope, sale, item, position, now);
      if (taken === 0) continue;
      const key = `stock-arrived:${randomUUID()}`;
      const details = { what: `${taken} × ${pieceName(item)}` };
      await tellSale(scope, sale, [{ key, kind: 'stock-arrived', at: now, source: key, details }], tools);
    }
  }
  announceStock(scope, [position.id]);
}
