import type { Sale as SaleContract } from '@foldwright/shared/contracts/sales';
import { saleSchema } from '@foldwright/shared/contracts/sales';
import type { AppDependencies } from '../../app-dependencies';
import type { WorkshopScope } from '../../database/workshop-scope';
import { Problem } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { Sale } from '../../models/sale';
import { once } from '../once';
import { lockShelf } from '../stock/shelf';
import { presentSale } from './assemble-sale';

export type SaleTools = Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now'>;

export interface SaleCall {
  readonly saleId: string;
  /** Id of the route's contract. */
  readonly route: string;
  readonly key: string;
  /** What was asked for; the same key with something else is refused. */
  readonly request: unknown;
  /** Revision that the person saw; null where an older one does no harm. */
  readonly seenRevision: number | null;
}

/**
 * Change a sale, once under the caller's key, with the shelf and the sale's row held.
 * @param work gets the locked row; it tells the sale what happened
 * @throws Problem `not-found`, `stale-row` when something else happened since it was seen
 */
export function changeSale(
  { database }: Pick<SaleTools, 'database'>,
  { workshopId, userId }: Member,
  { saleId, route, key, request, seenRevision }: SaleCall,
  work: (scope: WorkshopScope, sale: Sale) => Promise<void>,
): Promise<SaleContract> {
  return database.inWorkshop(workshopId, (scope) =>
    once(scope, { userId, route, key, request: { saleId, request } }, saleSchema, async () => {
      await lockShelf(scope);
      const sale = await scope.rows.sales.get(saleId, { lock: true });
      if (seenRevision !== null) refuseOldSale(sale, seenRevision);
      await work(scope, sale);
      return presentSale(scope, await scope.rows.sales.get(saleId));
    }),
  );
}

/** @throws Problem `stale-row` */
export function refuseOldSale(sale: Sale, seenRevision: number): void {
  if (sale.revision === seenRevision) return;
  throw new Problem('stale-row', {
    detail: `Something happened to order ${sale.number} since you saw it.`,
    kept: 'The order goes on as it was.',
    next: 'Look at its timeline and decide again.',
  });
}

/** @throws Problem `wrong-state` */
export function refuseUnlessOpen(sale: Sale): void {
  if (sale.state === 'paid' || sale.state === 'partly-shipped') return;
  const words = {
    placed: 'is not paid yet',
    cancelled: 'was cancelled',
    shipped: 'is shipped already',
    delivered: 'is shipped already',
  } as const;
  throw new Problem('wrong-state', {
    detail: `Order ${sale.number} ${words[sale.state as keyof typeof words]}.`,
    kept: 'Nothing was changed.',
  });
}
