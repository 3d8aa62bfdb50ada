import { Injectable, inject } from '@angular/core';
import { type Ledger, readLedger } from '@foldwright/shared/contracts/ledger';
import { type Question, answerQuestion, listQuestions } from '@foldwright/shared/contracts/questions';
import type { RouteBody, RouteResponse } from '@foldwright/shared/contracts/route';
import {
  type Sale,
  cancelSale,
  cutMissing,
  listBuyers,
  listSales,
  markDelivered,
  readInvoice,
  readPackingSlip,
  readSale,
  recordReturn,
  refundSale,
  retryRefund,
  shipSale,
} from '@foldwright/shared/contracts/sales';
import {
  type Listing,
  type ListingInput,
  type ShopSettings,
  type ShopSettingsInput,
  addListingPhoto,
  changeListing,
  changeShopSettings,
  createListing,
  listListings,
  readListing,
  readShopSettings,
  removeListingPhoto,
  setListingState,
} from '@foldwright/shared/contracts/shop';
import type { Observable } from 'rxjs';
import { ApiClient, type ApiRead, type UploadProgress } from './api-client';

/** The workshop's side of its shop: sales, listings, questions, settings and the books. */
@Injectable({ providedIn: 'root' })
export class ShopDeskApi {
  private readonly client = inject(ApiClient);

  sales(): ApiRead<RouteResponse<typeof listSales>> {
    return this.client.read(listSales, () => ({}));
  }

  sale(saleId: () => string): ApiRead<Sale> {
    return this.client.read(readSale, () => ({ params: { saleId: saleId() } }));
  }

  cutMissing(saleId: string, idempotencyKey: string): Promise<RouteResponse<typeof cutMissing>> {
    return this.client.call(cutMissing, { params: { saleId }, idempotencyKey });
  }

  ship(sale: Sale, body: RouteBody<typeof shipSale>, idempotencyKey: string): Promise<Sale> {
    const { id: saleId, revision: ifMatch } = sale;
    return this.client.call(shipSale, { params: { saleId }, body, ifMatch, idempotencyKey });
  }

  markDelivered(saleId: string, shipmentId: string): Promise<Sale> {
    return this.client.call(markDelivered, { params: { saleId, shipmentId } });
  }

  cancel(sale: Sale, body: RouteBody<typeof cancelSale>, idempotencyKey: string): Promise<Sale> {
    const { id: saleId, revision: ifMatch } = sale;
    return this.client.call(cancelSale, { params: { saleId }, body, ifMatch, idempotencyKey });
  }

  refund(saleId: string, body: RouteBody<typeof refundSale>, idempotencyKey: string): Promise<Sale> {
    return this.client.call(refundSale, { params: { saleId }, body, idempotencyKey });
  }

  retryRefund(saleId: string, refundId: string): Promise<Sale> {
    return this.client.call(retryRefund, { params: { saleId, refundId } });
  }

  takeBack(sale: Sale, body: RouteBody<typeof recordReturn>, idempotencyKey: string): Promise<Sale> {
    const { id: saleId, revision: ifMatch } = sale;
    return this.client.call(recordReturn, { params: { saleId }, body, ifMatch, idempotencyKey });
  }

  packingSlipUrl(saleId: string, shipmentId: string): string {
    return this.client.url(readPackingSlip, { params: { saleId, shipmentId } });
  }

  invoiceUrl(saleId: string): string {
    return this.client.url(readInvoice, { params: { saleId } });
  }

  buyers(revisionId: () => string | undefined): ApiRead<RouteResponse<typeof listBuyers>> {
    return this.client.read(listBuyers, () => {
      const id = revisionId();
      return id === undefined ? undefined : { params: { revisionId: id } };
    });
  }

  books(): ApiRead<Ledger> {
    return this.client.read(readLedger, () => ({}));
  }

  settings(): ApiRead<ShopSettings> {
    return this.client.read(readShopSettings, () => ({}));
  }

  changeSettings(body: ShopSettingsInput, revision: number): Promise<ShopSettings> {
    return this.client.call(changeShopSettings, { body, ifMatch: revision });
  }

  listings(): ApiRead<{ listings: Listing[] }> {
    return this.client.read(listListings, () => ({}));
  }

  listing(listingId: () => string | undefined): ApiRead<Listing> {
    return this.client.read(readListing, () => {
      const id = listingId();
      return id === undefined ? undefined : { params: { listingId: id } };
    });
  }

  addListing(body: ListingInput, idempotencyKey: string): Promise<Listing> {
    return this.client.call(createListing, { body, idempotencyKey });
  }

  changeListing(listingId: string, body: ListingInput, revision: number): Promise<Listing> {
    return this.client.call(changeListing, { params: { listingId }, body, ifMatch: revision });
  }

  setListingState(listing: Listing, state: 'published' | 'withdrawn'): Promise<Listing> {
    const params = { listingId: listing.id };
    return this.client.call(setListingState, { params, body: { state }, ifMatch: listing.revision });
  }

  addPhoto(listingId: string, description: string, file: File): Observable<UploadProgress<Listing>> {
    return this.client.upload(addListingPhoto, { params: { listingId }, body: { description } }, file);
  }

  removePhoto(listingId: string, listingPhotoId: string): Promise<Listing> {
    return this.client.call(removeListingPhoto, { params: { listingId, listingPhotoId } });
  }

  questions(): ApiRead<{ questions: Question[] }> {
    return this.client.read(listQuestions, () => ({}));
  }

  answer(questionId: string, text: string, idempotencyKey: string): Promise<Question> {
    return this.client.call(answerQuestion, { params: { questionId }, body: { text }, idempotencyKey });
  }
}
