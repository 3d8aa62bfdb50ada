import type { Ledger } from '@foldwright/shared/contracts/ledger';
import { LEDGER_ACCOUNTS } from '@foldwright/shared/contracts/ledger';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Member } from '../../http/visitor';
import { bracketsById } from '../stock/brackets';
import { shopOf } from '../shop/settings';
import { finishWords } from './piece-words';
import { readSaleFacts } from './sale-rows';
import { paymentsOf } from './sale-state';

const LONGEST_LIST = 500;
const sum = <T>(rows: readonly T[], amount: (row: T) => number) => rows.reduce((total, row) => total + amount(row), 0);

/** The books of a workshop with the proof that they balance. */
export function readLedger(database: Database, { workshopId }: Member): Promise<Ledger> {
  return database.viewWorkshop(workshopId, async (scope) => ({
    money: await moneyOf(scope),
    units: await unitsOf(scope),
  }));
}

async function moneyOf(scope: WorkshopScope): Promise<Ledger['money']> {
  const { currency } = await shopOf(scope);
  const money = (amountMinor: number) => ({ amountMinor, currency });
  const postings = await scope.rows.ledgerPostings.list({ where: { currency } });
  const entries = await scope.rows.ledgerEntries.list({
    order: [
      ['at', 'DESC'],
      ['id', 'ASC'],
    ],
    limit: LONGEST_LIST,
  });
  const balance = (account: Ledger['money']['accounts'][number]['account']) =>
    sum(
      postings.filter((posting) => posting.account === account),
      ({ amountMinor }) => amountMinor,
    );
  return {
    accounts: LEDGER_ACCOUNTS.map((account) => ({ account, balance: money(balance(account)) })),
    entries: entries.map(({ id, at, text, saleId, orderId }) => ({
      ...{ id, text, saleId, orderId },
      at: at.toISOString(),
      postings: postings
        .filter(({ entryId }) => entryId === id)
        .map(({ account, amountMinor }) => ({ account, amount: money(amountMinor) })),
    })),
    difference: money(sum(postings, ({ amountMinor }) => amountMinor)),
    proof: { books: money(balance('payment-host')), sales: money(await keptBySales(scope, currency)) },
  };
}

/** What customers paid less what went back to them, as the sales themselves say. */
async function keptBySales(scope: WorkshopScope, currency: 'EUR' | 'USD'): Promise<number> {
  let kept = 0;
  for (const sale of await scope.rows.sales.list({ where: { currency } })) {
    const payments = paymentsOf(await readSaleFacts(scope, sale.id));
    const back = await scope.rows.refunds.list({
      where: { saleId: sale.id, paymentId: [...payments], state: 'done' },
    });
    kept += payments.length * sale.totalMinor - sum(back, ({ amountMinor }) => amountMinor);
  }
  return kept;
}

async function unitsOf(scope: WorkshopScope): Promise<Ledger['units']> {
  const positions = await scope.rows.stockPositions.list();
  const moves = await scope.rows.stockMoves.list();
  const items = await scope.rows.saleItems.list();
  const brackets = await bracketsById(
    scope,
    positions.flatMap(({ revisionId }) => revisionId ?? []),
  );
  const hardware = await scope.rows.hardwareItems.list();
  const rows = positions.map((position) => {
    const own = moves.filter(({ positionId }) => positionId === position.id);
    const of = (kind: string) =>
      sum(
        own.filter((move) => move.kind === kind),
        ({ onHandChange }) => onHandChange,
      );
    const sold = items.filter((item) =>
      position.hardwareId === null
        ? item.revisionId === position.revisionId && item.finishId === position.finishId
        : item.hardwareId === position.hardwareId,
    );
    const salesReserved = sum(sold, ({ reserved }) => reserved);
    const salesShipped = sum(sold, ({ shipped }) => shipped);
    const shipped = -of('shipped');
    const onHand = sum(own, ({ onHandChange }) => onHandChange);
    const bracket = position.revisionId === null ? undefined : brackets.get(position.revisionId);
    const screw = hardware.find(({ id }) => id === position.hardwareId);
    return {
      positionId: position.id,
      what:
        bracket === undefined
          ? [screw?.name, screw?.specification].filter(Boolean).join(', ')
          : `${bracket.partNumber} ${bracket.partName}, revision ${bracket.letter}, ${finishWords(position.finishId ?? '')}`,
      ...{ received: of('received'), adjusted: of('adjusted'), returned: of('returned'), shipped },
      ...{ onHand: position.onHand, reserved: position.reserved, salesReserved, salesShipped },
      difference:
        Math.abs(onHand - position.onHand) +
        Math.abs(sum(own, ({ reservedChange }) => reservedChange) - position.reserved) +
        Math.abs(salesReserved - position.reserved) +
        Math.abs(salesShipped - shipped),
    };
  });
  const sorted = rows.sort((a, b) => a.what.localeCompare(b.what, 'en', { numeric: true }));
  return { rows: sorted, difference: sum(sorted, ({ difference }) => difference) };
}
