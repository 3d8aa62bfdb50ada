import type { WorkshopScope } from '../../database/workshop-scope';
import type { SaleItem } from '../../models/sale-item';
import { shortOf } from './reserve';

/** A piece that is sold and paid for and not there. */
export interface ShortItem {
  readonly item: SaleItem;
  /** Neither sent nor kept for the sale. */
  readonly short: number;
  /** Of those, what the cutting service is making for it. */
  readonly beingCut: number;
  /** What nobody is doing anything about yet. */
  readonly missing: number;
}

/** How many of each piece the cutting service is making, by id of the piece: ordered for it, not ended early, not arrived. */
export async function beingCutOf(
  scope: WorkshopScope,
  saleIds: readonly string[],
): Promise<ReadonlyMap<string, number>> {
  const assignments = await scope.rows.cutAssignments.list({ where: { saleId: [...saleIds] } });
  const orders = await scope.rows.orders.list({ where: { id: assignments.map(({ orderId }) => orderId) } });
  const ended = new Set(orders.filter(({ state }) => state === 'refused' || state === 'cancelled').map(({ id }) => id));
  const counts = new Map<string, number>();
  for (const { itemId, orderId, quantity, arrived } of assignments) {
    if (!ended.has(orderId)) counts.set(itemId, (counts.get(itemId) ?? 0) + quantity - arrived);
  }
  return counts;
}

/** Pieces of paid sales that are not there, the oldest sale first. */
export async function shortItems(scope: WorkshopScope, saleId?: string): Promise<readonly ShortItem[]> {
  const sales = await scope.rows.sales.list({
    where: { state: ['paid', 'partly-shipped'], ...(saleId === undefined ? {} : { id: saleId }) },
    order: [['number', 'ASC']],
  });
  const ids = sales.map(({ id }) => id);
  const items = await scope.rows.saleItems.list({ where: { saleId: ids }, order: [['position', 'ASC']] });
  const cut = await beingCutOf(scope, ids);
  const rank = new Map(ids.map((id, at) => [id, at]));
  return items
    .filter((item) => shortOf(item) > 0)
    .sort((a, b) => (rank.get(a.saleId) ?? 0) - (rank.get(b.saleId) ?? 0) || a.position - b.position)
    .map((item) => {
      const short = shortOf(item);
      const beingCut = Math.min(short, cut.get(item.id) ?? 0);
      return { item, short, beingCut, missing: short - beingCut };
    });
}
