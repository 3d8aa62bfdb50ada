import { Injectable, inject } from '@angular/core';
import { type Question, askMoreByLink, askShop, readQuestionByLink } from '@foldwright/shared/contracts/questions';
import type { RouteBody, RouteResponse } from '@foldwright/shared/contracts/route';
import {
  type CustomerOrder,
  askByLink,
  cancelSaleByLink,
  listPurchases,
  openSaleCheckout,
  readFittingSheet,
  readInvoiceByLink,
  readSaleByLink,
} from '@foldwright/shared/contracts/sale-links';
import {
  type CartLine,
  type Offer,
  type ShopFront,
  type ShopListing,
  offerSchema,
  placeSale,
  priceCart,
  readShop,
  readShopListing,
  readShopPhoto,
  searchShop,
} from '@foldwright/shared/contracts/storefront';
import * as z from 'zod/mini';
import { ApiClient, type ApiRead, newIdempotencyKey } from './api-client';
import type { ApiProblem } from './api-problem';

const changedOffer = z.object({ offer: offerSchema });

/** What anybody may see and do in a workshop's shop, and behind the private link of an order or a question. */
@Injectable({ providedIn: 'root' })
export class StorefrontApi {
  private readonly client = inject(ApiClient);

  front(shop: () => string): ApiRead<ShopFront> {
    return this.client.read(readShop, () => ({ params: { shop: shop() } }));
  }

  search(
    shop: () => string,
    words: () => string,
    kind: () => 'bracket' | 'kit' | undefined,
  ): ApiRead<RouteResponse<typeof searchShop>> {
    return this.client.read(searchShop, () => {
      const query = {
        ...(words() === '' ? {} : { words: words() }),
        ...(kind() === undefined ? {} : { kind: kind() }),
      };
      return { params: { shop: shop() }, query };
    });
  }

  listing(shop: () => string, listing: () => string): ApiRead<ShopListing> {
    return this.client.read(readShopListing, () => ({ params: { shop: shop(), listing: listing() } }));
  }

  photoUrl(shop: string, photoId: string): string {
    return this.client.url(readShopPhoto, { params: { shop, photoId } });
  }

  price(shop: string, lines: readonly CartLine[]): Promise<Offer> {
    return this.client.call(priceCart, { params: { shop }, body: { lines: [...lines] } });
  }

  place(
    shop: string,
    body: RouteBody<typeof placeSale>,
    idempotencyKey: string,
  ): Promise<RouteResponse<typeof placeSale>> {
    return this.client.call(placeSale, { params: { shop }, body, idempotencyKey });
  }

  /** The offer as it is now, of a problem that says it changed; null for any other. */
  offerOf(problem: ApiProblem): Offer | null {
    return problem.slug === 'offer-changed' ? (problem.extra(changedOffer)?.offer ?? null) : null;
  }

  order(link: () => string): ApiRead<CustomerOrder> {
    return this.client.read(readSaleByLink, () => ({ params: { link: link() } }));
  }

  /** Opens the payment host's page and answers its address. */
  async openCheckout(link: string, idempotencyKey: string): Promise<string> {
    return (await this.client.call(openSaleCheckout, { params: { link }, idempotencyKey })).url;
  }

  cancel(link: string, revision: number): Promise<CustomerOrder> {
    return this.client.call(cancelSaleByLink, { params: { link }, ifMatch: revision });
  }

  askOnOrder(link: string, text: string, idempotencyKey: string): Promise<CustomerOrder> {
    return this.client.call(askByLink, { params: { link }, body: { text }, idempotencyKey });
  }

  fittingSheetUrl(link: string): string {
    return this.client.url(readFittingSheet, { params: { link } });
  }

  invoiceUrl(link: string): string {
    return this.client.url(readInvoiceByLink, { params: { link } });
  }

  async ask(shop: string, body: RouteBody<typeof askShop>, idempotencyKey: string): Promise<string> {
    return (await this.client.call(askShop, { params: { shop }, body, idempotencyKey })).link;
  }

  question(link: () => string): ApiRead<RouteResponse<typeof readQuestionByLink>> {
    return this.client.read(readQuestionByLink, () => ({ params: { link: link() } }));
  }

  askMore(link: string, text: string, idempotencyKey = newIdempotencyKey()): Promise<Question> {
    return this.client.call(askMoreByLink, { params: { link }, body: { text }, idempotencyKey });
  }

  purchases(): ApiRead<RouteResponse<typeof listPurchases>> {
    return this.client.read(listPurchases, () => ({}));
  }
}
