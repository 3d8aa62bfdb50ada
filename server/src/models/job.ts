import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** Work of the worker process as people see it. The queue runs it; this row says how far it got. */
export class Job extends Model<InferAttributes<Job>, InferCreationAttributes<Job>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare kind: 'trace';
  declare state: 'waiting' | 'running' | 'done' | 'failed' | 'stopped';
  declare stages: unknown;
  declare failure: CreationOptional<object | null>;
  declare attempt: CreationOptional<number>;
  declare photoId: string | null;
  declare partId: string | null;
  declare queueJobId: CreationOptional<string | null>;
  declare workerId: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

/** The table `jobs` on one connection. */
export function defineJob(sequelize: Sequelize): ModelStatic<Job> {
  class BoundJob extends Job {}
  BoundJob.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      kind: { type: DataTypes.TEXT, allowNull: false },
      state: { type: DataTypes.TEXT, allowNull: false },
      stages: { type: DataTypes.JSONB, allowNull: false },
      failure: { type: DataTypes.JSONB, allowNull: true, defaultValue: null },
      attempt: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      photoId: { type: DataTypes.UUID, allowNull: true },
      partId: { type: DataTypes.UUID, allowNull: true },
      queueJobId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      workerId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
      updatedAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    },
    { sequelize, modelName: 'Job', tableName: 'jobs', underscored: true, timestamps: false },
  );
  return BoundJob;
}
