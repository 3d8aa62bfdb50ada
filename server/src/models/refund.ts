import type { Sale as SaleContract } from '@foldwright/shared/contracts/sales';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** Money on its way back to a customer. */
export class Refund extends Model<InferAttributes<Refund>, InferCreationAttributes<Refund>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare saleId: string;
  declare key: string;
  declare paymentId: string;
  declare amountMinor: number;
  declare reason: string;
  declare state: SaleContract['refunds'][number]['state'];
  /** Counts definite refusals: each new try goes under a key of its own at the payment host. */
  declare attempt: CreationOptional<number>;
  declare problem: CreationOptional<string | null>;
  declare askedAt: Date;
}

/** The table `refunds` on one connection. */
export function defineRefund(sequelize: Sequelize): ModelStatic<Refund> {
  class BoundRefund extends Refund {}
  BoundRefund.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      saleId: { type: DataTypes.UUID, allowNull: false },
      key: { type: DataTypes.TEXT, allowNull: false },
      paymentId: { type: DataTypes.TEXT, allowNull: false },
      amountMinor: { type: DataTypes.INTEGER, allowNull: false },
      reason: { type: DataTypes.TEXT, allowNull: false },
      state: { type: DataTypes.TEXT, allowNull: false },
      attempt: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
      problem: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      askedAt: { type: DataTypes.DATE, allowNull: false },
    },
    { sequelize, modelName: 'Refund', tableName: 'refunds', underscored: true, timestamps: false },
  );
  return BoundRefund;
}
