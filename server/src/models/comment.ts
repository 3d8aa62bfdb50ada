import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A comment on a part, at a place of it or on the whole. */
export class Comment extends Model<InferAttributes<Comment>, InferCreationAttributes<Comment>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare key: string;
  declare partId: string;
  declare revisionId: CreationOptional<string | null>;
  declare letter: string;
  declare placeX: CreationOptional<number | null>;
  declare placeY: CreationOptional<number | null>;
  declare text: string;
  declare byName: string;
  declare byUser: CreationOptional<string | null>;
  declare reviewLinkId: CreationOptional<string | null>;
  declare at: Date;
  declare resolvedAt: CreationOptional<Date | null>;
}

/** The table `comments` on one connection. */
export function defineComment(sequelize: Sequelize): ModelStatic<Comment> {
  class BoundComment extends Comment {}
  BoundComment.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      key: { type: DataTypes.TEXT, allowNull: false },
      partId: { type: DataTypes.UUID, allowNull: false },
      revisionId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      letter: { type: DataTypes.TEXT, allowNull: false },
      placeX: { type: DataTypes.DOUBLE, allowNull: true, defaultValue: null },
      placeY: { type: DataTypes.DOUBLE, allowNull: true, defaultValue: null },
      text: { type: DataTypes.TEXT, allowNull: false },
      byName: { type: DataTypes.TEXT, allowNull: false },
      byUser: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      reviewLinkId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      at: { type: DataTypes.DATE, allowNull: false },
      resolvedAt: { type: DataTypes.DATE, allowNull: true, defaultValue: null },
    },
    { sequelize, modelName: 'Comment', tableName: 'comments', underscored: true, timestamps: false },
  );
  return BoundComment;
}
