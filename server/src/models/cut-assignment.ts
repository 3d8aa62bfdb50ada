import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** What an order to the cutting service makes for a sale. */
export class CutAssignment extends Model<InferAttributes<CutAssignment>, InferCreationAttributes<CutAssignment>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare saleId: string;
  declare itemId: string;
  declare orderId: string;
  declare quantity: number;
  declare arrived: CreationOptional<number>;
}

/** The table `cut_assignments` on one connection. */
export function defineCutAssignment(sequelize: Sequelize): ModelStatic<CutAssignment> {
  class BoundCutAssignment extends CutAssignment {}
  BoundCutAssignment.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      saleId: { type: DataTypes.UUID, allowNull: false },
      itemId: { type: DataTypes.UUID, allowNull: false },
      orderId: { type: DataTypes.UUID, allowNull: false },
      quantity: { type: DataTypes.INTEGER, allowNull: false },
      arrived: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    },
    { sequelize, modelName: 'CutAssignment', tableName: 'cut_assignments', underscored: true, timestamps: false },
  );
  return BoundCutAssignment;
}
