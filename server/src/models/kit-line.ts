import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** One line of a bill of materials: a released bracket, or hardware. */
export class KitLine extends Model<InferAttributes<KitLine>, InferCreationAttributes<KitLine>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare kitId: string;
  declare position: number;
  declare revisionId: CreationOptional<string | null>;
  declare finishId: CreationOptional<string | null>;
  declare hardwareId: CreationOptional<string | null>;
  declare quantity: number;
}

/** The table `kit_lines` on one connection. */
export function defineKitLine(sequelize: Sequelize): ModelStatic<KitLine> {
  class BoundKitLine extends KitLine {}
  BoundKitLine.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      kitId: { type: DataTypes.UUID, allowNull: false },
      position: { type: DataTypes.INTEGER, allowNull: false },
      revisionId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      finishId: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      hardwareId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      quantity: { type: DataTypes.INTEGER, allowNull: false },
    },
    { sequelize, modelName: 'KitLine', tableName: 'kit_lines', underscored: true, timestamps: false },
  );
  return BoundKitLine;
}
