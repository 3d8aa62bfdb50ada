import type { CustomerOrder } from '@foldwright/shared/contracts/sale-links';
import type { Sale as SaleContract } from '@foldwright/shared/contracts/sales';
import { cancelSale as contract } from '@foldwright/shared/contracts/sales';
import type { WorkshopScope } from '../../database/workshop-scope';
import { Problem, notFound } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { Sale } from '../../models/sale';
import type { SaleItem } from '../../models/sale-item';
import type { SaleLine } from '../../models/sale-line';
import { recordAudit } from '../record-audit';
import type { StockTarget } from '../stock/shelf';
import { announceStock, lockShelf, targetOf } from '../stock/shelf';
import { askRefund, leftOfPayment } from './ask-refund';
import { presentCustomerOrder } from './assemble-sale';
import { cancelWholeSale } from './cancel-whole-sale';
import type { SaleTools } from './change-sale';
import { changeSale, refuseOldSale } from './change-sale';
import { findSaleByLink } from './find-by-link';
import { releaseItem, serveWaitingSales, shortOf } from './reserve';
import { readSaleFacts } from './sale-rows';
import { paymentsOf } from './sale-state';
import { tellSale } from './tell-sale';

export interface Cancellation {
  readonly lines: readonly { readonly lineId: string; readonly quantity: number }[];
  readonly reason: string;
}

const tooLate = (detail: string): Problem =>
  new Problem('wrong-state', { detail, kept: 'Nothing was cancelled.', next: 'Take it back as a return instead.' });

/**
 * Cancel what has not been shipped of some lines, once under the caller's key. What was paid for it goes back: of each
 * line its price, and the postage when nothing of the sale is left.
 * @throws Problem `not-found`, `wrong-state`, `stale-row`
 */
export function cancelSale(
  tools: SaleTools,
  actor: Member,
  saleId: string,
  cancellation: Cancellation,
  key: string,
  seenRevision: number,
): Promise<SaleContract> {
  const call = { saleId, route: contract.id, key, request: cancellation, seenRevision };
  return changeSale(tools, actor, call, async (scope, sale) => {
    if (sale.state === 'cancelled') throw tooLate(`Order ${sale.number} is cancelled already.`);
    const lines = await scope.rows.saleLines.list({ where: { saleId } });
    const isWhole = lines.every((line) => quantityFor(cancellation, line.id) === line.quantity - line.cancelled);
    await recordAudit(
      scope,
      actor,
      `Cancelled ${isWhole ? 'sale' : 'part of sale'} ${sale.number}`,
      cancellation.reason,
    );
    const isUntouched =
      lines.every((line) => line.cancelled === 0) && (await scope.rows.shipments.count({ saleId })) === 0;
    if (isWhole && isUntouched) return cancelWholeSale(scope, sale, cancellation.reason, tools);
    if (sale.state === 'placed') {
      throw new Problem('wrong-state', {
        detail: 'A sale that is not paid can only be cancelled as a whole.',
        kept: 'Nothing was cancelled.',
      });
    }
    await cancelLines(scope, sale, lines, cancellation, key, tools);
  });
}

const quantityFor = ({ lines }: Cancellation, lineId: string): number =>
  lines.filter((line) => line.lineId === lineId).reduce((sum, { quantity }) => sum + quantity, 0);

async function cancelLines(
  scope: WorkshopScope,
  sale: Sale,
  lines: readonly SaleLine[],
  cancellation: Cancellation,
  key: string,
  tools: SaleTools,
): Promise<void> {
  const now = tools.now();
  if (cancellation.lines.some(({ lineId }) => !lines.some(({ id }) => id === lineId))) throw notFound();
  const freed: StockTarget[] = [];
  const touched: string[] = [];
  const words: string[] = [];
  let backMinor = 0;
  for (const line of lines) {
    const quantity = quantityFor(cancellation, line.id);
    if (quantity === 0) continue;
    const items = await scope.rows.saleItems.list({ where: { lineId: line.id }, order: [['position', 'ASC']] });
    refuseShipped(line, items, quantity);
    for (const item of items) {
      const pieces = quantity * item.perLine;
      // What is missing is cancelled first: what lies ready may still be wanted by the lines that stay.
      const fromKept = Math.max(0, pieces - shortOf(item));
      if (fromKept > 0) {
        touched.push(await releaseItem(scope, sale, item, fromKept, now));
        freed.push(targetOf(item));
      }
      const left = { reserved: item.reserved - fromKept, cancelled: item.cancelled + pieces };
      await scope.rows.saleItems.change(item, left);
    }
    await scope.rows.saleLines.change(line, { cancelled: line.cancelled + quantity });
    backMinor += line.eachMinor * quantity;
    words.push(`${quantity} × ${line.title}`);
  }
  await askForMoneyBack(scope, sale, { key: `cancel:${key}`, backMinor, reason: cancellation.reason }, tools);
  const details = { reason: cancellation.reason, what: words.join(', ') };
  const fact = { key: `cancelled:${key}`, kind: 'cancelled', at: now, source: key, details } as const;
  await tellSale(scope, sale, [fact], tools);
  for (const target of freed) await serveWaitingSales(scope, target, tools);
  announceStock(scope, touched);
}

function refuseShipped(line: SaleLine, items: readonly SaleItem[], quantity: number): void {
  const isThere = items.every((item) => shortOf(item) + item.reserved >= quantity * item.perLine);
  if (isThere && quantity <= line.quantity - line.cancelled) return;
  throw tooLate(`Not so many of ${line.title} are left to cancel: part of it is shipped or cancelled already.`);
}

async function askForMoneyBack(
  scope: WorkshopScope,
  sale: Sale,
  { key, backMinor, reason }: { readonly key: string; readonly backMinor: number; readonly reason: string },
  tools: SaleTools,
): Promise<void> {
  const [paymentId] = paymentsOf(await readSaleFacts(scope, sale.id));
  if (paymentId === undefined) return;
  const left = await leftOfPayment(scope, sale, paymentId);
  const lines = await scope.rows.saleLines.list({ where: { saleId: sale.id } });
  const isNothingLeft = lines.every(({ quantity, cancelled }) => quantity === cancelled);
  // Postage was paid for one parcel at least: it goes back only when there will be none.
  const isUnsent = (await scope.rows.shipments.count({ saleId: sale.id })) === 0;
  const wanted = backMinor + (isNothingLeft && isUnsent ? sale.postageMinor : 0);
  const amountMinor = Math.min(left, wanted);
  if (amountMinor > 0) await askRefund(scope, tools.queue, sale, { key, paymentId, amountMinor, reason }, tools.now());
}

/**
 * The customer cancels the order as long as nothing of it was shipped.
 * @throws Problem `not-found`, `wrong-state`, `stale-row`
 */
export async function cancelSaleByLink(tools: SaleTools, link: string, seenRevision: number): Promise<CustomerOrder> {
  const { workshopId, saleId } = await findSaleByLink(tools.database, link);
  return tools.database.inWorkshop(workshopId, async (scope) => {
    await lockShelf(scope);
    const sale = await scope.rows.sales.get(saleId, { lock: true });
    if (sale.state !== 'cancelled') {
      if (sale.state !== 'placed' && sale.state !== 'paid') {
        throw new Problem('wrong-state', {
          detail: 'Part of the order is on its way already.',
          kept: 'The order goes on as it was.',
          next: 'Write to the workshop about sending it back.',
        });
      }
      refuseOldSale(sale, seenRevision);
      await cancelWholeSale(scope, sale, 'You cancelled it.', tools);
    }
    return presentCustomerOrder(scope, await scope.rows.sales.get(saleId));
  });
}
