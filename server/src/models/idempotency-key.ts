import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A key under which a request was done once, with the answer it got. */
export class IdempotencyKey extends Model<InferAttributes<IdempotencyKey>, InferCreationAttributes<IdempotencyKey>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare userId: string;
  declare route: string;
  declare key: string;
  declare requestHash: string;
  declare answer: unknown;
  declare createdAt: CreationOptional<Date>;
}

/** The table `idempotency_keys` on one connection. */
export function defineIdempotencyKey(sequelize: Sequelize): ModelStatic<IdempotencyKey> {
  class BoundIdempotencyKey extends IdempotencyKey {}
  BoundIdempotencyKey.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      userId: { type: DataTypes.UUID, allowNull: false },
      route: { type: DataTypes.TEXT, allowNull: false },
      key: { type: DataTypes.TEXT, allowNull: false },
      requestHash: { type: DataTypes.TEXT, allowNull: false },
      answer: { type: DataTypes.JSONB, allowNull: true },
      createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    },
    { sequelize, modelName: 'IdempotencyKey', tableName: 'idempotency_keys', underscored: true, timestamps: false },
  );
  return BoundIdempotencyKey;
}
