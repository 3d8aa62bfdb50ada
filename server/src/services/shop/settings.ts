import type { ShopSettings, ShopSettingsInput } from '@foldwright/shared/contracts/shop';
import { UniqueConstraintError } from 'sequelize';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import { Problem } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { Shop } from '../../models/shop';
import { recordAudit } from '../record-audit';
import { refuseStale } from '../refuse-stale';

/** A workshop's name as the last part of an address; a few letters of its id keep two of one name apart. */
function firstSlug(name: string, workshopId: string): string {
  const plain = name
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 40);
  return `${plain === '' ? 'shop' : plain}-${workshopId.slice(0, 6)}`;
}

/** The shop of a workshop. One that nobody has set up yet is closed and has nothing but defaults. */
export async function shopOf(scope: WorkshopScope): Promise<Shop> {
  const known = await scope.rows.shops.findOne({});
  if (known !== null) return known;
  const { workshopId } = scope;
  const workshop = await scope.workshop();
  const [owner] = await scope.sql(
    `SELECT u.email FROM memberships m JOIN users u ON u.id = m.user_id
     WHERE m.workshop_id = $1 AND m.role = 'owner' ORDER BY m.created_at, m.id LIMIT 1`,
    [workshopId],
  );
  const email = typeof owner === 'object' && owner !== null && 'email' in owner ? String(owner.email) : '';
  await scope.sql(
    `INSERT INTO shops (id, workshop_id, slug, headline, about, currency, tax_name, tax_basis_points, tax_number,
       postage_minor, packing_days, sender_address, questions_to)
     VALUES (gen_random_uuid(), $1, $2, $3, '', 'EUR', 'VAT', 0, '', 0, 2, '', $4) ON CONFLICT (workshop_id) DO NOTHING`,
    [workshopId, firstSlug(workshop.name, workshopId), workshop.name, email],
  );
  const added = await scope.rows.shops.findOne({});
  if (added === null) throw new Error('a shop that was set up has no row');
  return added;
}

function present(shop: Shop): ShopSettings {
  const { slug, isOpen, headline, about, currency, taxName, taxBasisPoints, taxNumber } = shop;
  const { postageMinor, packingDays, senderAddress, questionsTo, revision } = shop;
  return {
    ...{ slug, isOpen, headline, about, currency, taxName, taxBasisPoints, taxNumber },
    ...{ postageMinor, packingDays, senderAddress, questionsTo, revision },
  };
}

export function readShopSettings(database: Database, { workshopId }: Member): Promise<ShopSettings> {
  return database.inWorkshop(workshopId, async (scope) => present(await shopOf(scope)));
}

/** Settings by whoever may decide them; what was sold before keeps the tax it was sold with. */
export async function writeShopSettings(scope: WorkshopScope, input: ShopSettingsInput): Promise<Shop> {
  const shop = await shopOf(scope);
  return scope.rows.shops.change(shop, { ...input, revision: shop.revision + 1 });
}

/** @throws Problem `stale-row`, `already-exists` when another shop has the address */
export async function changeShopSettings(
  database: Database,
  actor: Member,
  input: ShopSettingsInput,
  seenRevision: number,
): Promise<ShopSettings> {
  try {
    return await database.inWorkshop(actor.workshopId, async (scope) => {
      const shop = await scope.rows.shops.get((await shopOf(scope)).id, { lock: true });
      refuseStale(shop, seenRevision);
      await recordAudit(scope, actor, 'Changed the shop’s settings', input.isOpen ? 'open' : 'closed');
      return present(await writeShopSettings(scope, input));
    });
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw new Problem('already-exists', {
      detail: `Another shop has the address ${input.slug}.`,
      kept: 'Nothing was changed.',
      errors: [{ pointer: '/slug', detail: 'Choose another address.' }],
    });
  }
}
