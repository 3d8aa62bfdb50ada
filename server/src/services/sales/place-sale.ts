import { createHash, randomBytes } from 'node:crypto';
import type { CartLine, PostalAddress } from '@foldwright/shared/contracts/storefront';
import { canonicalJson } from '@foldwright/shared/part/canonical-json';
import * as z from 'zod/mini';
import type { AppDependencies } from '../../app-dependencies';
import type { WorkshopScope } from '../../database/workshop-scope';
import { Problem, notFound } from '../../http/problem';
import type { Visitor } from '../../http/visitor';
import type { Sale } from '../../models/sale';
import type { MadeOffer, OfferedLine } from '../shop/offer';
import { makeOffer } from '../shop/offer';
import { shopOf } from '../shop/settings';
import { lockShelf } from '../stock/shelf';
import { findAnyShop } from './find-by-link';
import { reserveForSale } from './reserve';
import { tellSale } from './tell-sale';

export interface SaleWish {
  readonly lines: readonly CartLine[];
  /** Names the offer that the buyer saw. */
  readonly offerHash: string;
  readonly email: string;
  readonly address: PostalAddress;
}

type Tools = Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now'>;

const FIRST_NUMBER = 1001;
/** Largest sum that a payment page takes, minor units: eight digits, as card networks have it. */
const LARGEST_TOTAL_MINOR = 99_999_999;
/** How long what is on the shelf is kept for somebody who has not paid. */
const KEPT_FOR_S = 60 * 60;
const numberRow = z.tuple([z.object({ next: z.int() })]);
const hashOf = (wish: SaleWish): string => createHash('sha256').update(canonicalJson(wish)).digest('hex');

/**
 * Order what was offered. What is on the shelf is kept for the buyer from now on; whoever comes second at the last bracket
 * is offered anew. Nobody pays what they did not see.
 * @param key made by the browser for this one order: pressing twice gives one order
 * @returns number and private link of the order
 * @throws Problem `not-found`, `offer-changed` with the offer as it is now, `already-exists` for a key used otherwise,
 *   `wrong-state` for a sum that can't be paid in one go
 */
export async function placeSale(
  tools: Tools,
  visitor: Visitor,
  shopSlug: string,
  wish: SaleWish,
  key: string,
): Promise<{ readonly number: number; readonly link: string }> {
  const { workshopId } = await findAnyShop(tools.database, shopSlug);
  return tools.database.inWorkshop(workshopId, async (scope) => {
    // Also what makes a second press of the same button wait for the first.
    await lockShelf(scope);
    const known = await scope.rows.sales.findOne({ idempotencyKey: key });
    if (known !== null) return sameAgain(known, wish);
    // Asked only now: whoever ordered before the shop closed, and lost the answer, still gets it.
    if (!(await shopOf(scope)).isOpen) throw notFound();
    const made = await makeOffer(scope, wish.lines);
    refuseOtherOffer(made, wish.offerHash);
    refuseTooMuch(made);
    const sale = await addSale(scope, visitor, wish, made, key, tools.now());
    const promised = made.lines.map(({ line }) => line.fromShelf);
    await reserveForSale(scope, sale, promised, tools.now());
    const { workshopId: id, transaction } = scope;
    const expiry = { task: 'expire', workshopId: id, saleId: sale.id };
    await tools.queue.enqueue(transaction, 'sale', expiry, { startAfterSeconds: KEPT_FOR_S });
    const placed = { key: 'placed', kind: 'placed', at: sale.placedAt, source: sale.id, details: {} } as const;
    await tellSale(scope, sale, [placed], tools);
    return { number: sale.number, link: sale.link };
  });
}

function sameAgain(sale: Sale, wish: SaleWish): { readonly number: number; readonly link: string } {
  if (sale.requestHash === hashOf(wish)) return { number: sale.number, link: sale.link };
  throw new Problem('already-exists', {
    detail: 'This key was used for another order before.',
    next: 'Send a new Idempotency-Key.',
  });
}

