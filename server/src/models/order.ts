import type { Order as OrderContract } from '@foldwright/shared/contracts/orders';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** An order with everything frozen in it that was paid for. State columns are derived from its facts. */
export class Order extends Model<InferAttributes<Order>, InferCreationAttributes<Order>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare number: number;
  declare quoteId: string;
  declare quoteReference: string;
  declare partId: string;
  declare partName: string;
  declare partNumber: string;
  declare revisionId: string;
  declare revisionLetter: string;
  declare revisionHash: string;
  declare stock: 'trial' | 'production';
  declare stockLabel: string;
  declare statement: 'cut-and-bend-to-our-flat' | 'formed-sizes-rule';
  declare quantity: number;
  declare totalMinor: number;
  declare currency: 'EUR' | 'USD';
  declare lines: unknown;
  declare leadTimeDays: number;
  declare state: OrderContract['state'];
  declare paymentState: OrderContract['paymentState'];
  declare trackingCode: CreationOptional<string | null>;
  declare revision: number;
  declare checkoutRound: CreationOptional<number>;
  declare checkoutId: CreationOptional<string | null>;
  declare shopOrderReference: CreationOptional<string | null>;
  declare placedBy: string;
  declare placedByName: string;
  declare placedByEmail: string;
  declare placedAt: Date;
}

/** The table `orders` on one connection. */
export function defineOrder(sequelize: Sequelize): ModelStatic<Order> {
  class BoundOrder extends Order {}
  BoundOrder.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      number: { type: DataTypes.INTEGER, allowNull: false },
      quoteId: { type: DataTypes.UUID, allowNull: false },
      quoteReference: { type: DataTypes.TEXT, allowNull: false },
      partId: { type: DataTypes.UUID, allowNull: false },
      partName: { type: DataTypes.TEXT, allowNull: false },
      partNumber: { type: DataTypes.TEXT, allowNull: false },
      revisionId: { type: DataTypes.UUID, allowNull: false },
      revisionLetter: { type: DataTypes.TEXT, allowNull: false },
      revisionHash: { type: DataTypes.TEXT, allowNull: false },
      stock: { type: DataTypes.TEXT, allowNull: false },
      stockLabel: { type: DataTypes.TEXT, allowNull: false },
      statement: { type: DataTypes.TEXT, allowNull: false },
      quantity: { type: DataTypes.INTEGER, allowNull: false },
      totalMinor: { type: DataTypes.INTEGER, allowNull: false },
      currency: { type: DataTypes.TEXT, allowNull: false },
      lines: { type: DataTypes.JSONB, allowNull: false },
      leadTimeDays: { type: DataTypes.INTEGER, allowNull: false },
      state: { type: DataTypes.TEXT, allowNull: false },
      paymentState: { type: DataTypes.TEXT, allowNull: false },
      trackingCode: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      revision: { type: DataTypes.INTEGER, allowNull: false },
      checkoutRound: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      checkoutId: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      shopOrderReference: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      placedBy: { type: DataTypes.UUID, allowNull: false },
      placedByName: { type: DataTypes.TEXT, allowNull: false },
      placedByEmail: { type: DataTypes.TEXT, allowNull: false },
      placedAt: { type: DataTypes.DATE, allowNull: false },
    },
    { sequelize, modelName: 'Order', tableName: 'orders', underscored: true, timestamps: false },
  );
  return BoundOrder;
}
