import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** Commands that were accepted together. `revision` is the draft’s after them. */
export class CommandBatch extends Model<InferAttributes<CommandBatch>, InferCreationAttributes<CommandBatch>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare draftId: string;
  declare batchId: string;
  declare revision: number;
  declare clientId: string;
  declare commands: unknown;
  declare userId: string;
  declare createdAt: CreationOptional<Date>;
}

/** The table `command_batches` on one connection. */
export function defineCommandBatch(sequelize: Sequelize): ModelStatic<CommandBatch> {
  class BoundCommandBatch extends CommandBatch {}
  BoundCommandBatch.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      draftId: { type: DataTypes.UUID, allowNull: false },
      batchId: { type: DataTypes.UUID, allowNull: false },
      revision: { type: DataTypes.INTEGER, allowNull: false },
      clientId: { type: DataTypes.TEXT, allowNull: false },
      commands: { type: DataTypes.JSONB, allowNull: false },
      userId: { type: DataTypes.UUID, allowNull: false },
      createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    },
    { sequelize, modelName: 'CommandBatch', tableName: 'command_batches', underscored: true, timestamps: false },
  );
  return BoundCommandBatch;
}
