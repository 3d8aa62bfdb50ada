import * as z from 'zod/mini';
import type { Database } from '../../database/database';
import { notFound } from '../../http/problem';

const shopRow = z.object({ workshop_id: z.uuid(), is_open: z.boolean() });
const saleRow = z.object({ workshop_id: z.uuid(), id: z.uuid() });

/** The workshop whose shop has this address, open or closed. @throws Problem `not-found` when there is none */
export async function findAnyShop(
  database: Database,
  slug: string,
): Promise<{ readonly workshopId: string; readonly isOpen: boolean }> {
  const found = await database.asSystem('find the workshop of a shop address', async ({ select }) =>
    select('SELECT workshop_id, is_open FROM shops WHERE slug = $1', [slug]),
  );
  const [row] = found.map((one) => shopRow.parse(one));
  if (row === undefined) throw notFound();
  return { workshopId: row.workshop_id, isOpen: row.is_open };
}

/**
 * The workshop whose shop has this address.
 * @throws Problem `not-found` when there is none, or it is closed
 */
export async function findShop(database: Database, slug: string): Promise<string> {
  const { workshopId, isOpen } = await findAnyShop(database, slug);
  if (!isOpen) throw notFound();
  return workshopId;
}

/** The sale behind a private link. @throws Problem `not-found`, the same for every link that leads nowhere */
export async function findSaleByLink(
  database: Database,
  link: string,
): Promise<{ readonly workshopId: string; readonly saleId: string }> {
  const found = await database.asSystem('find the sale behind a link', async ({ select }) =>
    select('SELECT workshop_id, id FROM sales WHERE link = $1', [link]),
  );
  const [row] = found.map((one) => saleRow.parse(one));
  if (row === undefined) throw notFound();
  return { workshopId: row.workshop_id, saleId: row.id };
}

/** The thread about fit behind a private link. @throws Problem `not-found` */
export async function findQuestionByLink(
  database: Database,
  link: string,
): Promise<{ readonly workshopId: string; readonly questionId: string }> {
  const found = await database.asSystem('find the question behind a link', async ({ select }) =>
    select('SELECT workshop_id, id FROM questions WHERE link = $1', [link]),
  );
  const [row] = found.map((one) => saleRow.parse(one));
  if (row === undefined) throw notFound();
  return { workshopId: row.workshop_id, questionId: row.id };
}
