import type { Sale as SaleContract, SaleItem as SaleItemContract } from '@foldwright/shared/contracts/sales';
import { addressSchema } from '@foldwright/shared/contracts/storefront';
import * as z from 'zod/mini';
import type { Sale } from '../models/sale';
import type { SaleItem } from '../models/sale-item';
import type { SaleLine } from '../models/sale-line';
import type { Refund } from '../models/refund';
import type { StoredDocument } from '../services/stored-document';

/** What a frozen revision lends to the picture of a piece. */
export interface PictureOf {
  readonly document: StoredDocument;
  readonly materialLabel: string;
}

type Currency = Sale['currency'];

export function presentItem(
  item: SaleItem,
  counts: { readonly short: number; readonly beingCut: number },
  picture: PictureOf | undefined,
): SaleItemContract {
  const { id, lineId, quantity, shipped, reserved, cancelled, returned } = item;
  return { id, lineId, what: whatOf(item, picture), quantity, shipped, reserved, cancelled, returned, ...counts };
}

function whatOf(item: SaleItem, picture: PictureOf | undefined): SaleItemContract['what'] {
  if (item.hardwareId !== null) {
    const { hardwareId, hardwareName, hardwareSpecification } = item;
    return { kind: 'hardware', hardwareId, name: hardwareName ?? '', specification: hardwareSpecification ?? '' };
  }
  const { revisionId, partId, partName, partNumber, letter, hash, hand, finishId } = item;
  if (revisionId === null || partId === null || letter === null || hash === null || picture === undefined) {
    throw new Error(`piece ${item.id} is neither hardware nor a released bracket`);
  }
  return {
    ...{ kind: 'bracket', revisionId, partId, letter, hash, hand: hand ?? 'either', finishId: finishId ?? 'bare' },
    ...{ partName: partName ?? '', partNumber: partNumber ?? '' },
    ...picture,
  };
}

export function presentLine(line: SaleLine, currency: Currency): SaleContract['lines'][number] {
  const { id, title, kind, finishId, quantity, cancelled } = line;
  return {
    ...{ id, title, kind, finishId, quantity, cancelled },
    each: { amountMinor: line.eachMinor, currency },
    total: { amountMinor: line.totalMinor, currency },
    tax: { amountMinor: line.taxMinor, currency },
  };
}

export function presentTotals(sale: Sale): SaleContract['totals'] {
  const money = (amountMinor: number) => ({ amountMinor, currency: sale.currency });
  return {
    items: money(sale.itemsMinor),
    postage: money(sale.postageMinor),
    taxName: sale.taxName,
    taxBasisPoints: sale.taxBasisPoints,
    tax: money(sale.taxMinor),
    total: money(sale.totalMinor),
    refunded: money(sale.refundedMinor),
  };
}

export function presentRefund(refund: Refund, currency: Currency): SaleContract['refunds'][number] {
  const { id, amountMinor, reason, state, problem, askedAt } = refund;
  return { id, amount: { amountMinor, currency }, reason, state, problem, askedAt: askedAt.toISOString() };
}

/** The sale itself, without what hangs on it. */
export function presentHead(
  sale: Sale,
): Pick<
  SaleContract,
  | 'id'
  | 'number'
  | 'state'
  | 'paymentState'
  | 'customerName'
  | 'customerEmail'
  | 'leavesInDays'
  | 'revision'
  | 'placedAt'
  | 'address'
  | 'totals'
> {
  const { id, number, state, paymentState, customerName, customerEmail, leavesInDays, revision } = sale;
  return {
    ...{ id, number, state, paymentState, customerName, customerEmail, leavesInDays, revision },
    placedAt: sale.placedAt.toISOString(),
    address: z.parse(addressSchema, sale.address),
    totals: presentTotals(sale),
  };
}
