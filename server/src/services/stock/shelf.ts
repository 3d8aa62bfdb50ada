import type { WorkshopScope } from '../../database/workshop-scope';
import { recordEvent } from '../../events/record-event';
import { Problem } from '../../http/problem';
import type { StockMove } from '../../models/stock-move';
import type { StockPosition } from '../../models/stock-position';

/** A thing that can lie on the shelf: a bracket of one revision in one finish, or hardware. */
export type StockTarget =
  | { readonly kind: 'bracket'; readonly revisionId: string; readonly finishId: string }
  | { readonly kind: 'hardware'; readonly hardwareId: string };

export interface NewStockMove {
  /** What the move is about: a second move of the same key changes nothing. */
  readonly key: string;
  readonly kind: StockMove['kind'];
  readonly onHandChange: number;
  readonly reservedChange: number;
  readonly reason: string;
  readonly byName: string;
  readonly at: Date;
  readonly saleId?: string | null;
  readonly orderId?: string | null;
}

/**
 * One after the other at a workshop's shelf. Every transaction that changes stock or reservations calls this before it
 * locks any row: so nothing deadlocks, and the last bracket goes to whoever came first.
 */
export async function lockShelf(scope: WorkshopScope): Promise<void> {
  await scope.sql("SELECT pg_advisory_xact_lock(hashtextextended('shelf:' || $1, 0))", [scope.workshopId]);
}

const whereOf = (target: StockTarget) =>
  target.kind === 'bracket'
    ? { revisionId: target.revisionId, finishId: target.finishId }
    : { hardwareId: target.hardwareId };

/** What lies on the shelf of a thing, or null when it never lay there. */
export const findPosition = (scope: WorkshopScope, target: StockTarget): Promise<StockPosition | null> =>
  scope.rows.stockPositions.findOne(whereOf(target));

/** The place of a thing on the shelf, made empty when there is none. Only with the shelf locked. */
export async function positionOf(scope: WorkshopScope, target: StockTarget): Promise<StockPosition> {
  return (await findPosition(scope, target)) ?? scope.rows.stockPositions.add(whereOf(target));
}

/** The thing that a position or a piece of a sale is of. */
export function targetOf(row: {
  readonly revisionId: string | null;
  readonly finishId: string | null;
  readonly hardwareId: string | null;
}): StockTarget {
  if (row.hardwareId !== null) return { kind: 'hardware', hardwareId: row.hardwareId };
  if (row.revisionId === null || row.finishId === null) throw new Error('a bracket has a revision and a finish');
  return { kind: 'bracket', revisionId: row.revisionId, finishId: row.finishId };
}

/**
 * Write a move and what it makes of the position, both or neither. Only with the shelf locked.
 * @param position its row, read in this transaction
 * @returns false when a move of this key was written before; nothing changes then
 * @throws Problem `not-enough-stock` when less would lie there than is reserved, or less than nothing would be reserved
 */
export async function moveStock(scope: WorkshopScope, position: StockPosition, move: NewStockMove): Promise<boolean> {
  const known = await scope.rows.stockMoves.findOne({ key: move.key });
  if (known !== null) return false;
  const onHand = position.onHand + move.onHandChange;
  const reserved = position.reserved + move.reservedChange;
  if (reserved < 0 || onHand < reserved) {
    throw new Problem('not-enough-stock', {
      detail:
        position.reserved > 0
          ? `${position.onHand} lie on the shelf, ${position.reserved} of them are kept for sales.`
          : `${position.onHand} lie on the shelf.`,
      kept: 'The shelf is as it was.',
      next: 'Take fewer, or put more on the shelf first.',
    });
  }
  await scope.rows.stockMoves.add({
    ...move,
    positionId: position.id,
    saleId: move.saleId ?? null,
    orderId: move.orderId ?? null,
    onHandAfter: onHand,
  });
  await scope.rows.stockPositions.change(position, { onHand, reserved });
  return true;
}

/** Tell every open page that these positions changed. */
export function announceStock(scope: WorkshopScope, positionIds: Iterable<string>): void {
  for (const positionId of new Set(positionIds)) recordEvent(scope, { kind: 'stock-changed', positionId });
}
