import type { WorkshopScope } from '../../database/workshop-scope';
import type { Sale } from '../../models/sale';
import type { MoneyEvent } from '../../payments/payment-host';
import { askRefund } from './ask-refund';
import type { SaleFact } from './sale-state';
import { confirmRefunds } from './settle-sale';
import type { TellTools } from './tell-sale';

/**
 * What an event of the payment host means for a sale.
 * @param sale its row, locked in this transaction
 */
export async function saleFactsOf(
  scope: WorkshopScope,
  sale: Sale,
  event: MoneyEvent,
  tools: TellTools,
): Promise<readonly SaleFact[]> {
  const base = { at: event.at, source: event.id };
  switch (event.kind) {
    case 'paid': {
      const { paymentId, amount } = event;
      const isWhole = amount.amountMinor === sale.totalMinor && amount.currency === sale.currency;
      if (isWhole) return [{ ...base, key: `paid:${paymentId}`, kind: 'paid', details: { paymentId } }];
      // Our own sale named the sum, so this can't happen; if it does, nothing is sent for it and the money goes back.
      const reason = 'The payment host reports another sum than the order’s. It goes back to the card.';
      const refund = { key: `odd:${paymentId}`, paymentId, amountMinor: amount.amountMinor, reason };
      await askRefund(scope, tools.queue, sale, refund, tools.now());
      return [{ ...base, key: `payment-failed:${event.id}`, kind: 'payment-failed', details: { reason } }];
    }
    case 'failed': {
      const details = { reason: event.message };
      return [{ ...base, key: `payment-failed:${event.id}`, kind: 'payment-failed', details }];
    }
    case 'refunded':
      await confirmRefunds(scope, sale, event.paymentId, event.refundedMinor, tools);
      return [];
    case 'checkout-ended':
      if (sale.checkoutId === event.sessionId) {
        await scope.rows.sales.change(sale, { checkoutId: null, checkoutRound: sale.checkoutRound + 1 });
      }
      return [];
  }
}
