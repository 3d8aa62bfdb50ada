import type { CustomerOrder, listPurchases as purchasesContract } from '@foldwright/shared/contracts/sale-links';
import type {
  listBuyers as buyersContract,
  Sale as SaleContract,
  SaleSummary,
} from '@foldwright/shared/contracts/sales';
import { SALE_STATES } from '@foldwright/shared/contracts/sales';
import type { RouteResponse } from '@foldwright/shared/contracts/route';
import { currency } from '@foldwright/shared/contracts/scalars';
import { QueryTypes } from 'sequelize';
import * as z from 'zod/mini';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Member } from '../../http/visitor';
import type { Sale } from '../../models/sale';
import { presentCustomerOrder, presentSale } from './assemble-sale';
import { findSaleByLink } from './find-by-link';
import { shortItems } from './short-items';

/** What is left to be done comes first, then the newest. */
const RANK = { paid: 0, 'partly-shipped': 0, placed: 1, shipped: 2, delivered: 2, cancelled: 3 } as const;
const LONGEST_LIST = 500;

const wordsOf = (lines: readonly { readonly quantity: number; readonly title: string }[]): string =>
  lines.map(({ quantity, title }) => `${quantity} × ${title}`).join(', ');

/** Sales, what has to be done first. */
export function listSales(database: Database, { workshopId }: Member): Promise<SaleSummary[]> {
  return database.viewWorkshop(workshopId, async (scope) => {
    const sales = await scope.rows.sales.list({ order: [['number', 'DESC']], limit: LONGEST_LIST });
    const ids = sales.map(({ id }) => id);
    const lines = await scope.rows.saleLines.list({ where: { saleId: ids }, order: [['position', 'ASC']] });
    const open = await scope.rows.questions.list({ where: { saleId: ids, isAnswered: false } });
    const short = await shortItems(scope);
    const rank = (sale: Sale) => RANK[sale.state as SaleContract['state']];
    return [...sales]
      .sort((a, b) => rank(a) - rank(b) || b.number - a.number)
      .map((sale) => ({
        id: sale.id,
        number: sale.number,
        customerName: sale.customerName,
        placedAt: sale.placedAt.toISOString(),
        state: sale.state,
        paymentState: sale.paymentState,
        what: wordsOf(lines.filter(({ saleId }) => saleId === sale.id)),
        total: { amountMinor: sale.totalMinor, currency: sale.currency },
        short: short.filter(({ item }) => item.saleId === sale.id).reduce((sum, { missing }) => sum + missing, 0),
        unanswered: open.filter(({ saleId }) => saleId === sale.id).length,
      }));
  });
}

/** @throws Problem `not-found` */
export function readSale(database: Database, { workshopId }: Member, saleId: string): Promise<SaleContract> {
  return database.inWorkshop(workshopId, async (scope) => presentSale(scope, await scope.rows.sales.get(saleId)));
}

/** A customer's order behind its link. @throws Problem `not-found` */
export async function readSaleByLink(database: Database, link: string): Promise<CustomerOrder> {
  const { workshopId, saleId } = await findSaleByLink(database, link);
  return database.inWorkshop(workshopId, async (scope) =>
    presentCustomerOrder(scope, await scope.rows.sales.get(saleId)),
  );
}

type Buyers = RouteResponse<typeof buyersContract>['buyers'];

/** Everybody who bought this very revision, alone or in a kit, the newest first. @throws Problem `not-found` */
export function listBuyers(database: Database, { workshopId }: Member, revisionId: string): Promise<Buyers> {
  return database.viewWorkshop(workshopId, async (scope) => {
    const revision = await scope.rows.revisions.get(revisionId);
    return buyersOf(scope, revision.id);
  });
}

async function buyersOf(scope: WorkshopScope, revisionId: string): Promise<Buyers> {
  const items = await scope.rows.saleItems.list({ where: { revisionId } });
  const sales = await scope.rows.sales.list({
    where: { id: items.map(({ saleId }) => saleId) },
    order: [['number', 'DESC']],
  });
  const lines = await scope.rows.saleLines.list({ where: { id: items.map(({ lineId }) => lineId) } });
  return sales
    .filter(({ state }) => state !== 'placed' && state !== 'cancelled')
    .flatMap((sale) =>
      items
        .filter(({ saleId }) => saleId === sale.id)
        .map((item) => {
          const line = lines.find(({ id }) => id === item.lineId);
          return {
            saleId: sale.id,
            saleNumber: sale.number,
            customerName: sale.customerName,
            customerEmail: sale.customerEmail,
            placedAt: sale.placedAt.toISOString(),
            inKit: line?.kind === 'kit' ? line.title : null,
            hash: item.hash ?? '',
            hand: item.hand ?? ('either' as const),
            finishId: item.finishId ?? 'bare',
            bought: item.quantity - item.cancelled,
            shipped: item.shipped,
            returned: item.returned,
          };
        }),
    );
}

type Purchases = RouteResponse<typeof purchasesContract>['purchases'];

const purchaseRows = z.array(
  z.object({
    link: z.string(),
    number: z.int(),
    workshop_id: z.uuid(),
    placed_at: z.date(),
    total_minor: z.int(),
    currency,
    state: z.enum(SALE_STATES),
  }),
);
const shopRow = z.object({ name: z.string(), slug: z.string(), what: z.string() });

/** What a person has bought, in every shop, the newest first. The database itself shows them nobody else's. */
export async function listPurchases(database: Database, userId: string): Promise<Purchases> {
  const rows = await database.forUser(userId, async (transaction) =>
    purchaseRows.parse(
      await database.models.sequelize.query(
        `SELECT link, number, workshop_id, placed_at, total_minor, currency, state FROM sales
         WHERE customer_id = $1 ORDER BY placed_at DESC, id LIMIT ${LONGEST_LIST}`,
        { bind: [userId], transaction, type: QueryTypes.SELECT },
      ),
    ),
  );
  const purchases: Purchases = [];
  for (const row of rows) {
    const [shop] = await database.viewWorkshop(row.workshop_id, (scope) =>
      scope.sql(
        `SELECT w.name, s.slug, (SELECT string_agg(l.quantity || ' × ' || l.title, ', ' ORDER BY l.position)
           FROM sale_lines l JOIN sales o ON o.id = l.sale_id WHERE o.number = $2) AS what
         FROM workshops w JOIN shops s ON s.workshop_id = w.id WHERE w.id = $1`,
        [row.workshop_id, row.number],
      ),
    );
    const { name, slug, what } = shopRow.parse(shop);
    purchases.push({
      link: row.link,
      number: row.number,
      shopName: name,
      shopSlug: slug,
      placedAt: row.placed_at.toISOString(),
      what,
      total: { amountMinor: row.total_minor, currency: row.currency },
      state: row.state,
    });
  }
  return purchases;
}
