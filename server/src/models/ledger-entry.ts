import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** One entry of the books. Never changed. */
export class LedgerEntry extends Model<InferAttributes<LedgerEntry>, InferCreationAttributes<LedgerEntry>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare key: string;
  declare at: Date;
  declare text: string;
  declare saleId: CreationOptional<string | null>;
  declare orderId: CreationOptional<string | null>;
}

/** The table `ledger_entries` on one connection. */
export function defineLedgerEntry(sequelize: Sequelize): ModelStatic<LedgerEntry> {
  class BoundLedgerEntry extends LedgerEntry {}
  BoundLedgerEntry.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      key: { type: DataTypes.TEXT, allowNull: false },
      at: { type: DataTypes.DATE, allowNull: false },
      text: { type: DataTypes.TEXT, allowNull: false },
      saleId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      orderId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
    },
    { sequelize, modelName: 'LedgerEntry', tableName: 'ledger_entries', underscored: true, timestamps: false },
  );
  return BoundLedgerEntry;
}
