import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** One line of a sale as it was offered and paid for. */
export class SaleLine extends Model<InferAttributes<SaleLine>, InferCreationAttributes<SaleLine>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare saleId: string;
  declare position: number;
  declare listingId: string;
  declare kind: 'bracket' | 'kit';
  declare title: string;
  declare finishId: string;
  declare fittingSteps: string;
  declare quantity: number;
  declare cancelled: CreationOptional<number>;
  declare eachMinor: number;
  declare totalMinor: number;
  declare taxMinor: number;
}

/** The table `sale_lines` on one connection. */
export function defineSaleLine(sequelize: Sequelize): ModelStatic<SaleLine> {
  class BoundSaleLine extends SaleLine {}
  BoundSaleLine.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      saleId: { type: DataTypes.UUID, allowNull: false },
      position: { type: DataTypes.INTEGER, allowNull: false },
      listingId: { type: DataTypes.UUID, allowNull: false },
      kind: { type: DataTypes.TEXT, allowNull: false },
      title: { type: DataTypes.TEXT, allowNull: false },
      finishId: { type: DataTypes.TEXT, allowNull: false },
      fittingSteps: { type: DataTypes.TEXT, allowNull: false },
      quantity: { type: DataTypes.INTEGER, allowNull: false },
      cancelled: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      eachMinor: { type: DataTypes.INTEGER, allowNull: false },
      totalMinor: { type: DataTypes.INTEGER, allowNull: false },
      taxMinor: { type: DataTypes.INTEGER, allowNull: false },
    },
    { sequelize, modelName: 'SaleLine', tableName: 'sale_lines', underscored: true, timestamps: false },
  );
  return BoundSaleLine;
}
