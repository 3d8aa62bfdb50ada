import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A photo of a listing. */
export class ListingPhoto extends Model<InferAttributes<ListingPhoto>, InferCreationAttributes<ListingPhoto>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare listingId: string;
  declare position: number;
  declare description: string;
  declare storedAs: string;
  declare contentType: string;
}

/** The table `listing_photos` on one connection. */
export function defineListingPhoto(sequelize: Sequelize): ModelStatic<ListingPhoto> {
  class BoundListingPhoto extends ListingPhoto {}
  BoundListingPhoto.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      listingId: { type: DataTypes.UUID, allowNull: false },
      position: { type: DataTypes.INTEGER, allowNull: false },
      description: { type: DataTypes.TEXT, allowNull: false },
      storedAs: { type: DataTypes.TEXT, allowNull: false },
      contentType: { type: DataTypes.TEXT, allowNull: false },
    },
    { sequelize, modelName: 'ListingPhoto', tableName: 'listing_photos', underscored: true, timestamps: false },
  );
  return BoundListingPhoto;
}
