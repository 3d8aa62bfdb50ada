import type {
  Arrival,
  BracketStock,
  Drawing,
  HardwareStock,
  StockMove as StockMoveContract,
} from '@foldwright/shared/contracts/stock';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Member } from '../../http/visitor';
import { presentHardware } from '../../presenters/stock';
import { shortItems } from '../sales/short-items';
import { listArrivals } from './arrivals';
import { bracketsById, drawingsOf } from './brackets';
import type { StockTarget } from './shelf';
import { targetOf } from './shelf';

const keyOf = (target: StockTarget) =>
  target.kind === 'bracket' ? `${target.revisionId} ${target.finishId}` : target.hardwareId;

/** How many of each thing are sold and paid for, and neither on the shelf nor being cut. */
async function shortages(scope: WorkshopScope): Promise<ReadonlyMap<string, number>> {
  const short = new Map<string, number>();
  for (const { item, missing } of await shortItems(scope)) {
    const key = keyOf(targetOf(item));
    short.set(key, (short.get(key) ?? 0) + missing);
  }
  return short;
}

/** What lies on the shelf: brackets by part, revision and finish, then hardware by name; and what has arrived for it. */
export function listStock(
  database: Database,
  { workshopId }: Member,
): Promise<{ brackets: BracketStock[]; hardware: HardwareStock[]; arrivals: Arrival[]; drawings: Drawing[] }> {
  return database.viewWorkshop(workshopId, async (scope) => {
    const positions = await scope.rows.stockPositions.list();
    const short = await shortages(scope);
    const refs = await bracketsById(
      scope,
      positions.flatMap(({ revisionId }) => revisionId ?? []),
    );
    const quantities = ({ onHand, reserved }: { onHand: number; reserved: number }, key: string) => ({
      onHand,
      reserved,
      free: onHand - reserved,
      short: short.get(key) ?? 0,
    });
    const brackets = positions.flatMap((position): BracketStock[] => {
      const bracket = position.revisionId === null ? undefined : refs.get(position.revisionId);
      if (bracket === undefined || position.finishId === null) return [];
      const { id, finishId } = position;
      return [{ positionId: id, bracket, finishId, ...quantities(position, `${bracket.revisionId} ${finishId}`) }];
    });
    const items = await scope.rows.hardwareItems.list({ order: [['name', 'ASC']] });
    const hardware = items.map((item): HardwareStock => {
      const position = positions.find(({ hardwareId }) => hardwareId === item.id);
      const counted = quantities(position ?? { onHand: 0, reserved: 0 }, item.id);
      return { positionId: position?.id ?? null, hardware: presentHardware(item), ...counted };
    });
    const order = ({ bracket: { partNumber, letter }, finishId }: BracketStock) =>
      `${partNumber} ${letter} ${finishId}`;
    const arrivals = await listArrivals(scope);
    return {
      brackets: brackets.sort((a, b) => order(a).localeCompare(order(b), 'en', { numeric: true })),
      hardware,
      arrivals,
      drawings: await drawingsOf(
        scope,
        [...brackets, ...arrivals].map(({ bracket }) => bracket.revisionId),
      ),
    };
  });
}

const LONGEST_LIST = 500;

/** Everything that happened to one position, newest first. @throws Problem `not-found` */
export function listStockMoves(
  database: Database,
  { workshopId }: Member,
  positionId: string,
): Promise<StockMoveContract[]> {
  return database.viewWorkshop(workshopId, async (scope) => {
    const position = await scope.rows.stockPositions.get(positionId);
    const moves = await scope.rows.stockMoves.list({
      where: { positionId: position.id },
      order: [
        ['at', 'DESC'],
        ['id', 'ASC'],
      ],
      limit: LONGEST_LIST,
    });
    const sales = await scope.rows.sales.list({ where: { id: moves.flatMap(({ saleId }) => saleId ?? []) } });
    const orders = await scope.rows.orders.list({ where: { id: moves.flatMap(({ orderId }) => orderId ?? []) } });
    const numberIn = (rows: readonly { id: string; number: number }[], id: string | null) =>
      rows.find((row) => row.id === id)?.number ?? null;
    return moves.map((move) => ({
      id: move.id,
      at: move.at.toISOString(),
      kind: move.kind,
      onHandChange: move.onHandChange,
      reservedChange: move.reservedChange,
      onHandAfter: move.onHandAfter,
      reason: move.reason,
      by: move.byName,
      saleNumber: numberIn(sales, move.saleId),
      orderNumber: numberIn(orders, move.orderId),
    }));
  });
}
