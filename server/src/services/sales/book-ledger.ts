import type { Ledger } from '@foldwright/shared/contracts/ledger';
import { partMinor } from '@foldwright/shared/pricing/included-tax';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Order } from '../../models/order';
import type { Sale } from '../../models/sale';

type Account = Ledger['money']['accounts'][number]['account'];

export interface NewLedgerEntry {
  /** What the entry is about: a second one of the same key is not written. */
  readonly key: string;
  readonly at: Date;
  readonly text: string;
  readonly saleId: string | null;
  readonly orderId: string | null;
  readonly currency: Sale['currency'];
  /** What goes to each account; a debit is above zero, and all of it adds up to nothing. */
  readonly postings: Readonly<Partial<Record<Account, number>>>;
}

/**
 * Write an entry into the books, once. The database refuses postings that don't add up to nothing.
 * @returns whether it was new
 */
export async function bookEntry(scope: WorkshopScope, entry: NewLedgerEntry): Promise<boolean> {
  const { key, at, text, saleId, orderId, currency, postings } = entry;
  const written = await scope.sql(
    `INSERT INTO ledger_entries (id, workshop_id, key, at, text, sale_id, order_id)
     VALUES (gen_random_uuid(), $1, $2, $3, $4, $5, $6) ON CONFLICT (workshop_id, key) DO NOTHING RETURNING id`,
    [scope.workshopId, key, at, text, saleId, orderId],
  );
  if (written.length === 0) return false;
  const row = await scope.rows.ledgerEntries.findOne({ key });
  if (row === null) throw new Error(`ledger entry ${key} was written and is not there`);
  for (const [account, amountMinor] of Object.entries(postings) as [Account, number][]) {
    if (amountMinor === 0) continue;
    await scope.rows.ledgerPostings.add({ entryId: row.id, account, amountMinor, currency });
  }
  return true;
}

const paidKey = (paymentId: string) => `paid:${paymentId}`;

/** A payment of a customer came in. Every payment is booked, one that came twice too: it goes back in an entry of its own. */
export async function bookPayment(scope: WorkshopScope, sale: Sale, paymentId: string, at: Date): Promise<void> {
  const lines = await scope.rows.saleLines.list({ where: { saleId: sale.id } });
  const itemsTax = lines.reduce((sum, line) => sum + line.taxMinor, 0);
  const postageTax = sale.taxMinor - itemsTax;
  await bookEntry(scope, {
    key: paidKey(paymentId),
    at,
    text: `Sale ${sale.number} paid by ${sale.customerName}`,
    saleId: sale.id,
    orderId: null,
    currency: sale.currency,
    postings: {
      'payment-host': sale.totalMinor,
      sales: -(sale.itemsMinor - itemsTax),
      postage: -(sale.postageMinor - postageTax),
      tax: -sale.taxMinor,
    },
  });
}

/**
 * Money went back to a customer. Tax goes back in proportion: what refunds of one payment have taken so far is rounded
 * as a whole, so that a payment that went back whole leaves no cent of tax. A payment that was never booked, because it
 * was of another sum than the sale's, goes back without a word in the books.
 * @param beforeMinor what had gone back of this payment before
 */
export async function bookRefund(
  scope: WorkshopScope,
  sale: Sale,
  refund: { readonly id: string; readonly paymentId: string; readonly amountMinor: number; readonly reason: string },
  beforeMinor: number,
  at: Date,
): Promise<void> {
  if ((await scope.rows.ledgerEntries.findOne({ key: paidKey(refund.paymentId) })) === null) return;
  const taxUpTo = (backMinor: number) => partMinor(sale.taxMinor, backMinor, sale.totalMinor);
  const tax = taxUpTo(beforeMinor + refund.amountMinor) - taxUpTo(beforeMinor);
  await bookEntry(scope, {
    key: `refund:${refund.id}`,
    at,
    text: `Sale ${sale.number}, money back: ${refund.reason}`,
    saleId: sale.id,
    orderId: null,
    currency: sale.currency,
    postings: { refunds: refund.amountMinor - tax, tax, 'payment-host': -refund.amountMinor },
  });
}

/** An order to the cutting service was paid, or its money came back. */
export async function bookCutting(
  scope: WorkshopScope,
  order: Order,
  fact: { readonly kind: 'paid' | 'refunded'; readonly key: string; readonly at: Date },
): Promise<void> {
  const amount = fact.kind === 'paid' ? order.totalMinor : -order.totalMinor;
  const words = fact.kind === 'paid' ? 'paid' : 'money came back';
  await bookEntry(scope, {
    key: `order:${order.id}:${fact.key}`,
    at: fact.at,
    text: `Order ${order.number} to the cutting service, ${words}: ${order.quantity} × ${order.partName}`,
    saleId: null,
    orderId: order.id,
    currency: order.currency,
    postings: { cutting: amount, 'paid-out': -amount },
  });
}
