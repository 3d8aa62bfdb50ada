import type { Sale as SaleContract } from '@foldwright/shared/contracts/sales';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** Something that happened to a sale. */
export class SaleFact extends Model<InferAttributes<SaleFact>, InferCreationAttributes<SaleFact>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare saleId: string;
  declare key: string;
  declare kind: SaleContract['events'][number]['kind'];
  declare at: Date;
  declare source: string;
  declare details: unknown;
}

/** The table `sale_facts` on one connection. */
export function defineSaleFact(sequelize: Sequelize): ModelStatic<SaleFact> {
  class BoundSaleFact extends SaleFact {}
  BoundSaleFact.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      saleId: { type: DataTypes.UUID, allowNull: false },
      key: { type: DataTypes.TEXT, allowNull: false },
      kind: { type: DataTypes.TEXT, allowNull: false },
      at: { type: DataTypes.DATE, allowNull: false },
      source: { type: DataTypes.TEXT, allowNull: false },
      details: { type: DataTypes.JSONB, allowNull: false },
    },
    { sequelize, modelName: 'SaleFact', tableName: 'sale_facts', underscored: true, timestamps: false },
  );
  return BoundSaleFact;
}