function refuseOtherOffer({ offer }: MadeOffer, seenHash: string): void {
  if (offer.offerHash === seenHash && offer.lines.length > 0 && offer.gone.length === 0) return;
  throw new Problem('offer-changed', {
    detail: 'Since you looked, a price changed, something was sold, or is no longer offered.',
    kept: 'Nothing was ordered and nothing charged. Your cart is as it was.',
    next: 'Look at what changed, then order again.',
    extra: { offer },
  });
}

function refuseTooMuch({ offer }: MadeOffer): void {
  if (offer.total.amountMinor <= LARGEST_TOTAL_MINOR) return;
  throw new Problem('wrong-state', {
    detail: 'That is more than can be paid in one go.',
    kept: 'Nothing was ordered and nothing charged. Your cart is as it was.',
    next: 'Order fewer, or ask the workshop.',
  });
}

async function addSale(
  scope: WorkshopScope,
  visitor: Visitor,
  wish: SaleWish,
  { offer, lines }: MadeOffer,
  key: string,
  now: Date,
): Promise<Sale> {
  // Under the shelf's lock, so numbers have no gaps and none comes twice.
  const [{ next }] = numberRow.parse(
    await scope.sql('SELECT COALESCE(MAX(number) + 1, $2) AS next FROM sales WHERE workshop_id = $1', [
      scope.workshopId,
      FIRST_NUMBER,
    ]),
  );
  const sale = await scope.rows.sales.add({
    number: next,
    link: randomBytes(32).toString('base64url'),
    idempotencyKey: key,
    requestHash: hashOf(wish),
    customerId: visitor.user?.id ?? null,
    customerName: wish.address.name,
    customerEmail: wish.email.trim().toLowerCase(),
    address: wish.address,
    currency: offer.total.currency,
    itemsMinor: offer.items.amountMinor,
    postageMinor: offer.postage.amountMinor,
    taxName: offer.taxName,
    taxBasisPoints: offer.taxBasisPoints,
    taxMinor: offer.tax.amountMinor,
    totalMinor: offer.total.amountMinor,
    leavesInDays: Math.max(...offer.lines.map(({ leavesInDays }) => leavesInDays)),
    state: 'placed',
    paymentState: 'open',
    revision: 0,
    placedAt: now,
  });
  let position = 0;
  for (const [at, line] of lines.entries()) position = await addLine(scope, sale, line, at, position);
  return sale;
}

/** A line with everything in it, frozen as it is sold. @returns where the next piece stands */
async function addLine(
  scope: WorkshopScope,
  sale: Sale,
  { listing, pieces, line }: OfferedLine,
  at: number,
  firstPosition: number,
): Promise<number> {
  const { finishId, quantity, title } = line;
  const row = await scope.rows.saleLines.add({
    saleId: sale.id,
    position: at,
    listingId: listing.id,
    kind: listing.kitId === null ? 'bracket' : 'kit',
    title,
    finishId,
    fittingSteps: listing.fittingSteps,
    quantity,
    eachMinor: line.each.amountMinor,
    totalMinor: line.total.amountMinor,
    taxMinor: line.tax.amountMinor,
  });
  let position = firstPosition;
  for (const piece of pieces) {
    const counts = { saleId: sale.id, lineId: row.id, position, perLine: piece.quantity };
    const total = { ...counts, quantity: piece.quantity * quantity };
    if (piece.kind === 'hardware') {
      const { hardwareId, name, specification } = piece;
      await scope.rows.saleItems.add({
        ...total,
        hardwareId,
        hardwareName: name,
        hardwareSpecification: specification,
      });
    } else {
      const { revisionId, partId, partName, partNumber, letter, hash, hand } = piece;
      const frozen = { revisionId, partId, partName, partNumber, letter, hash, hand };
      await scope.rows.saleItems.add({ ...total, ...frozen, finishId: piece.finishId ?? finishId });
    }
    position += 1;
  }
  return position;
}
