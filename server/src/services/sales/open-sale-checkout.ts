import type { AppDependencies } from '../../app-dependencies';
import { Problem } from '../../http/problem';
import type { Sale } from '../../models/sale';
import { openHostedPage } from '../hosted-page';
import { findSaleByLink } from './find-by-link';
import { orderPageUrl } from './sale-letters';
import { tellSale } from './tell-sale';

type Tools = Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now' | 'payments'>;

/**
 * Open the payment page of a customer's order, or answer the one that is open.
 * @returns address of the hosted page
 * @throws Problem `not-found`, `wrong-state` when there is nothing to pay, `service-unreachable`
 */
export async function openSaleCheckout(tools: Tools, link: string): Promise<string> {
  const { workshopId, saleId } = await findSaleByLink(tools.database, link);
  return openHostedPage(tools, workshopId, {
    async read(scope) {
      const sale = payable(await scope.rows.sales.get(saleId));
      const workshop = await scope.workshop();
      return {
        id: sale.id,
        name: `Order ${sale.number}`,
        checkoutId: sale.checkoutId,
        checkoutRound: sale.checkoutRound,
        description: `${workshop.name}, order ${sale.number}`,
        amount: { amountMinor: sale.totalMinor, currency: sale.currency },
        customerEmail: sale.customerEmail,
        page: orderPageUrl(tools.publicUrl, link),
      };
    },
    async forgetPage({ rows }, { id, checkoutId, checkoutRound }) {
      await rows.sales.changeWhere({ id, checkoutId }, { checkoutId: null, checkoutRound: checkoutRound + 1 });
    },
    async keepPage(scope, session) {
      const sale = await scope.rows.sales.get(saleId, { lock: true });
      if (sale.checkoutId === null) await scope.rows.sales.change(sale, { checkoutId: session.id });
      if (sale.state === 'cancelled') {
        await tools.queue.enqueue(scope.transaction, 'sale', { task: 'close-checkout', workshopId, saleId });
        return false;
      }
      const at = tools.now();
      const opened = { kind: 'checkout-opened', key: `checkout-opened:${session.id}`, at, source: session.id } as const;
      await tellSale(scope, sale, [{ ...opened, details: {} }], tools);
      return true;
    },
  });
}

function payable(sale: Sale): Sale {
  if (sale.state === 'placed' && (sale.paymentState === 'open' || sale.paymentState === 'failed')) return sale;
  throw new Problem('wrong-state', {
    detail:
      sale.state === 'cancelled'
        ? `Order ${sale.number} was cancelled.`
        : `Order ${sale.number} is paid, there is nothing left to pay.`,
    kept: 'Nothing was charged.',
    ...(sale.state === 'cancelled' ? { next: 'Put what you want into the cart again.' } : {}),
  });
}
