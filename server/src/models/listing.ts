import type { Listing as ListingContract } from '@foldwright/shared/contracts/shop';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** What the shop offers: a released revision or a kit, at a price. */
export class Listing extends Model<InferAttributes<Listing>, InferCreationAttributes<Listing>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare state: CreationOptional<ListingContract['state']>;
  declare revisionId: CreationOptional<string | null>;
  declare kitId: CreationOptional<string | null>;
  declare slug: string;
  declare title: string;
  declare summary: string;
  declare fits: string;
  declare doesNotFit: string;
  declare fittingSteps: string;
  declare priceMinor: number;
  declare finishes: unknown;
  declare leadTimeDays: number;
  declare revision: CreationOptional<number>;
  declare createdAt: Date;
}

/** The table `listings` on one connection. */
export function defineListing(sequelize: Sequelize): ModelStatic<Listing> {
  class BoundListing extends Listing {}
  BoundListing.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      state: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'draft' },
      revisionId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      kitId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      slug: { type: DataTypes.TEXT, allowNull: false },
      title: { type: DataTypes.TEXT, allowNull: false },
      summary: { type: DataTypes.TEXT, allowNull: false },
      fits: { type: DataTypes.TEXT, allowNull: false },
      doesNotFit: { type: DataTypes.TEXT, allowNull: false },
      fittingSteps: { type: DataTypes.TEXT, allowNull: false },
      priceMinor: { type: DataTypes.INTEGER, allowNull: false },
      finishes: { type: DataTypes.JSONB, allowNull: false },
      leadTimeDays: { type: DataTypes.INTEGER, allowNull: false },
      revision: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE, allowNull: false },
    },
    { sequelize, modelName: 'Listing', tableName: 'listings', underscored: true, timestamps: false },
  );
  return BoundListing;
}
