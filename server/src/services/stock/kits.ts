import type { Kit as KitContract, KitInput, KitLine as KitLineContract } from '@foldwright/shared/contracts/kits';
import type { Drawing } from '@foldwright/shared/contracts/stock';
import { createKit as createContract, kitSchema } from '@foldwright/shared/contracts/kits';
import * as z from 'zod/mini';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Member } from '../../http/visitor';
import type { Kit } from '../../models/kit';
import type { KitLine } from '../../models/kit-line';
import { presentHardware } from '../../presenters/stock';
import { once } from '../once';
import { recordAudit } from '../record-audit';
import { refuseStale } from '../refuse-stale';
import { bracketsById, drawingsOf } from './brackets';
import { countBuildable } from './buildable';
import { costOfKit } from './costs';
import { sellingOf, shopMoneyOf } from './selling';

const numberRow = z.tuple([z.object({ prefix: z.string(), next: z.int() })]);

/** The workshop's next kit number: its prefix, K and two digits. */
async function nextKitNumber(scope: WorkshopScope): Promise<string> {
  await scope.sql("SELECT pg_advisory_xact_lock(hashtextextended('kit number:' || $1, 0))", [scope.workshopId]);
  const [{ prefix, next }] = numberRow.parse(
    await scope.sql(
      `SELECT w.number_prefix AS prefix, (SELECT COUNT(*)::int + 1 FROM kits k WHERE k.workshop_id = w.id) AS next
       FROM workshops w WHERE w.id = $1`,
      [scope.workshopId],
    ),
  );
  return `${prefix}-K${String(next).padStart(2, '0')}`;
}

/** Lines of a kit in the order in which they were written down. */
export const linesOfKit = (scope: WorkshopScope, kitId: string): Promise<KitLine[]> =>
  scope.rows.kitLines.list({ where: { kitId }, order: [['position', 'ASC']] });

async function writeLines(scope: WorkshopScope, kitId: string, lines: KitInput['lines']): Promise<void> {
  for (const line of await linesOfKit(scope, kitId)) await scope.rows.kitLines.remove(line);
  for (const [position, line] of lines.entries()) {
    const { quantity } = line;
    if (line.kind === 'bracket') {
      const { id: revisionId } = await scope.rows.revisions.get(line.revisionId);
      await scope.rows.kitLines.add({ kitId, position, quantity, revisionId, finishId: line.finishId });
    } else {
      const { id: hardwareId } = await scope.rows.hardwareItems.get(line.hardwareId);
      await scope.rows.kitLines.add({ kitId, position, quantity, hardwareId });
    }
  }
}

async function present(scope: WorkshopScope, kit: Kit): Promise<KitContract> {
  const lines = await linesOfKit(scope, kit.id);
  const brackets = await bracketsById(
    scope,
    lines.flatMap(({ revisionId }) => revisionId ?? []),
  );
  const hardware = await scope.rows.hardwareItems.list({
    where: { id: lines.flatMap(({ hardwareId }) => hardwareId ?? []) },
  });
  const presented = lines.flatMap((line): KitLineContract[] => {
    const { quantity, finishId } = line;
    if (line.revisionId !== null) {
      const bracket = brackets.get(line.revisionId);
      return bracket === undefined ? [] : [{ kind: 'bracket', bracket, finishId, quantity }];
    }
    const item = hardware.find(({ id }) => id === line.hardwareId);
    return item === undefined ? [] : [{ kind: 'hardware', hardware: presentHardware(item), quantity }];
  });
  const cost = await costOfKit(scope, lines);
  const listing = await scope.rows.listings.findOne({ kitId: kit.id, state: 'published' });
  return {
    id: kit.id,
    number: kit.number,
    name: kit.name,
    note: kit.note,
    lines: presented,
    cost,
    ...sellingOf(await shopMoneyOf(scope), listing?.priceMinor ?? null, cost.each),
    buildable: countBuildable(presented, await scope.rows.stockPositions.list()),
    revision: kit.revision,
  };
}

/** Kits by number, and what the brackets in them look like. */
export function listKits(
  database: Database,
  { workshopId }: Member,
): Promise<{ kits: KitContract[]; drawings: Drawing[] }> {
  return database.viewWorkshop(workshopId, async (scope) => {
    const kits: KitContract[] = [];
    for (const kit of await scope.rows.kits.list({ order: [['number', 'ASC']] })) kits.push(await present(scope, kit));
    const revisionIds = kits.flatMap(({ lines }) =>
      lines.flatMap((line) => (line.kind === 'bracket' ? [line.bracket.revisionId] : [])),
    );
    return { kits, drawings: await drawingsOf(scope, revisionIds) };
  });
}

/** Put a kit into the workshop. @throws Problem `not-found` for a bracket or hardware that isn't there */
export async function addKit(
  scope: WorkshopScope,
  actor: Pick<Member, 'userId' | 'userName'>,
  { name, note, lines }: KitInput,
  now: Date,
): Promise<Kit> {
  const kit = await scope.rows.kits.add({ number: await nextKitNumber(scope), name, note, createdAt: now });
  await writeLines(scope, kit.id, lines);
  await recordAudit(scope, actor, 'Made the kit', `${kit.number} ${kit.name}`);
  return kit;
}

/** Make a kit, once under the caller's key. @throws Problem `not-found` for a bracket or hardware that isn't there */
export function createKit(
  database: Database,
  actor: Member,
  input: KitInput,
  key: string,
  now: Date,
): Promise<KitContract> {
  const { workshopId, userId } = actor;
  return database.inWorkshop(workshopId, (scope) =>
    once(scope, { userId, route: createContract.id, key, request: input }, kitSchema, async () =>
      present(scope, await addKit(scope, actor, input, now)),
    ),
  );
}

/**
 * Change a kit and its bill of materials. What was sold before keeps what was in it.
 * @throws Problem `not-found`, `stale-row`
 */
export function changeKit(
  database: Database,
  actor: Member,
  kitId: string,
  input: KitInput,
  seenRevision: number,
): Promise<KitContract> {
  return database.inWorkshop(actor.workshopId, async (scope) => {
    const kit = await scope.rows.kits.get(kitId, { lock: true });
    refuseStale(kit, seenRevision);
    const { name, note, lines } = input;
    await scope.rows.kits.change(kit, { name, note, revision: kit.revision + 1 });
    await writeLines(scope, kit.id, lines);
    await recordAudit(scope, actor, 'Changed the kit', `${kit.number} ${kit.name}`);
    return present(scope, kit);
  });
}
