import type { Order } from '@foldwright/shared/contracts/orders';
import type { InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** Something that happened to an order. One row for each `key` of an order, however often it was told. */
export class OrderEvent extends Model<InferAttributes<OrderEvent>, InferCreationAttributes<OrderEvent>> {
  declare id: string;
  declare workshopId: string;
  declare orderId: string;
  declare key: string;
  declare kind: Order['events'][number]['kind'];
  declare at: Date;
  declare source: string;
  declare details: unknown;
}

/** The table `order_events` on one connection. */
export function defineOrderEvent(sequelize: Sequelize): ModelStatic<OrderEvent> {
  class BoundOrderEvent extends OrderEvent {}
  BoundOrderEvent.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      orderId: { type: DataTypes.UUID, allowNull: false },
      key: { type: DataTypes.TEXT, allowNull: false },
      kind: { type: DataTypes.TEXT, allowNull: false },
      at: { type: DataTypes.DATE, allowNull: false },
      source: { type: DataTypes.TEXT, allowNull: false },
      details: { type: DataTypes.JSONB, allowNull: false },
    },
    { sequelize, modelName: 'OrderEvent', tableName: 'order_events', underscored: true, timestamps: false },
  );
  return BoundOrderEvent;
}
