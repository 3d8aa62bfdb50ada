import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** What lies on the shelf of one thing. Changed only together with a move. */
export class StockPosition extends Model<InferAttributes<StockPosition>, InferCreationAttributes<StockPosition>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare revisionId: CreationOptional<string | null>;
  declare finishId: CreationOptional<string | null>;
  declare hardwareId: CreationOptional<string | null>;
  declare onHand: CreationOptional<number>;
  declare reserved: CreationOptional<number>;
}

/** The table `stock_positions` on one connection. */
export function defineStockPosition(sequelize: Sequelize): ModelStatic<StockPosition> {
  class BoundStockPosition extends StockPosition {}
  BoundStockPosition.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      revisionId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      finishId: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      hardwareId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      onHand: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      reserved: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    },
    { sequelize, modelName: 'StockPosition', tableName: 'stock_positions', underscored: true, timestamps: false },
  );
  return BoundStockPosition;
}
