import type { Earning } from '@foldwright/shared/contracts/kits';
import type { Money } from '@foldwright/shared/contracts/scalars';
import { includedTaxMinor } from '@foldwright/shared/pricing/included-tax';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import { recordEvent } from '../../events/record-event';
import type { Member } from '../../http/visitor';
import type { Listing } from '../../models/listing';
import type { Part } from '../../models/part';
import { presentHardware } from '../../presenters/stock';
import { recordAudit } from '../record-audit';
import { costOfBracket } from './costs';
import type { ShopMoney } from './selling';
import { sellingOf, shopMoneyOf } from './selling';

async function hardwareOf(scope: WorkshopScope, partId: string): Promise<Earning['hardware']> {
  const rows = await scope.rows.partHardware.list({ where: { partId } });
  const items = await scope.rows.hardwareItems.list({ where: { id: rows.map(({ hardwareId }) => hardwareId) } });
  return rows.flatMap(({ hardwareId, quantity }) => {
    const item = items.find(({ id }) => id === hardwareId);
    return item === undefined ? [] : [{ hardware: presentHardware(item), quantity }];
  });
}

/** What is named twice counts together. */
function merged(hardware: readonly { readonly hardwareId: string; readonly quantity: number }[]): Map<string, number> {
  const counts = new Map<string, number>();
  for (const { hardwareId, quantity } of hardware) counts.set(hardwareId, (counts.get(hardwareId) ?? 0) + quantity);
  return counts;
}

/** Replace the hardware that goes with one bracket of a part. @throws Problem `not-found` */
export function setPartHardware(
  database: Database,
  actor: Member,
  partId: string,
  hardware: readonly { readonly hardwareId: string; readonly quantity: number }[],
): Promise<Earning['hardware']> {
  return database.inWorkshop(actor.workshopId, async (scope) => {
    const part = await scope.rows.parts.get(partId, { lock: true });
    for (const row of await scope.rows.partHardware.list({ where: { partId } })) {
      await scope.rows.partHardware.remove(row);
    }
    for (const [hardwareId, quantity] of merged(hardware)) {
      await scope.rows.hardwareItems.get(hardwareId);
      await scope.rows.partHardware.add({ partId, hardwareId, quantity });
    }
    await recordAudit(scope, actor, 'Changed the hardware that goes with it', `${part.number} ${part.name}`);
    recordEvent(scope, { kind: 'part-changed', partId });
    return hardwareOf(scope, partId);
  });
}

/** What was paid for lines of these listings without tax, less what was cancelled of them. */
async function soldBy(
  scope: WorkshopScope,
  listingIds: readonly string[],
): Promise<{ readonly sold: number; readonly earnedMinor: number }> {
  const lines = await scope.rows.saleLines.list({ where: { listingId: [...listingIds] } });
  const sales = await scope.rows.sales.list({ where: { id: lines.map(({ saleId }) => saleId) } });
  const paid = new Map(
    sales.filter(({ state }) => state !== 'placed' && state !== 'cancelled').map((sale) => [sale.id, sale]),
  );
  let sold = 0;
  let earnedMinor = 0;
  for (const line of lines) {
    const sale = paid.get(line.saleId);
    if (sale === undefined) continue;
    const kept = line.quantity - line.cancelled;
    const returned = await returnedOf(scope, line.id);
    sold += kept - returned;
    const gross = line.eachMinor * (kept - returned);
    earnedMinor += gross - includedTaxMinor(gross, sale.taxBasisPoints);
  }
  return { sold, earnedMinor };
}

async function returnedOf(scope: WorkshopScope, lineId: string): Promise<number> {
  const items = await scope.rows.saleItems.list({ where: { lineId } });
  const bracket = items.find(({ revisionId }) => revisionId !== null);
  return bracket === undefined ? 0 : Math.floor(bracket.returned / bracket.perLine);
}

/** Sum of what goes with one bracket; null when it is in several currencies. @param currency of a sum of nothing */
function sumOfHardware(hardware: Earning['hardware'], currency: Money['currency']): Money | null {
  const currencies = new Set(hardware.map((one) => one.hardware.cost.currency));
  if (currencies.size > 1) return null;
  const amountMinor = hardware.reduce((sum, one) => sum + one.quantity * one.hardware.cost.amountMinor, 0);
  return { amountMinor, currency: [...currencies][0] ?? currency };
}

async function earningOf(
  scope: WorkshopScope,
  part: Part,
  listings: readonly Listing[],
  money: ShopMoney,
): Promise<Earning | null> {
  const revisions = await scope.rows.revisions.list({
    where: { partId: part.id },
    order: [['position', 'DESC']],
    attributes: ['id'],
  });
  const [newest] = revisions;
  if (newest === undefined) return null;
  const own = listings.filter(({ revisionId }) => revisions.some(({ id }) => id === revisionId));
  const published = own.find(({ state }) => state === 'published');
  const cost = await costOfBracket(scope, published?.revisionId ?? newest.id);
  const hardware = await hardwareOf(scope, part.id);
  const { each } = cost;
  const hardwareCost = sumOfHardware(hardware, each?.currency ?? money.currency);
  const whole =
    each !== null && hardwareCost?.currency === each.currency
      ? { amountMinor: each.amountMinor + hardwareCost.amountMinor, currency: each.currency }
      : null;
  const { sold, earnedMinor } = await soldBy(
    scope,
    own.map(({ id }) => id),
  );
  return {
    partId: part.id,
    partName: part.name,
    partNumber: part.number,
    hand: part.hand,
    cost,
    hardware,
    hardwareCost,
    ...sellingOf(money, published?.priceMinor ?? null, whole),
    sold,
    earned: { amountMinor: earnedMinor, currency: money.currency },
  };
}

/** What each released part costs and earns, by number. */
export function listEarnings(database: Database, { workshopId }: Member): Promise<Earning[]> {
  return database.viewWorkshop(workshopId, async (scope) => {
    const listings = await scope.rows.listings.list();
    const money = await shopMoneyOf(scope);
    const earnings: Earning[] = [];
    for (const part of await scope.rows.parts.list({ order: [['number', 'ASC']] })) {
      const earning = await earningOf(scope, part, listings, money);
      if (earning !== null) earnings.push(earning);
    }
    return earnings;
  });
}
