import type { CrewRole } from '@foldwright/shared/contracts/members';
import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** An invitation by mail. Its link is kept as a hash only. */
export class Invitation extends Model<InferAttributes<Invitation>, InferCreationAttributes<Invitation>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare email: string;
  declare role: CrewRole;
  declare linkHash: string;
  declare invitedBy: string;
  declare invitedByName: string;
  declare sentAt: Date;
  declare expiresAt: Date;
  declare endedAt: CreationOptional<Date | null>;
  declare acceptedBy: CreationOptional<string | null>;
}

/** The table `invitations` on one connection. */
export function defineInvitation(sequelize: Sequelize): ModelStatic<Invitation> {
  class BoundInvitation extends Invitation {}
  BoundInvitation.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      email: { type: DataTypes.TEXT, allowNull: false },
      role: { type: DataTypes.TEXT, allowNull: false },
      linkHash: { type: DataTypes.TEXT, allowNull: false },
      invitedBy: { type: DataTypes.UUID, allowNull: false },
      invitedByName: { type: DataTypes.TEXT, allowNull: false },
      sentAt: { type: DataTypes.DATE, allowNull: false },
      expiresAt: { type: DataTypes.DATE, allowNull: false },
      endedAt: { type: DataTypes.DATE, allowNull: true, defaultValue: null },
      acceptedBy: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
    },
    { sequelize, modelName: 'Invitation', tableName: 'invitations', underscored: true, timestamps: false },
  );
  return BoundInvitation;
}
