import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A file written at release. `paper` is `none` for files that have none. */
export class RevisionFile extends Model<InferAttributes<RevisionFile>, InferCreationAttributes<RevisionFile>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare revisionId: string;
  declare kind: 'dxf' | 'drawing' | 'full-size-print' | 'step';
  declare stock: 'trial' | 'production';
  declare paper: 'none' | 'A4' | 'Letter';
  declare fileName: string;
  declare storedAs: string;
  declare contentType: string;
  declare byteLength: number;
  declare sha256: string;
}

/** The table `revision_files` on one connection. */
export function defineRevisionFile(sequelize: Sequelize): ModelStatic<RevisionFile> {
  class BoundRevisionFile extends RevisionFile {}
  BoundRevisionFile.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      revisionId: { type: DataTypes.UUID, allowNull: false },
      kind: { type: DataTypes.TEXT, allowNull: false },
      stock: { type: DataTypes.TEXT, allowNull: false },
      paper: { type: DataTypes.TEXT, allowNull: false },
      fileName: { type: DataTypes.TEXT, allowNull: false },
      storedAs: { type: DataTypes.TEXT, allowNull: false },
      contentType: { type: DataTypes.TEXT, allowNull: false },
      byteLength: { type: DataTypes.INTEGER, allowNull: false },
      sha256: { type: DataTypes.TEXT, allowNull: false },
    },
    { sequelize, modelName: 'RevisionFile', tableName: 'revision_files', underscored: true, timestamps: false },
  );
  return BoundRevisionFile;
}
