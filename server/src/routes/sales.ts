import * as ledger from '@foldwright/shared/contracts/ledger';
import * as links from '@foldwright/shared/contracts/sale-links';
import * as contracts from '@foldwright/shared/contracts/sales';
import type { AppDependencies } from '../app-dependencies';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { askByLink } from '../services/sales/ask-by-link';
import { cancelSale, cancelSaleByLink } from '../services/sales/cancel-sale';
import { cutMissing } from '../services/sales/cut-missing';
import { openSaleCheckout } from '../services/sales/open-sale-checkout';
import { readLedger } from '../services/sales/read-ledger';
import { listBuyers, listPurchases, listSales, readSale, readSaleByLink } from '../services/sales/read-sales';
import { recordReturn, refundSale, retryRefund } from '../services/sales/refund-sale';
import { readFittingSheet, readInvoice, readInvoiceByLink, readPackingSlip } from '../services/sales/sale-documents';
import { markDelivered, shipSale } from '../services/sales/ship-sale';

/** What the workshop does with what it sold. */
export function saleRoutes(dependencies: AppDependencies): BoundRoute[] {
  const { database } = dependencies;
  return [
    bind(contracts.listSales, async ({ actor }) => ({ sales: await listSales(database, actor) })),
    bind(contracts.readSale, ({ actor, params }) => readSale(database, actor, params.saleId)),
    bind(contracts.cutMissing, ({ actor, params, idempotencyKey }) =>
      cutMissing(dependencies, actor, params.saleId, idempotencyKey),
    ),
    bind(contracts.shipSale, ({ actor, params, body, idempotencyKey, ifMatch }) =>
      shipSale(dependencies, actor, params.saleId, body, idempotencyKey, ifMatch),
    ),
    bind(contracts.markDelivered, ({ actor, params }) =>
      markDelivered(dependencies, actor, params.saleId, params.shipmentId),
    ),
    bind(contracts.readPackingSlip, ({ actor, params }) =>
      readPackingSlip(database, actor, params.saleId, params.shipmentId),
    ),
    bind(contracts.readInvoice, ({ actor, params }) => readInvoice(database, actor, params.saleId)),
    bind(contracts.cancelSale, ({ actor, params, body, idempotencyKey, ifMatch }) =>
      cancelSale(dependencies, actor, params.saleId, body, idempotencyKey, ifMatch),
    ),
    bind(contracts.refundSale, ({ actor, params, body, idempotencyKey }) =>
      refundSale(dependencies, actor, params.saleId, body, idempotencyKey),
    ),
    bind(contracts.retryRefund, ({ actor, params }) =>
      retryRefund(dependencies, actor, params.saleId, params.refundId),
    ),
    bind(contracts.recordReturn, ({ actor, params, body, idempotencyKey, ifMatch }) =>
      recordReturn(dependencies, actor, params.saleId, body, idempotencyKey, ifMatch),
    ),
    bind(contracts.listBuyers, async ({ actor, params }) => ({
      buyers: await listBuyers(database, actor, params.revisionId),
    })),
    bind(ledger.readLedger, ({ actor }) => readLedger(database, actor)),
  ];
}

/** What a customer does with an order, behind its private link. */
export function saleLinkRoutes(dependencies: AppDependencies): BoundRoute[] {
  const { database, limits } = dependencies;
  return [
    bind(links.readSaleByLink, ({ params }) => readSaleByLink(database, params.link)),
    bind(links.openSaleCheckout, async ({ params, request }) => {
      await limits.countVisitorPost(request);
      return { url: await openSaleCheckout(dependencies, params.link) };
    }),
    bind(links.cancelSaleByLink, async ({ params, ifMatch, request }) => {
      await limits.countVisitorPost(request);
      return cancelSaleByLink(dependencies, params.link, ifMatch);
    }),
    bind(links.askByLink, async ({ params, body, idempotencyKey, request }) => {
      await limits.countVisitorPost(request);
      return askByLink(dependencies, params.link, body.text, idempotencyKey);
    }),
    bind(links.readFittingSheet, ({ params }) => readFittingSheet(database, params.link)),
    bind(links.readInvoiceByLink, ({ params }) => readInvoiceByLink(database, params.link)),
    bind(links.listPurchases, async ({ actor }) => ({ purchases: await listPurchases(database, actor.user.id) })),
  ];
}
