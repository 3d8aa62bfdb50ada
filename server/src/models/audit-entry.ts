import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** Who did what. Never changed after it was written. */
export class AuditEntry extends Model<InferAttributes<AuditEntry>, InferCreationAttributes<AuditEntry>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare userId: string | null;
  declare byName: string;
  declare what: string;
  declare about: string | null;
  declare createdAt: CreationOptional<Date>;
}

/** The table `audit_entries` on one connection. */
export function defineAuditEntry(sequelize: Sequelize): ModelStatic<AuditEntry> {
  class BoundAuditEntry extends AuditEntry {}
  BoundAuditEntry.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      userId: { type: DataTypes.UUID, allowNull: true },
      byName: { type: DataTypes.TEXT, allowNull: false },
      what: { type: DataTypes.TEXT, allowNull: false },
      about: { type: DataTypes.TEXT, allowNull: true },
      createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    },
    { sequelize, modelName: 'AuditEntry', tableName: 'audit_entries', underscored: true, timestamps: false },
  );
  return BoundAuditEntry;
}
