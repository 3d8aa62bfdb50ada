import type { Hand } from '@foldwright/shared/contracts/stock';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** One thing that has to reach the customer, frozen with revision and hash as it was sold. */
export class SaleItem extends Model<InferAttributes<SaleItem>, InferCreationAttributes<SaleItem>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare saleId: string;
  declare lineId: string;
  declare position: number;
  declare revisionId: CreationOptional<string | null>;
  declare partId: CreationOptional<string | null>;
  declare partName: CreationOptional<string | null>;
  declare partNumber: CreationOptional<string | null>;
  declare letter: CreationOptional<string | null>;
  declare hash: CreationOptional<string | null>;
  declare hand: CreationOptional<Hand | null>;
  declare finishId: CreationOptional<string | null>;
  declare hardwareId: CreationOptional<string | null>;
  declare hardwareName: CreationOptional<string | null>;
  declare hardwareSpecification: CreationOptional<string | null>;
  declare perLine: number;
  declare quantity: number;
  declare reserved: CreationOptional<number>;
  declare shipped: CreationOptional<number>;
  declare cancelled: CreationOptional<number>;
  declare returned: CreationOptional<number>;
}

/** The table `sale_items` on one connection. */
export function defineSaleItem(sequelize: Sequelize): ModelStatic<SaleItem> {
  class BoundSaleItem extends SaleItem {}
  BoundSaleItem.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      saleId: { type: DataTypes.UUID, allowNull: false },
      lineId: { type: DataTypes.UUID, allowNull: false },
      position: { type: DataTypes.INTEGER, allowNull: false },
      revisionId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      partId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      partName: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      partNumber: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      letter: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      hash: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      hand: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      finishId: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      hardwareId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      hardwareName: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      hardwareSpecification: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      perLine: { type: DataTypes.INTEGER, allowNull: false },
      quantity: { type: DataTypes.INTEGER, allowNull: false },
      reserved: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      shipped: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      cancelled: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      returned: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    },
    { sequelize, modelName: 'SaleItem', tableName: 'sale_items', underscored: true, timestamps: false },
  );
  return BoundSaleItem;
}
