import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A kit. Its bill of materials is in its lines. */
export class Kit extends Model<InferAttributes<Kit>, InferCreationAttributes<Kit>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare number: string;
  declare name: string;
  declare note: string;
  declare revision: CreationOptional<number>;
  declare createdAt: Date;
}

/** The table `kits` on one connection. */
export function defineKit(sequelize: Sequelize): ModelStatic<Kit> {
  class BoundKit extends Kit {}
  BoundKit.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      number: { type: DataTypes.TEXT, allowNull: false },
      name: { type: DataTypes.TEXT, allowNull: false },
      note: { type: DataTypes.TEXT, allowNull: false },
      revision: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE, allowNull: false },
    },
    { sequelize, modelName: 'Kit', tableName: 'kits', underscored: true, timestamps: false },
  );
  return BoundKit;
}
