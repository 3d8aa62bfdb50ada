import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** Hardware that goes with one bracket of a part when it is sold alone. */
export class PartHardware extends Model<InferAttributes<PartHardware>, InferCreationAttributes<PartHardware>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare partId: string;
  declare hardwareId: string;
  declare quantity: number;
}

/** The table `part_hardware` on one connection. */
export function definePartHardware(sequelize: Sequelize): ModelStatic<PartHardware> {
  class BoundPartHardware extends PartHardware {}
  BoundPartHardware.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      partId: { type: DataTypes.UUID, allowNull: false },
      hardwareId: { type: DataTypes.UUID, allowNull: false },
      quantity: { type: DataTypes.INTEGER, allowNull: false },
    },
    { sequelize, modelName: 'PartHardware', tableName: 'part_hardware', underscored: true, timestamps: false },
  );
  return BoundPartHardware;
}
