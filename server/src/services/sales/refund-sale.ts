import { randomUUID } from 'node:crypto';
import type { Sale as SaleContract } from '@foldwright/shared/contracts/sales';
import { recordReturn as returnContract, refundSale as refundContract } from '@foldwright/shared/contracts/sales';
import { formatMoney } from '@foldwright/shared/units/money';
import type { WorkshopScope } from '../../database/workshop-scope';
import { Problem, notFound } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { Sale } from '../../models/sale';
import { recordAudit } from '../record-audit';
import { announceStock, moveStock, positionOf, targetOf } from '../stock/shelf';
import { askRefund, enqueueRefund, leftOfPayment } from './ask-refund';
import { presentSale } from './assemble-sale';
import type { SaleTools } from './change-sale';
import { changeSale } from './change-sale';
import { pieceName } from './piece-words';
import { serveWaitingSales } from './reserve';
import { readSaleFacts } from './sale-rows';
import { paymentsOf } from './sale-state';
import { tellSale } from './tell-sale';

const moneyOf = (sale: Sale, amountMinor: number) => formatMoney({ amountMinor, currency: sale.currency });

/** @throws Problem `wrong-state` when it is not paid, or less is left of the payment */
async function askForPart(
  scope: WorkshopScope,
  sale: Sale,
  { key, amountMinor, reason }: { readonly key: string; readonly amountMinor: number; readonly reason: string },
  tools: SaleTools,
): Promise<void> {
  const [paymentId] = paymentsOf(await readSaleFacts(scope, sale.id));
  const left = paymentId === undefined ? 0 : await leftOfPayment(scope, sale, paymentId);
  if (paymentId === undefined || amountMinor > left) {
    throw new Problem('wrong-state', {
      detail:
        paymentId === undefined
          ? `Order ${sale.number} is not paid.`
          : `${moneyOf(sale, left)} are left of what was paid for order ${sale.number}.`,
      kept: 'No money was sent.',
      errors: [{ pointer: '/amountMinor', detail: `At most ${moneyOf(sale, left)}.` }],
    });
  }
  const refund = await askRefund(scope, tools.queue, sale, { key, paymentId, amountMinor, reason }, tools.now());
  if (refund === null) return;
  const details = { amountMinor, reason, paymentId };
  const fact = { key: `refund-asked:${refund.id}`, kind: 'refund-asked', at: tools.now(), source: refund.id } as const;
  await tellSale(scope, sale, [{ ...fact, details }], tools);
}

/**
 * Send part of the money back, once under the caller's key.
 * @throws Problem `not-found`, `wrong-state` when less is left of the payment
 */
export function refundSale(
  tools: SaleTools,
  actor: Member,
  saleId: string,
  refund: { readonly amountMinor: number; readonly reason: string },
  key: string,
): Promise<SaleContract> {
  const call = { saleId, route: refundContract.id, key, request: refund, seenRevision: null };
  return changeSale(tools, actor, call, async (scope, sale) => {
    await recordAudit(
      scope,
      actor,
      `Sent ${moneyOf(sale, refund.amountMinor)} back, sale ${sale.number}`,
      refund.reason,
    );
    await askForPart(scope, sale, { key: `refund:${key}`, ...refund }, tools);
  });
}

/**
 * Try a refund again that the payment host refused. A refusal is definite, so nothing went back; but the host remembers
 * its answer under the key, so the new try has one of its own.
 * @throws Problem `not-found`, `wrong-state` when it has not failed, or the money is not there any more
 */
export function retryRefund(tools: SaleTools, actor: Member, saleId: string, refundId: string): Promise<SaleContract> {
  return tools.database.inWorkshop(actor.workshopId, async (scope) => {
    const sale = await scope.rows.sales.get(saleId, { lock: true });
    const refund = await scope.rows.refunds.findOne({ id: refundId, saleId }, { lock: true });
    if (refund === null) throw notFound();
    const left = await leftOfPayment(scope, sale, refund.paymentId);
    if (refund.state !== 'failed' || refund.amountMinor > left) {
      throw new Problem('wrong-state', {
        detail:
          refund.state === 'failed'
            ? `Only ${moneyOf(sale, left)} are left of that payment.`
            : 'This refund has not failed.',
        kept: 'No money was sent.',
      });
    }
    await scope.rows.refunds.change(refund, { state: 'asked', problem: null, attempt: refund.attempt + 1 });
    await enqueueRefund(scope, tools.queue, refund);
    await recordAudit(scope, actor, `Tried a refund of sale ${sale.number} again`, moneyOf(sale, refund.amountMinor));
    const key = `refund-asked:${refundId}:${refund.attempt}`;
    const details = { amountMinor: refund.amountMinor, reason: 'Tried again.', paymentId: refund.paymentId };
    await tellSale(scope, sale, [{ key, kind: 'refund-asked', at: tools.now(), source: refundId, details }], tools);
    return presentSale(scope, await scope.rows.sales.get(saleId));
  });
}

export interface Return {
  readonly itemId: string;
  readonly quantity: number;
  readonly isBackOnShelf: boolean;
  readonly refundMinor: number;
  readonly reason: string;
}

/**
 * Take a shipped piece back, on the shelf or to scrap, and send money back for it; once under the caller's key.
 * @throws Problem `not-found`, `wrong-state` for more than was shipped, or more money than is left; `stale-row`
 */
export function recordReturn(
  tools: SaleTools,
  actor: Member,
  saleId: string,
  returned: Return,
  key: string,
  seenRevision: number,
): Promise<SaleContract> {
  const call = { saleId, route: returnContract.id, key, request: returned, seenRevision };
  return changeSale(tools, actor, call, async (scope, sale) => {
    const { itemId, quantity, isBackOnShelf, refundMinor, reason } = returned;
    const item = await scope.rows.saleItems.findOne({ id: itemId, saleId }, { lock: true });
    if (item === null) throw notFound();
    if (item.returned + quantity > item.shipped) {
      throw new Problem('wrong-state', {
        detail: `${item.shipped - item.returned} of ${pieceName(item)} are with the customer.`,
        kept: 'Nothing was changed.',
      });
    }
    const now = tools.now();
    await scope.rows.saleItems.change(item, { returned: item.returned + quantity });
    const target = targetOf(item);
    const position = await positionOf(scope, target);
    if (isBackOnShelf) {
      await moveStock(scope, position, {
        key: `return:${randomUUID()}`,
        kind: 'returned',
        onHandChange: quantity,
        reservedChange: 0,
        reason: `Came back from sale ${sale.number}: ${reason}`,
        byName: actor.userName,
        at: now,
        saleId,
      });
    }
    const what = `${quantity} × ${pieceName(item)}`;
    await recordAudit(scope, actor, `Took back ${what}`, `sale ${sale.number}`);
    const fact = { key: `returned:${key}`, kind: 'returned', at: now, source: key, details: { what, reason } } as const;
    await tellSale(scope, sale, [fact], tools);
    if (refundMinor > 0)
      await askForPart(scope, sale, { key: `return:${key}`, amountMinor: refundMinor, reason }, tools);
    if (isBackOnShelf) await serveWaitingSales(scope, target, tools);
    announceStock(scope, [position.id]);
  });
}
