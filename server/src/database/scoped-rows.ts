import type { Attributes, CreationAttributes, Model, ModelStatic, Order, Transaction, WhereOptions } from 'sequelize';
import { and } from 'sequelize';
import { notFound } from '../http/problem';

/** A row that belongs to one workshop. */
export type WorkshopRow = Model & { id: string; workshopId: string };

export interface ListOptions<M extends Model> {
  readonly where?: WhereOptions<Attributes<M>>;
  readonly order?: Order;
  readonly limit?: number;
  /** Columns to read, where a row has large ones that aren't needed. The others are then undefined. */
  readonly attributes?: readonly (keyof Attributes<M> & string)[];
}

/**
 * Rows of one table as one workshop sees them, inside one transaction. Services reach tables only through this: the
 * workshop and the transaction can't be forgotten, and a row of somebody else is the same as none.
 */
export class ScopedRows<M extends WorkshopRow> {
  constructor(
    private readonly model: ModelStatic<M>,
    private readonly workshopId: string,
    private readonly transaction: Transaction,
  ) {}

  /** @param options.lock hold the row until the transaction ends */
  async find(id: string, options: { lock?: boolean } = {}): Promise<M | null> {
    return this.model.findOne({
      where: and({ id }, { workshopId: this.workshopId }),
      transaction: this.transaction,
      ...(options.lock ? { lock: this.transaction.LOCK.UPDATE } : {}),
    });
  }

  /** @throws Problem `not-found`, the same for a missing row and for one of another workshop */
  async get(id: string, options: { lock?: boolean } = {}): Promise<M> {
    const row = await this.find(id, options);
    if (row === null) throw notFound();
    return row;
  }

  async findOne(
    where: WhereOptions<Attributes<M>>,
    options: { lock?: boolean; order?: Order } = {},
  ): Promise<M | null> {
    return this.model.findOne({
      where: and(where, { workshopId: this.workshopId }),
      transaction: this.transaction,
      ...(options.order ? { order: options.order } : {}),
      ...(options.lock ? { lock: this.transaction.LOCK.UPDATE } : {}),
    });
  }

  async list(options: ListOptions<M> = {}): Promise<M[]> {
    return this.model.findAll({
      where: and(options.where ?? {}, { workshopId: this.workshopId }),
      transaction: this.transaction,
      ...(options.order ? { order: options.order } : {}),
      ...(options.limit === undefined ? {} : { limit: options.limit }),
      ...(options.attributes === undefined ? {} : { attributes: [...options.attributes] }),
    });
  }

  async count(where: WhereOptions<Attributes<M>> = {}): Promise<number> {
    return this.model.count({ where: and(where, { workshopId: this.workshopId }), transaction: this.transaction });
  }

  /** Add a row; the workshop is filled in. */
  async add(values: Omit<CreationAttributes<M>, 'workshopId'>): Promise<M> {
    // The compiler can't add a key back to a generic Omit; every model here has `workshopId`.
    const whole = { ...values, workshopId: this.workshopId } as unknown as CreationAttributes<M>;
    return this.model.create(whole, { transaction: this.transaction });
  }

  /** Change a row that was read in this transaction. */
  async change(row: M, values: Partial<Attributes<M>>): Promise<M> {
    return row.update(values, { transaction: this.transaction });
  }

  /** Change all rows that still are as described; answers how many were. */
  async changeWhere(where: WhereOptions<Attributes<M>>, values: Partial<Attributes<M>>): Promise<number> {
    const [changed] = await this.model.update(values, {
      where: and(where, { workshopId: this.workshopId }),
      transaction: this.transaction,
    });
    return changed;
  }

  async remove(row: M): Promise<void> {
    await row.destroy({ transaction: this.transaction });
  }
}
