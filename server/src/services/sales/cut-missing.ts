import type { Sale as SaleContract } from '@foldwright/shared/contracts/sales';
import type { AppDependencies } from '../../app-dependencies';
import type { WorkshopScope } from '../../database/workshop-scope';
import { Problem } from '../../http/problem';
import type { Member } from '../../http/visitor';
import { askForQuote } from '../ask-for-quote';
import { placeOrder } from '../place-order';
import { recordAudit } from '../record-audit';
import { lockShelf } from '../stock/shelf';
import { presentSale } from './assemble-sale';
import { refuseUnlessOpen } from './change-sale';
import { shortItems } from './short-items';
import { tellSale } from './tell-sale';

type Tools = Pick<AppDependencies, 'database' | 'queue' | 'files' | 'cutting' | 'publicUrl' | 'now'>;

/** Brackets of one revision that a sale lacks, whatever their finish: they are cut together. */
interface Missing {
  readonly revisionId: string;
  readonly what: string;
  readonly quantity: number;
}

export interface CutOutcome {
  readonly sale: SaleContract;
  readonly refused: { readonly what: string; readonly reason: string }[];
}

async function missingOf(scope: WorkshopScope, saleId: string): Promise<readonly Missing[]> {
  const byRevision = new Map<string, Missing>();
  for (const { item, missing } of await shortItems(scope, saleId)) {
    if (item.revisionId === null || missing === 0) continue;
    const before = byRevision.get(item.revisionId)?.quantity ?? 0;
    const what = `${item.partName}, revision ${item.letter}`;
    byRevision.set(item.revisionId, { revisionId: item.revisionId, what, quantity: before + missing });
  }
  return [...byRevision.values()];
}

/**
 * Ask the cutting service for a price of every missing bracket of a sale, and place the orders. Each question and each
 * order has a key made from the caller's: pressing again goes on where it broke off and orders nothing twice.
 * @returns the sale, and what the cutting service would not take
 * @throws Problem `not-found`, `wrong-state` when nothing is missing, `service-unreachable` when none could be asked
 */
export async function cutMissing(tools: Tools, actor: Member, saleId: string, key: string): Promise<CutOutcome> {
  const { database } = tools;
  const missing = await database.inWorkshop(actor.workshopId, async (scope) => {
    const sale = await scope.rows.sales.get(saleId);
    refuseUnlessOpen(sale);
    return missingOf(scope, saleId);
  });
  if (missing.length === 0) {
    throw new Problem('wrong-state', {
      detail: 'No bracket of this sale is missing that is not on order already.',
      kept: 'Nothing was ordered.',
    });
  }
  const refused: { what: string; reason: string }[] = [];
  let unreachable: Problem | null = null;
  for (const one of missing) {
    try {
      await cutOne(tools, actor, saleId, one, `${key}:${one.revisionId}`);
    } catch (error) {
      // One bracket that can't be had must not keep the others from being ordered; each is named.
      if (!(error instanceof Problem)) throw error;
      if (error.slug === 'service-unreachable') unreachable = error;
      refused.push({ what: one.what, reason: error.words.detail });
    }
  }
  if (unreachable !== null && refused.length === missing.length) throw unreachable;
  const sale = await database.inWorkshop(actor.workshopId, async (scope) =>
    presentSale(scope, await scope.rows.sales.get(saleId)),
  );
  return { sale, refused };
}

async function cutOne(tools: Tools, actor: Member, saleId: string, one: Missing, key: string): Promise<void> {
  const { revisionId, quantity, what } = one;
  const quote = await askForQuote(tools, actor, { revisionId, stock: 'production', quantities: [quantity] }, key);
  if (quote.state !== 'priced') {
    throw new Problem('service-refused', { detail: quote.refusal ?? 'The cutting service named no price.' });
  }
  const order = await placeOrder(tools, actor, { quoteId: quote.id, quantity }, key);
  await tools.database.inWorkshop(actor.workshopId, async (scope) => {
    await lockShelf(scope);
    const sale = await scope.rows.sales.get(saleId, { lock: true });
    if ((await scope.rows.cutAssignments.count({ orderId: order.id })) > 0) return;
    let left = order.quantity;
    for (const { item, missing } of await shortItems(scope, saleId)) {
      const assigned = item.revisionId === revisionId ? Math.min(left, missing) : 0;
      if (assigned > 0) {
        await scope.rows.cutAssignments.add({ saleId, itemId: item.id, orderId: order.id, quantity: assigned });
      }
      left -= assigned;
    }
    await recordAudit(scope, actor, `Had ${quantity} cut for sale ${sale.number}`, what);
    const details = { what: `${quantity} × ${what}` };
    const fact = { key: `cut-ordered:${order.id}`, kind: 'cut-ordered', at: tools.now(), source: order.id } as const;
    await tellSale(scope, sale, [{ ...fact, details }], tools);
  });
}
