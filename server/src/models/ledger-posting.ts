import type { Ledger } from '@foldwright/shared/contracts/ledger';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** One side of an entry of the books; a debit is above zero. Never changed. */
export class LedgerPosting extends Model<InferAttributes<LedgerPosting>, InferCreationAttributes<LedgerPosting>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare entryId: string;
  declare account: Ledger['money']['accounts'][number]['account'];
  declare amountMinor: number;
  declare currency: 'EUR' | 'USD';
}

/** The table `ledger_postings` on one connection. */
export function defineLedgerPosting(sequelize: Sequelize): ModelStatic<LedgerPosting> {
  class BoundLedgerPosting extends LedgerPosting {}
  BoundLedgerPosting.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      entryId: { type: DataTypes.UUID, allowNull: false },
      account: { type: DataTypes.TEXT, allowNull: false },
      amountMinor: { type: DataTypes.INTEGER, allowNull: false },
      currency: { type: DataTypes.TEXT, allowNull: false },
    },
    { sequelize, modelName: 'LedgerPosting', tableName: 'ledger_postings', underscored: true, timestamps: false },
  );
  return BoundLedgerPosting;
}
