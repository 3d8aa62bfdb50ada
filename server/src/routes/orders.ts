import * as contracts from '@foldwright/shared/contracts/orders';
import type { AppDependencies } from '../app-dependencies';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { askForQuote } from '../services/ask-for-quote';
import { cancelOrder } from '../services/cancel-order';
import { listQuotes } from '../services/list-quotes';
import { openCheckout } from '../services/open-checkout';
import { placeOrder } from '../services/place-order';
import { listOrders, readOrder } from '../services/read-orders';
import { receiveCuttingCallback } from '../services/receive-cutting-callback';
import { receivePaymentEvent } from '../services/receive-payment-event';

export function orderRoutes(dependencies: AppDependencies): BoundRoute[] {
  const { database, now } = dependencies;
  return [
    bind(contracts.askForQuote, ({ actor, params, body, idempotencyKey }) =>
      askForQuote(dependencies, actor, { ...body, revisionId: params.revisionId }, idempotencyKey),
    ),
    bind(contracts.listQuotes, async ({ actor, params }) => ({
      quotes: await listQuotes(database, actor, params.revisionId, now()),
    })),
    bind(contracts.placeOrder, ({ actor, body, idempotencyKey }) =>
      placeOrder(dependencies, actor, body, idempotencyKey),
    ),
    bind(contracts.listOrders, async ({ actor }) => ({ orders: await listOrders(database, actor) })),
    bind(contracts.readOrder, ({ actor, params }) => readOrder(database, actor, params.orderId)),
    bind(contracts.openCheckout, async ({ actor, params }) => ({
      url: await openCheckout(dependencies, actor, params.orderId),
    })),
    bind(contracts.cancelOrder, ({ actor, params, ifMatch }) =>
      cancelOrder(dependencies, actor, params.orderId, ifMatch),
    ),
    bind(contracts.receivePaymentEvent, ({ rawBody, request }) =>
      receivePaymentEvent(dependencies, rawBody, request.get('stripe-signature')),
    ),
    bind(contracts.receiveCuttingCallback, ({ rawBody, request }) =>
      receiveCuttingCallback(dependencies, rawBody, (name) => request.get(name)),
    ),
  ];
}
