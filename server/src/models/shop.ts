import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** Address, tax, postage and words of a workshop’s shop. */
export class Shop extends Model<InferAttributes<Shop>, InferCreationAttributes<Shop>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare slug: string;
  declare isOpen: CreationOptional<boolean>;
  declare headline: string;
  declare about: string;
  declare currency: 'EUR' | 'USD';
  declare taxName: string;
  declare taxBasisPoints: number;
  declare taxNumber: string;
  declare postageMinor: number;
  declare packingDays: number;
  declare senderAddress: string;
  declare questionsTo: string;
  declare revision: CreationOptional<number>;
}

/** The table `shops` on one connection. */
export function defineShop(sequelize: Sequelize): ModelStatic<Shop> {
  class BoundShop extends Shop {}
  BoundShop.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      slug: { type: DataTypes.TEXT, allowNull: false },
      isOpen: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
      headline: { type: DataTypes.TEXT, allowNull: false },
      about: { type: DataTypes.TEXT, allowNull: false },
      currency: { type: DataTypes.TEXT, allowNull: false },
      taxName: { type: DataTypes.TEXT, allowNull: false },
      taxBasisPoints: { type: DataTypes.INTEGER, allowNull: false },
      taxNumber: { type: DataTypes.TEXT, allowNull: false },
      postageMinor: { type: DataTypes.INTEGER, allowNull: false },
      packingDays: { type: DataTypes.INTEGER, allowNull: false },
      senderAddress: { type: DataTypes.TEXT, allowNull: false },
      questionsTo: { type: DataTypes.TEXT, allowNull: false },
      revision: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    },
    { sequelize, modelName: 'Shop', tableName: 'shops', underscored: true, timestamps: false },
  );
  return BoundShop;
}
