import type { Money } from '@foldwright/shared/contracts/scalars';
import type { AppDependencies } from '../app-dependencies';
import type { WorkshopScope } from '../database/workshop-scope';
import { Problem } from '../http/problem';
import type { CheckoutSession } from '../payments/payment-host';
import { PaymentHostRefused, PaymentHostUnreachable } from '../payments/payment-host';

/** Something that can be paid on a hosted page, as it is now. */
export interface Payable {
  readonly id: string;
  /** As people call it: "Order 1001". */
  readonly name: string;
  readonly checkoutId: string | null;
  readonly checkoutRound: number;
  readonly description: string;
  readonly amount: Money;
  readonly customerEmail: string;
  /** Where the person comes back to, with or without having paid. */
  readonly page: string;
}

/** How one kind of thing is read and changed while its page is opened; each is a transaction of its own. */
export interface PayableRows {
  /** @throws Problem `not-found`, `wrong-state` when there is nothing to pay */
  read(scope: WorkshopScope): Promise<Payable>;
  /** Forget a page that is closed and count the round, unless somebody did already. */
  forgetPage(scope: WorkshopScope, payable: Payable): Promise<void>;
  /** Keep the page that was opened; false when it was cancelled meanwhile and the page has to be closed again. */
  keepPage(scope: WorkshopScope, session: CheckoutSession): Promise<boolean>;
}

/**
 * Open a payment page, or answer the one that is open. No transaction waits for the payment host: its answer is written in
 * one of its own, and a key for each round makes a repeated request give the same page.
 * @returns address of the hosted page
 * @throws Problem `not-found`, `wrong-state` when there is nothing to pay, `service-unreachable`
 */
export async function openHostedPage(
  { database, payments }: Pick<AppDependencies, 'database' | 'payments'>,
  workshopId: string,
  rows: PayableRows,
): Promise<string> {
  const read = (): Promise<Payable> => database.inWorkshop(workshopId, (scope) => rows.read(scope));
  let payable = await read();
  const { checkoutId } = payable;
  if (checkoutId !== null) {
    const session = await askHost(payable, () => payments.readCheckout(checkoutId));
    if (session.state === 'open' && session.url !== null) return session.url;
    if (session.state === 'paid') {
      throw new Problem('wrong-state', {
        detail: `${payable.name} is paid; the payment host’s message about it is on its way.`,
        kept: 'Nothing was charged twice.',
      });
    }
    const closed = payable;
    await database.inWorkshop(workshopId, (scope) => rows.forgetPage(scope, closed));
    payable = await read();
  }
  const { id, checkoutRound, description, amount, customerEmail, page } = payable;
  const session = await askHost(payable, () =>
    payments.openCheckout({
      orderId: id,
      description,
      amount,
      customerEmail,
      successUrl: `${page}?payment=done`,
      cancelUrl: `${page}?payment=left`,
      idempotencyKey: `checkout-${id}-${checkoutRound}`,
    }),
  );
  const isWanted = await database.inWorkshop(workshopId, (scope) => rows.keepPage(scope, session));
  if (isWanted && session.url !== null) return session.url;
  throw new Problem('wrong-state', {
    detail: 'The order was cancelled while its payment page was being opened, or the page is closed already.',
    kept: 'Nothing was charged.',
  });
}

async function askHost<T>(payable: Payable, request: () => Promise<T>): Promise<T> {
  try {
    return await request();
  } catch (error) {
    // The payment host being away or unwilling is foreseen and told in words; anything else is a fault of ours.
    if (!(error instanceof PaymentHostUnreachable || error instanceof PaymentHostRefused)) throw error;
    throw new Problem('service-unreachable', {
      detail:
        error instanceof PaymentHostUnreachable
          ? 'The payment host doesn’t answer at the moment.'
          : 'The payment host would not open a payment page.',
      kept: `${payable.name} is kept as it is. Nothing was charged.`,
      next: 'Try again in a few minutes.',
    });
  }
}
