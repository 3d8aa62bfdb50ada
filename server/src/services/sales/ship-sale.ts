import type { Sale as SaleContract } from '@foldwright/shared/contracts/sales';
import { shipSale as contract } from '@foldwright/shared/contracts/sales';
import { randomUUID } from 'node:crypto';
import type { WorkshopScope } from '../../database/workshop-scope';
import { Problem, notFound } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { Sale } from '../../models/sale';
import type { SaleItem } from '../../models/sale-item';
import { recordAudit } from '../record-audit';
import { announceStock, findPosition, moveStock, targetOf } from '../stock/shelf';
import { presentSale } from './assemble-sale';
import type { SaleTools } from './change-sale';
import { changeSale, refuseUnlessOpen } from './change-sale';
import { pieceName } from './piece-words';
import { tellSale } from './tell-sale';

export interface Parcel {
  readonly items: readonly { readonly itemId: string; readonly quantity: number }[];
  readonly carrier: string;
  readonly trackingCode: string | null;
}

/**
 * Send a parcel with what is kept for the sale, once under the caller's key; the customer is told.
 * @throws Problem `not-found`, `wrong-state`, `stale-row`, `not-enough-stock` for more than is kept for the sale
 */
export function shipSale(
  tools: SaleTools,
  actor: Member,
  saleId: string,
  parcel: Parcel,
  key: string,
  seenRevision: number,
): Promise<SaleContract> {
  const call = { saleId, route: contract.id, key, request: parcel, seenRevision };
  return changeSale(tools, actor, call, async (scope, sale) => {
    refuseUnlessOpen(sale);
    const now = tools.now();
    const number = (await scope.rows.shipments.count({ saleId })) + 1;
    const { carrier, trackingCode } = parcel;
    const shipment = await scope.rows.shipments.add({ saleId, number, carrier, trackingCode, shippedAt: now });
    const touched: string[] = [];
    const inside: string[] = [];
    for (const { itemId, quantity } of joinPieces(parcel.items)) {
      const item = await keptItem(scope, sale, itemId, quantity);
      touched.push(await takeOff(scope, sale, item, quantity, actor, now));
      await scope.rows.saleItems.change(item, {
        reserved: item.reserved - quantity,
        shipped: item.shipped + quantity,
      });
      await scope.rows.shipmentItems.add({ shipmentId: shipment.id, itemId, quantity });
      inside.push(`${quantity} × ${pieceName(item)}`);
    }
    await recordAudit(scope, actor, `Sent parcel ${number} of sale ${sale.number}`, sale.customerName);
    const details = {
      ...{ parcel: number, carrier, what: inside.join('\n') },
      ...(trackingCode === null ? {} : { trackingCode }),
    };
    const fact = { key: `shipped:${shipment.id}`, kind: 'shipped', at: now, source: shipment.id, details } as const;
    await tellSale(scope, sale, [fact], tools);
    announceStock(scope, touched);
  });
}

/** A piece that is named twice is meant together. */
function joinPieces(items: Parcel['items']): Parcel['items'] {
  const joined = new Map<string, number>();
  for (const { itemId, quantity } of items) joined.set(itemId, (joined.get(itemId) ?? 0) + quantity);
  return [...joined].map(([itemId, quantity]) => ({ itemId, quantity }));
}

async function keptItem(scope: WorkshopScope, sale: Sale, itemId: string, quantity: number): Promise<SaleItem> {
  const item = await scope.rows.saleItems.findOne({ id: itemId, saleId: sale.id }, { lock: true });
  if (item === null) throw notFound();
  if (quantity <= item.reserved) return item;
  throw new Problem('not-enough-stock', {
    detail: `${item.reserved} of ${pieceName(item)} are kept for order ${sale.number}, not ${quantity}.`,
    kept: 'No parcel was sent.',
    next: 'Send what is there, or have the rest cut first.',
  });
}

/** @returns id of the position */
async function takeOff(
  scope: WorkshopScope,
  sale: Sale,
  item: SaleItem,
  quantity: number,
  actor: Member,
  now: Date,
): Promise<string> {
  const position = await findPosition(scope, targetOf(item));
  if (position === null) throw new Error(`piece ${item.id} is kept and lies nowhere`);
  await moveStock(scope, position, {
    key: `ship:${randomUUID()}`,
    kind: 'shipped',
    onHandChange: -quantity,
    reservedChange: -quantity,
    reason: `Sent with sale ${sale.number}`,
    byName: actor.userName,
    at: now,
    saleId: sale.id,
  });
  return position.id;
}

/** Note that a parcel has arrived; noting it twice changes nothing. @throws Problem `not-found` */
export function markDelivered(
  tools: SaleTools,
  actor: Member,
  saleId: string,
  shipmentId: string,
): Promise<SaleContract> {
  return tools.database.inWorkshop(actor.workshopId, async (scope) => {
    const sale = await scope.rows.sales.get(saleId, { lock: true });
    const shipment = await scope.rows.shipments.findOne({ id: shipmentId, saleId }, { lock: true });
    if (shipment === null) throw notFound();
    if (shipment.deliveredAt === null) {
      const at = tools.now();
      await scope.rows.shipments.change(shipment, { deliveredAt: at });
      const fact = { key: `delivered:${shipmentId}`, kind: 'delivered', at, source: shipmentId } as const;
      await tellSale(scope, sale, [{ ...fact, details: { parcel: shipment.number } }], tools);
    }
    return presentSale(scope, await scope.rows.sales.get(saleId));
  });
}
