import { Injectable, inject } from '@angular/core';
import {
  type Order,
  type Quote,
  askForQuote,
  cancelOrder,
  listOrders,
  listQuotes,
  openCheckout,
  placeOrder,
  readOrder,
} from '@foldwright/shared/contracts/orders';
import type { StockRole } from '@foldwright/shared/part/part-document';
import { ApiClient, type ApiRead, newIdempotencyKey } from './api-client';

/** Quotes of the cutting service, orders and their payment. */
@Injectable({ providedIn: 'root' })
export class OrdersApi {
  private readonly client = inject(ApiClient);

  quotes(revisionId: () => string | undefined): ApiRead<{ quotes: Quote[] }> {
    return this.client.read(listQuotes, () => {
      const id = revisionId();
      return id === undefined ? undefined : { params: { revisionId: id } };
    });
  }

  askForQuote(
    revisionId: string,
    stock: StockRole,
    quantities: readonly number[],
    idempotencyKey = newIdempotencyKey(),
  ): Promise<Quote> {
    const body = { stock, quantities: [...quantities] };
    return this.client.call(askForQuote, { params: { revisionId }, body, idempotencyKey });
  }

  place(quoteId: string, quantity: number, idempotencyKey = newIdempotencyKey()): Promise<Order> {
    return this.client.call(placeOrder, { body: { quoteId, quantity }, idempotencyKey });
  }

  list(): ApiRead<{ orders: Order[] }> {
    return this.client.read(listOrders, () => ({}));
  }

  order(orderId: () => string | undefined): ApiRead<Order> {
    return this.client.read(readOrder, () => {
      const id = orderId();
      return id === undefined ? undefined : { params: { orderId: id } };
    });
  }

  /** Opens the payment host's page and answers its address. */
  async openCheckout(orderId: string, idempotencyKey = newIdempotencyKey()): Promise<string> {
    return (await this.client.call(openCheckout, { params: { orderId }, idempotencyKey })).url;
  }

  cancel(orderId: string, revision: number): Promise<Order> {
    return this.client.call(cancelOrder, { params: { orderId }, ifMatch: revision });
  }
}
