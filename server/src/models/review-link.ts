import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A private link to one revision. Kept as a hash only. */
export class ReviewLink extends Model<InferAttributes<ReviewLink>, InferCreationAttributes<ReviewLink>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare revisionId: string;
  declare linkHash: string;
  declare guestName: string;
  declare madeBy: string;
  declare madeByName: string;
  declare madeByEmail: string;
  declare madeAt: Date;
  declare expiresAt: Date;
  declare withdrawnAt: CreationOptional<Date | null>;
}

/** The table `review_links` on one connection. */
export function defineReviewLink(sequelize: Sequelize): ModelStatic<ReviewLink> {
  class BoundReviewLink extends ReviewLink {}
  BoundReviewLink.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      revisionId: { type: DataTypes.UUID, allowNull: false },
      linkHash: { type: DataTypes.TEXT, allowNull: false },
      guestName: { type: DataTypes.TEXT, allowNull: false },
      madeBy: { type: DataTypes.UUID, allowNull: false },
      madeByName: { type: DataTypes.TEXT, allowNull: false },
      madeByEmail: { type: DataTypes.TEXT, allowNull: false },
      madeAt: { type: DataTypes.DATE, allowNull: false },
      expiresAt: { type: DataTypes.DATE, allowNull: false },
      withdrawnAt: { type: DataTypes.DATE, allowNull: true, defaultValue: null },
    },
    { sequelize, modelName: 'ReviewLink', tableName: 'review_links', underscored: true, timestamps: false },
  );
  return BoundReviewLink;
}
