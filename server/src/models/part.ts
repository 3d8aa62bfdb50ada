import type { Hand } from '@foldwright/shared/contracts/stock';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A design with its drafts, revisions and photos. */
export class Part extends Model<InferAttributes<Part>, InferCreationAttributes<Part>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare number: string;
  declare name: string;
  /** Counts for revisions released from now on; each revision keeps the one it was released with. */
  declare hand: CreationOptional<Hand>;
  declare otherHandOf: CreationOptional<string | null>;
  declare revision: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

/** The table `parts` on one connection. */
export function definePart(sequelize: Sequelize): ModelStatic<Part> {
  class BoundPart extends Part {}
  BoundPart.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      number: { type: DataTypes.TEXT, allowNull: false },
      name: { type: DataTypes.TEXT, allowNull: false },
      hand: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'either' },
      otherHandOf: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      revision: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
      updatedAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    },
    { sequelize, modelName: 'Part', tableName: 'parts', underscored: true, timestamps: false },
  );
  return BoundPart;
}
