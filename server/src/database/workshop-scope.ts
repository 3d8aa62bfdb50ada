import type { Transaction } from 'sequelize';
import { QueryTypes } from 'sequelize';
import type { Models, WorkshopRows } from '../models/all-models';
import { workshopRows } from '../models/all-models';
import type { Workshop } from '../models/workshop';

/**
 * One workshop inside one transaction. Row-level security in the database holds the transaction to the same workshop,
 * so a statement written without the repository still sees nothing else.
 */
export interface WorkshopScope {
  readonly workshopId: string;
  readonly transaction: Transaction;
  /** One repository for each table that belongs to workshops. */
  readonly rows: WorkshopRows;
  /** Tables outside of workshops (users), to be read with `transaction`. */
  readonly models: Models;
  /** The workshop itself, which belongs to no workshop and so has no repository. */
  workshop(): Promise<Workshop>;
  /** Make the workshop that this transaction works in, where there is none yet. */
  addWorkshop(workshop: { readonly name: string; readonly numberPrefix: string }): Promise<void>;
  /** One statement in this transaction; answers its rows, still unparsed. */
  sql(statement: string, bind?: readonly unknown[]): Promise<unknown[]>;
  /** Have something done last in this transaction, after all other work and before the commit. */
  atEnd(work: () => Promise<void>): void;
}

/** Run work in a scope bound to one workshop and one transaction, and then what it left for the end. */
export async function workInScope<T>(
  models: Models,
  workshopId: string,
  transaction: Transaction,
  work: (scope: WorkshopScope) => Promise<T>,
): Promise<T> {
  const last: (() => Promise<void>)[] = [];
  const result = await work(scopeOf(models, workshopId, transaction, (one) => void last.push(one)));
  for (const one of last) await one();
  return result;
}

function scopeOf(
  models: Models,
  workshopId: string,
  transaction: Transaction,
  atEnd: WorkshopScope['atEnd'],
): WorkshopScope {
  return {
    atEnd,
    workshopId,
    transaction,
    models,
    rows: workshopRows(models, workshopId, transaction),
    workshop: () => models.workshops.findByPk(workshopId, { transaction, rejectOnEmpty: true }),
    addWorkshop: async (workshop) => {
      await models.workshops.create({ id: workshopId, ...workshop }, { transaction });
    },
    sql: (statement, bind = []) =>
      models.sequelize.query(statement, { bind: [...bind], transaction, type: QueryTypes.SELECT }),
  };
}
