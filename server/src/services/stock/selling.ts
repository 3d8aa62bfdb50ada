import type { Kit } from '@foldwright/shared/contracts/kits';
import type { Money } from '@foldwright/shared/contracts/scalars';
import { includedTaxMinor } from '@foldwright/shared/pricing/included-tax';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Shop } from '../../models/shop';

/** What a sum in the shop rests on. */
export type ShopMoney = Pick<Shop, 'currency' | 'taxBasisPoints'>;

/** Money of the workshop's shop; of one that nobody has set up yet, the defaults. */
export async function shopMoneyOf(scope: WorkshopScope): Promise<ShopMoney> {
  return (await scope.rows.shops.findOne({})) ?? { currency: 'EUR', taxBasisPoints: 0 };
}

/**
 * A price without the tax in it, and what it leaves of what the thing costs.
 * @param priceMinor price with tax; null when it isn't sold by itself
 */
export function sellingOf(
  { currency, taxBasisPoints }: ShopMoney,
  priceMinor: number | null,
  cost: Money | null,
): Pick<Kit, 'price' | 'margin'> {
  if (priceMinor === null) return { price: null, margin: null };
  const price = { amountMinor: priceMinor - includedTaxMinor(priceMinor, taxBasisPoints), currency };
  const isComparable = cost !== null && cost.currency === currency;
  return { price, margin: isComparable ? { amountMinor: price.amountMinor - cost.amountMinor, currency } : null };
}
