import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A photo of a template with what was read from it. */
export class Photo extends Model<InferAttributes<Photo>, InferCreationAttributes<Photo>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare partId: string;
  declare fileName: string;
  declare mediaType: string;
  declare byteLength: number;
  declare templateKind: string;
  declare templateThicknessMm: number;
  declare rulerXMm: number;
  declare rulerYMm: number;
  declare widthPx: number;
  declare heightPx: number;
  declare originalStoredAs: string;
  declare displayStoredAs: string;
  declare rectifiedStoredAs: CreationOptional<string | null>;
  declare rectified: CreationOptional<object | null>;
  declare trace: CreationOptional<object | null>;
  declare uploadedBy: string;
  declare uploadedAt: CreationOptional<Date>;
}

/** The table `photos` on one connection. */
export function definePhoto(sequelize: Sequelize): ModelStatic<Photo> {
  class BoundPhoto extends Photo {}
  BoundPhoto.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      partId: { type: DataTypes.UUID, allowNull: false },
      fileName: { type: DataTypes.TEXT, allowNull: false },
      mediaType: { type: DataTypes.TEXT, allowNull: false },
      byteLength: { type: DataTypes.INTEGER, allowNull: false },
      templateKind: { type: DataTypes.TEXT, allowNull: false },
      templateThicknessMm: { type: DataTypes.DOUBLE, allowNull: false },
      rulerXMm: { type: DataTypes.DOUBLE, allowNull: false },
      rulerYMm: { type: DataTypes.DOUBLE, allowNull: false },
      widthPx: { type: DataTypes.INTEGER, allowNull: false },
      heightPx: { type: DataTypes.INTEGER, allowNull: false },
      originalStoredAs: { type: DataTypes.TEXT, allowNull: false },
      displayStoredAs: { type: DataTypes.TEXT, allowNull: false },
      rectifiedStoredAs: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      rectified: { type: DataTypes.JSONB, allowNull: true, defaultValue: null },
      trace: { type: DataTypes.JSONB, allowNull: true, defaultValue: null },
      uploadedBy: { type: DataTypes.UUID, allowNull: false },
      uploadedAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    },
    { sequelize, modelName: 'Photo', tableName: 'photos', underscored: true, timestamps: false },
  );
  return BoundPhoto;
}
