import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A parcel that left. */
export class Shipment extends Model<InferAttributes<Shipment>, InferCreationAttributes<Shipment>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare saleId: string;
  declare number: number;
  declare carrier: string;
  declare trackingCode: CreationOptional<string | null>;
  declare shippedAt: Date;
  declare deliveredAt: CreationOptional<Date | null>;
}

/** The table `shipments` on one connection. */
export function defineShipment(sequelize: Sequelize): ModelStatic<Shipment> {
  class BoundShipment extends Shipment {}
  BoundShipment.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      saleId: { type: DataTypes.UUID, allowNull: false },
      number: { type: DataTypes.INTEGER, allowNull: false },
      carrier: { type: DataTypes.TEXT, allowNull: false },
      trackingCode: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      shippedAt: { type: DataTypes.DATE, allowNull: false },
      deliveredAt: { type: DataTypes.DATE, allowNull: true, defaultValue: null },
    },
    { sequelize, modelName: 'Shipment', tableName: 'shipments', underscored: true, timestamps: false },
  );
  return BoundShipment;
}
