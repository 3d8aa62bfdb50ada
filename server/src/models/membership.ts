import type { Role } from '@foldwright/shared/contracts/route';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** What a person may do in one workshop. */
export class Membership extends Model<InferAttributes<Membership>, InferCreationAttributes<Membership>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare userId: string;
  declare role: Exclude<Role, 'operator'>;
  declare revision: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
}

/** The table `memberships` on one connection. */
export function defineMembership(sequelize: Sequelize): ModelStatic<Membership> {
  class BoundMembership extends Membership {}
  BoundMembership.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      userId: { type: DataTypes.UUID, allowNull: false },
      role: { type: DataTypes.TEXT, allowNull: false },
      revision: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    },
    { sequelize, modelName: 'Membership', tableName: 'memberships', underscored: true, timestamps: false },
  );
  return BoundMembership;
}
