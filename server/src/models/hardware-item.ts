import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A screw, washer or other bought thing that goes with brackets. */
export class HardwareItem extends Model<InferAttributes<HardwareItem>, InferCreationAttributes<HardwareItem>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare name: string;
  declare specification: string;
  declare costMinor: number;
  declare currency: 'EUR' | 'USD';
  declare isInUse: CreationOptional<boolean>;
  declare revision: CreationOptional<number>;
}

/** The table `hardware_items` on one connection. */
export function defineHardwareItem(sequelize: Sequelize): ModelStatic<HardwareItem> {
  class BoundHardwareItem extends HardwareItem {}
  BoundHardwareItem.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      name: { type: DataTypes.TEXT, allowNull: false },
      specification: { type: DataTypes.TEXT, allowNull: false },
      costMinor: { type: DataTypes.INTEGER, allowNull: false },
      currency: { type: DataTypes.TEXT, allowNull: false },
      isInUse: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: true },
      revision: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    },
    { sequelize, modelName: 'HardwareItem', tableName: 'hardware_items', underscored: true, timestamps: false },
  );
  return BoundHardwareItem;
}
