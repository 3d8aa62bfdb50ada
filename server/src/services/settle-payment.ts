import type { Database } from '../database/database';
import type { PaymentHost } from '../payments/payment-host';

export interface RefundWork {
  readonly workshopId: string;
  readonly orderId: string;
  readonly paymentId: string;
}

/**
 * Send a payment back. The payment host does it once, however often it is asked, and tells of it in an event of its own.
 * @throws PaymentHostUnreachable, PaymentHostRefused for the queue to try again
 */
export async function refundPayment(payments: PaymentHost, { orderId, paymentId }: RefundWork): Promise<void> {
  await payments.refund({ orderId, paymentId, amountMinor: null, idempotencyKey: `refund-${paymentId}` });
}

/**
 * Close the payment page of a cancelled order, so that nobody pays for it by mistake.
 * @throws PaymentHostUnreachable, PaymentHostRefused for the queue to try again
 */
export async function closeCheckout(
  { database, payments }: { readonly database: Database; readonly payments: PaymentHost },
  { workshopId, orderId }: Pick<RefundWork, 'workshopId' | 'orderId'>,
): Promise<void> {
  const checkoutId = await database.inWorkshop(workshopId, async ({ rows }) => {
    const order = await rows.orders.get(orderId);
    return order.state === 'cancelled' ? order.checkoutId : null;
  });
  if (checkoutId !== null) await payments.closeCheckout(checkoutId);
}
