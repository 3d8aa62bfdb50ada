import type { Hand } from '@foldwright/shared/contracts/stock';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A released revision: document, computed tables and versions as they were. Never changed. */
export class Revision extends Model<InferAttributes<Revision>, InferCreationAttributes<Revision>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare partId: string;
  declare letter: string;
  declare position: number;
  declare hash: string;
  declare hand: CreationOptional<Hand>;
  declare note: string;
  declare document: unknown;
  declare computedTrial: unknown;
  declare computedProduction: unknown;
  declare acceptedCautionIds: unknown;
  declare rulesVersion: string;
  declare tablesVersion: string;
  declare releasedBy: string;
  declare releasedAt: Date;
}

/** The table `revisions` on one connection. */
export function defineRevision(sequelize: Sequelize): ModelStatic<Revision> {
  class BoundRevision extends Revision {}
  BoundRevision.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      partId: { type: DataTypes.UUID, allowNull: false },
      letter: { type: DataTypes.TEXT, allowNull: false },
      position: { type: DataTypes.INTEGER, allowNull: false },
      hash: { type: DataTypes.TEXT, allowNull: false },
      hand: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'either' },
      note: { type: DataTypes.TEXT, allowNull: false },
      document: { type: DataTypes.JSONB, allowNull: false },
      computedTrial: { type: DataTypes.JSONB, allowNull: false },
      computedProduction: { type: DataTypes.JSONB, allowNull: false },
      acceptedCautionIds: { type: DataTypes.JSONB, allowNull: false },
      rulesVersion: { type: DataTypes.TEXT, allowNull: false },
      tablesVersion: { type: DataTypes.TEXT, allowNull: false },
      releasedBy: { type: DataTypes.UUID, allowNull: false },
      releasedAt: { type: DataTypes.DATE, allowNull: false },
    },
    { sequelize, modelName: 'Revision', tableName: 'revisions', underscored: true, timestamps: false },
  );
  return BoundRevision;
}
