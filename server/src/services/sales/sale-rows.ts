import * as z from 'zod/mini';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { SaleFact as SaleFactRow } from '../../models/sale-fact';
import type { SaleFact } from './sale-state';

const detailsSchema = z.object({
  paymentId: z.exactOptional(z.string()),
  amountMinor: z.exactOptional(z.int()),
  reason: z.exactOptional(z.string()),
  subject: z.exactOptional(z.string()),
  what: z.exactOptional(z.string()),
  parcel: z.exactOptional(z.int()),
  carrier: z.exactOptional(z.string()),
  trackingCode: z.exactOptional(z.string()),
  isWhole: z.exactOptional(z.boolean()),
});

/** A fact as its row tells it. */
export function saleFactOf(row: SaleFactRow): SaleFact {
  const { key, kind, at, source } = row;
  return { key, kind, at, source, details: detailsSchema.parse(row.details) };
}

/** The facts of one sale, read in this transaction. */
export async function readSaleFacts(scope: WorkshopScope, saleId: string): Promise<readonly SaleFact[]> {
  return (await scope.rows.saleFacts.list({ where: { saleId } })).map(saleFactOf);
}
