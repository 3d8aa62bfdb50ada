import type { Sale as SaleContract } from '@foldwright/shared/contracts/sales';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** An order of a customer. Its state columns are derived from its facts. */
export class Sale extends Model<InferAttributes<Sale>, InferCreationAttributes<Sale>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare number: number;
  declare link: string;
  declare idempotencyKey: string;
  declare requestHash: string;
  declare customerId: CreationOptional<string | null>;
  declare customerName: string;
  declare customerEmail: string;
  declare address: unknown;
  declare currency: 'EUR' | 'USD';
  declare itemsMinor: number;
  declare postageMinor: number;
  declare taxName: string;
  declare taxBasisPoints: number;
  declare taxMinor: number;
  declare totalMinor: number;
  declare leavesInDays: number;
  declare state: SaleContract['state'];
  declare paymentState: SaleContract['paymentState'];
  declare refundedMinor: CreationOptional<number>;
  declare checkoutRound: CreationOptional<number>;
  declare checkoutId: CreationOptional<string | null>;
  declare revision: number;
  declare placedAt: Date;
}

/** The table `sales` on one connection. */
export function defineSale(sequelize: Sequelize): ModelStatic<Sale> {
  class BoundSale extends Sale {}
  BoundSale.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      number: { type: DataTypes.INTEGER, allowNull: false },
      link: { type: DataTypes.TEXT, allowNull: false },
      idempotencyKey: { type: DataTypes.TEXT, allowNull: false },
      requestHash: { type: DataTypes.TEXT, allowNull: false },
      customerId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      customerName: { type: DataTypes.TEXT, allowNull: false },
      customerEmail: { type: DataTypes.TEXT, allowNull: false },
      address: { type: DataTypes.JSONB, allowNull: false },
      currency: { type: DataTypes.TEXT, allowNull: false },
      itemsMinor: { type: DataTypes.INTEGER, allowNull: false },
      postageMinor: { type: DataTypes.INTEGER, allowNull: false },
      taxName: { type: DataTypes.TEXT, allowNull: false },
      taxBasisPoints: { type: DataTypes.INTEGER, allowNull: false },
      taxMinor: { type: DataTypes.INTEGER, allowNull: false },
      totalMinor: { type: DataTypes.INTEGER, allowNull: false },
      leavesInDays: { type: DataTypes.INTEGER, allowNull: false },
      state: { type: DataTypes.TEXT, allowNull: false },
      paymentState: { type: DataTypes.TEXT, allowNull: false },
      refundedMinor: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      checkoutRound: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      checkoutId: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      revision: { type: DataTypes.INTEGER, allowNull: false },
      placedAt: { type: DataTypes.DATE, allowNull: false },
    },
    { sequelize, modelName: 'Sale', tableName: 'sales', underscored: true, timestamps: false },
  );
  return BoundSale;
}
