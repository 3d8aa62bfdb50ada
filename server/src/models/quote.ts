import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A question to the cutting service about a revision, with its answer. `breaks` is parsed where it is read. */
export class Quote extends Model<InferAttributes<Quote>, InferCreationAttributes<Quote>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare revisionId: string;
  declare revisionLetter: string;
  declare revisionHash: string;
  declare stock: 'trial' | 'production';
  declare stockLabel: string;
  declare statement: 'cut-and-bend-to-our-flat' | 'formed-sizes-rule';
  declare quantities: number[];
  declare state: 'asked' | 'priced' | 'refused' | 'unreachable';
  declare breaks: CreationOptional<readonly object[]>;
  declare refusal: CreationOptional<string | null>;
  declare quoteReference: CreationOptional<string | null>;
  declare validUntil: CreationOptional<Date | null>;
  declare askedBy: string;
  declare askedAt: Date;
  declare idempotencyKey: string;
}

/** The table `quotes` on one connection. */
export function defineQuote(sequelize: Sequelize): ModelStatic<Quote> {
  class BoundQuote extends Quote {}
  BoundQuote.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      revisionId: { type: DataTypes.UUID, allowNull: false },
      revisionLetter: { type: DataTypes.TEXT, allowNull: false },
      revisionHash: { type: DataTypes.TEXT, allowNull: false },
      stock: { type: DataTypes.TEXT, allowNull: false },
      stockLabel: { type: DataTypes.TEXT, allowNull: false },
      statement: { type: DataTypes.TEXT, allowNull: false },
      quantities: { type: DataTypes.JSONB, allowNull: false },
      state: { type: DataTypes.TEXT, allowNull: false },
      breaks: { type: DataTypes.JSONB, allowNull: false, defaultValue: [] },
      refusal: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      quoteReference: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      validUntil: { type: DataTypes.DATE, allowNull: true, defaultValue: null },
      askedBy: { type: DataTypes.UUID, allowNull: false },
      askedAt: { type: DataTypes.DATE, allowNull: false },
      idempotencyKey: { type: DataTypes.TEXT, allowNull: false },
    },
    { sequelize, modelName: 'Quote', tableName: 'quotes', underscored: true, timestamps: false },
  );
  return BoundQuote;
}
