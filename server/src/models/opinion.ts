import type { Opinion as OpinionContract } from '@foldwright/shared/contracts/reviews';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** What somebody said of a released revision. Never changed. */
export class Opinion extends Model<InferAttributes<Opinion>, InferCreationAttributes<Opinion>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare key: string;
  declare revisionId: string;
  declare letter: string;
  declare hash: string;
  declare verdict: OpinionContract['verdict'];
  declare note: string;
  declare byName: string;
  declare byUser: CreationOptional<string | null>;
  declare reviewLinkId: CreationOptional<string | null>;
  declare at: Date;
}

/** The table `opinions` on one connection. */
export function defineOpinion(sequelize: Sequelize): ModelStatic<Opinion> {
  class BoundOpinion extends Opinion {}
  BoundOpinion.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      key: { type: DataTypes.TEXT, allowNull: false },
      revisionId: { type: DataTypes.UUID, allowNull: false },
      letter: { type: DataTypes.TEXT, allowNull: false },
      hash: { type: DataTypes.TEXT, allowNull: false },
      verdict: { type: DataTypes.TEXT, allowNull: false },
      note: { type: DataTypes.TEXT, allowNull: false },
      byName: { type: DataTypes.TEXT, allowNull: false },
      byUser: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      reviewLinkId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      at: { type: DataTypes.DATE, allowNull: false },
    },
    { sequelize, modelName: 'Opinion', tableName: 'opinions', underscored: true, timestamps: false },
  );
  return BoundOpinion;
}
