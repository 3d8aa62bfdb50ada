import { quoteBreakSchema } from '@foldwright/shared/contracts/orders';
import type { Money } from '@foldwright/shared/contracts/scalars';
import type { Kit } from '@foldwright/shared/contracts/kits';
import { eachMinor } from '@foldwright/shared/pricing/price-lines';
import * as z from 'zod/mini';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { KitLine } from '../../models/kit-line';

/** What one of something costs the workshop, and where the figure comes from. */
export type Cost = Kit['cost'];

const day = (at: Date) => at.toISOString().slice(0, 10);
const PAID_FOR = ['paid', 'accepted', 'cutting', 'bending', 'shipped'] as const;

/**
 * What one bracket of a revision costs in its production sheet: by the newest order that was paid, else by the newest
 * price of the cutting service at its smallest quantity. Coating is not in it: no service of ours prices that.
 */
export async function costOfBracket(scope: WorkshopScope, revisionId: string): Promise<Cost> {
  const order = await scope.rows.orders.findOne(
    { revisionId, stock: 'production', state: [...PAID_FOR] },
    { order: [['number', 'DESC']] },
  );
  if (order !== null) {
    const total = { amountMinor: order.totalMinor, currency: order.currency };
    return {
      each: { amountMinor: eachMinor({ quantity: order.quantity, total }), currency: order.currency },
      source: `order ${order.number} of ${day(order.placedAt)}, ${order.quantity} off`,
    };
  }
  const quote = await scope.rows.quotes.findOne(
    { revisionId, stock: 'production', state: 'priced' },
    { order: [['askedAt', 'DESC']] },
  );
  const breaks = quote === null ? [] : z.parse(z.array(quoteBreakSchema), quote.breaks);
  const smallest = breaks.reduce<(typeof breaks)[number] | null>(
    (least, row) => (least === null || row.quantity < least.quantity ? row : least),
    null,
  );
  if (quote === null || smallest === null) return { each: null, source: 'no price of the cutting service yet' };
  return {
    each: { amountMinor: eachMinor(smallest), currency: smallest.total.currency },
    source: `quote of ${day(quote.askedAt)}, ${smallest.quantity} off`,
  };
}

/** What is counted in one sum: so many of something at a cost each. */
interface CostLine {
  readonly what: string;
  readonly quantity: number;
  readonly cost: Cost;
}

/** Sum of costs; null as soon as one is unknown or in another currency, and the words say which. */
export function sumOfCosts(lines: readonly CostLine[]): Cost {
  const unknown = lines.filter(({ cost }) => cost.each === null).map(({ what }) => what);
  if (unknown.length > 0) return { each: null, source: `no price yet: ${unknown.join(', ')}` };
  const amounts = lines.flatMap(({ quantity, cost }): Money[] =>
    cost.each === null ? [] : [{ ...cost.each, amountMinor: cost.each.amountMinor * quantity }],
  );
  const [first] = amounts;
  if (first === undefined) return { each: null, source: 'nothing is in it yet' };
  if (amounts.some(({ currency }) => currency !== first.currency)) {
    return { each: null, source: 'its costs are in different currencies' };
  }
  const amountMinor = amounts.reduce((sum, amount) => sum + amount.amountMinor, 0);
  return {
    each: { amountMinor, currency: first.currency },
    source: 'brackets by their newest price, hardware as entered',
  };
}

/** What hardware adds: so many of each. */
export async function hardwareCostLines(
  scope: WorkshopScope,
  lines: readonly { readonly hardwareId: string; readonly quantity: number }[],
): Promise<readonly CostLine[]> {
  const items = await scope.rows.hardwareItems.list({ where: { id: lines.map(({ hardwareId }) => hardwareId) } });
  return lines.flatMap(({ hardwareId, quantity }): CostLine[] => {
    const item = items.find(({ id }) => id === hardwareId);
    if (item === undefined) return [];
    const each = { amountMinor: item.costMinor, currency: item.currency };
    return [{ what: item.name, quantity, cost: { each, source: 'as entered' } }];
  });
}

/** What one bracket costs together with the hardware that goes with its part. */
export async function costOfBracketSold(scope: WorkshopScope, revisionId: string, partId: string): Promise<Cost> {
  const hardware = await scope.rows.partHardware.list({ where: { partId } });
  const bracket = await costOfBracket(scope, revisionId);
  if (hardware.length === 0) return bracket;
  return sumOfCosts([
    { what: 'the bracket', quantity: 1, cost: bracket },
    ...(await hardwareCostLines(scope, hardware)),
  ]);
}

/** What one kit costs by its bill of materials. */
export async function costOfKit(scope: WorkshopScope, lines: readonly KitLine[]): Promise<Cost> {
  const brackets: CostLine[] = [];
  const hardware: { hardwareId: string; quantity: number }[] = [];
  for (const { revisionId, hardwareId, quantity } of lines) {
    if (hardwareId !== null) hardware.push({ hardwareId, quantity });
    if (revisionId === null) continue;
    const revision = await scope.rows.revisions.get(revisionId);
    const part = await scope.rows.parts.get(revision.partId);
    brackets.push({ what: part.name, quantity, cost: await costOfBracket(scope, revisionId) });
  }
  return sumOfCosts([...brackets, ...(await hardwareCostLines(scope, hardware))]);
}
