import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** What was in a parcel. Never changed. */
export class ShipmentItem extends Model<InferAttributes<ShipmentItem>, InferCreationAttributes<ShipmentItem>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare shipmentId: string;
  declare itemId: string;
  declare quantity: number;
}

/** The table `shipment_items` on one connection. */
export function defineShipmentItem(sequelize: Sequelize): ModelStatic<ShipmentItem> {
  class BoundShipmentItem extends ShipmentItem {}
  BoundShipmentItem.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      shipmentId: { type: DataTypes.UUID, allowNull: false },
      itemId: { type: DataTypes.UUID, allowNull: false },
      quantity: { type: DataTypes.INTEGER, allowNull: false },
    },
    { sequelize, modelName: 'ShipmentItem', tableName: 'shipment_items', underscored: true, timestamps: false },
  );
  return BoundShipmentItem;
}
