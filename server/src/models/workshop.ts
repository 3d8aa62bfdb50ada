import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A workshop: the owner of everything else. Not scoped, since it is the scope. */
export class Workshop extends Model<InferAttributes<Workshop>, InferCreationAttributes<Workshop>> {
  declare id: CreationOptional<string>;
  declare name: string;
  declare numberPrefix: string;
  declare timeZone: CreationOptional<string>;
  declare createdAt: CreationOptional<Date>;
}

/** The table `workshops` on one connection. */
export function defineWorkshop(sequelize: Sequelize): ModelStatic<Workshop> {
  class BoundWorkshop extends Workshop {}
  BoundWorkshop.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      name: { type: DataTypes.TEXT, allowNull: false },
      numberPrefix: { type: DataTypes.TEXT, allowNull: false },
      timeZone: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'UTC' },
      createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    },
    { sequelize, modelName: 'Workshop', tableName: 'workshops', underscored: true, timestamps: false },
  );
  return BoundWorkshop;
}
