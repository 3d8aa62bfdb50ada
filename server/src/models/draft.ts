import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** The editable state of a part. Closed when released; at most one is open for each part. */
export class Draft extends Model<InferAttributes<Draft>, InferCreationAttributes<Draft>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare partId: string;
  declare letter: string;
  declare revision: CreationOptional<number>;
  declare document: unknown;
  declare hasOutline: boolean;
  declare furthestStep: string;
  declare blockers: CreationOptional<number>;
  declare cautions: CreationOptional<number>;
  declare hints: CreationOptional<number>;
  declare updatedBy: string;
  declare updatedAt: CreationOptional<Date>;
  declare closedAt: CreationOptional<Date | null>;
  declare releasedRevisionId: CreationOptional<string | null>;
}

/** The table `drafts` on one connection. */
export function defineDraft(sequelize: Sequelize): ModelStatic<Draft> {
  class BoundDraft extends Draft {}
  BoundDraft.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      partId: { type: DataTypes.UUID, allowNull: false },
      letter: { type: DataTypes.TEXT, allowNull: false },
      revision: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      document: { type: DataTypes.JSONB, allowNull: false },
      hasOutline: { type: DataTypes.BOOLEAN, allowNull: false },
      furthestStep: { type: DataTypes.TEXT, allowNull: false },
      blockers: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      cautions: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      hints: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      updatedBy: { type: DataTypes.UUID, allowNull: false },
      updatedAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
      closedAt: { type: DataTypes.DATE, allowNull: true, defaultValue: null },
      releasedRevisionId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
    },
    { sequelize, modelName: 'Draft', tableName: 'drafts', underscored: true, timestamps: false },
  );
  return BoundDraft;
}
