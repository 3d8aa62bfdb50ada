import { Injectable, inject } from '@angular/core';
import {
  type Kit,
  type KitInput,
  changeKit,
  createKit,
  listEarnings,
  listKits,
  setPartHardware,
} from '@foldwright/shared/contracts/kits';
import type { RouteBody, RouteResponse } from '@foldwright/shared/contracts/route';
import {
  type Hand,
  type HardwareInput,
  type HardwareItem,
  adjustStock,
  changeHardware,
  createHardware,
  listReleasedBrackets,
  listStock,
  listStockMoves,
  makeOtherHand,
  receiveStock,
  setPartHand,
} from '@foldwright/shared/contracts/stock';
import { ApiClient, type ApiRead } from './api-client';

export type Receipt = RouteBody<typeof receiveStock>;

/** Shelf, hardware, kits, hands, and what parts cost and earn. */
@Injectable({ providedIn: 'root' })
export class StockApi {
  private readonly client = inject(ApiClient);

  stock(): ApiRead<RouteResponse<typeof listStock>> {
    return this.client.read(listStock, () => ({}));
  }

  moves(positionId: () => string | null): ApiRead<RouteResponse<typeof listStockMoves>> {
    return this.client.read(listStockMoves, () => {
      const id = positionId();
      return id === null ? undefined : { params: { positionId: id } };
    });
  }

  receive(body: Receipt, idempotencyKey: string): Promise<RouteResponse<typeof receiveStock>> {
    return this.client.call(receiveStock, { body, idempotencyKey });
  }

  adjust(
    positionId: string,
    change: number,
    reason: string,
    idempotencyKey: string,
  ): Promise<RouteResponse<typeof adjustStock>> {
    return this.client.call(adjustStock, { params: { positionId }, body: { change, reason }, idempotencyKey });
  }

  brackets(): ApiRead<RouteResponse<typeof listReleasedBrackets>> {
    return this.client.read(listReleasedBrackets, () => ({}));
  }

  addHardware(body: HardwareInput, idempotencyKey: string): Promise<HardwareItem> {
    return this.client.call(createHardware, { body, idempotencyKey });
  }

  changeHardware(hardwareId: string, body: HardwareInput, revision: number): Promise<HardwareItem> {
    return this.client.call(changeHardware, { params: { hardwareId }, body, ifMatch: revision });
  }

  kits(): ApiRead<RouteResponse<typeof listKits>> {
    return this.client.read(listKits, () => ({}));
  }

  addKit(body: KitInput, idempotencyKey: string): Promise<Kit> {
    return this.client.call(createKit, { body, idempotencyKey });
  }

  changeKit(kitId: string, body: KitInput, revision: number): Promise<Kit> {
    return this.client.call(changeKit, { params: { kitId }, body, ifMatch: revision });
  }

  earnings(): ApiRead<RouteResponse<typeof listEarnings>> {
    return this.client.read(listEarnings, () => ({}));
  }

  setPartHardware(partId: string, hardware: RouteBody<typeof setPartHardware>['hardware']): Promise<unknown> {
    return this.client.call(setPartHardware, { params: { partId }, body: { hardware } });
  }

  setHand(partId: string, hand: Hand): Promise<RouteResponse<typeof setPartHand>> {
    return this.client.call(setPartHand, { params: { partId }, body: { hand } });
  }

  makeOtherHand(partId: string, name: string, idempotencyKey: string): Promise<RouteResponse<typeof makeOtherHand>> {
    return this.client.call(makeOtherHand, { params: { partId }, body: { name }, idempotencyKey });
  }
}
