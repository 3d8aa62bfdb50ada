import type { StockMove as StockMoveContract } from '@foldwright/shared/contracts/stock';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** Something that happened on the shelf. Never changed. */
export class StockMove extends Model<InferAttributes<StockMove>, InferCreationAttributes<StockMove>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare positionId: string;
  declare key: string;
  declare kind: StockMoveContract['kind'];
  declare onHandChange: number;
  declare reservedChange: number;
  declare onHandAfter: number;
  declare reason: string;
  declare saleId: CreationOptional<string | null>;
  declare orderId: CreationOptional<string | null>;
  declare byName: string;
  declare at: Date;
}

/** The table `stock_moves` on one connection. */
export function defineStockMove(sequelize: Sequelize): ModelStatic<StockMove> {
  class BoundStockMove extends StockMove {}
  BoundStockMove.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      positionId: { type: DataTypes.UUID, allowNull: false },
      key: { type: DataTypes.TEXT, allowNull: false },
      kind: { type: DataTypes.TEXT, allowNull: false },
      onHandChange: { type: DataTypes.INTEGER, allowNull: false },
      reservedChange: { type: DataTypes.INTEGER, allowNull: false },
      onHandAfter: { type: DataTypes.INTEGER, allowNull: false },
      reason: { type: DataTypes.TEXT, allowNull: false },
      saleId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      orderId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      byName: { type: DataTypes.TEXT, allowNull: false },
      at: { type: DataTypes.DATE, allowNull: false },
    },
    { sequelize, modelName: 'StockMove', tableName: 'stock_moves', underscored: true, timestamps: false },
  );
  return BoundStockMove;
}
