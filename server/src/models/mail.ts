import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A mail to go out. `key` says what it is about, so that nobody is told twice. */
export class Mail extends Model<InferAttributes<Mail>, InferCreationAttributes<Mail>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare key: string;
  declare orderId: string | null;
  declare saleId: CreationOptional<string | null>;
  declare recipient: string;
  declare subject: string;
  declare body: string;
  declare messageId: string;
  declare state: CreationOptional<'waiting' | 'sent' | 'failed'>;
  declare attempts: CreationOptional<number>;
  declare lastError: CreationOptional<string | null>;
  declare createdAt: Date;
  declare sentAt: CreationOptional<Date | null>;
}

/** The table `mails` on one connection. */
export function defineMail(sequelize: Sequelize): ModelStatic<Mail> {
  class BoundMail extends Mail {}
  BoundMail.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      key: { type: DataTypes.TEXT, allowNull: false },
      orderId: { type: DataTypes.UUID, allowNull: true },
      saleId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      recipient: { type: DataTypes.TEXT, allowNull: false },
      subject: { type: DataTypes.TEXT, allowNull: false },
      body: { type: DataTypes.TEXT, allowNull: false },
      messageId: { type: DataTypes.TEXT, allowNull: false },
      state: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'waiting' },
      attempts: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      lastError: { type: DataTypes.TEXT, allowNull: true, defaultValue: null },
      createdAt: { type: DataTypes.DATE, allowNull: false },
      sentAt: { type: DataTypes.DATE, allowNull: true, defaultValue: null },
    },
    { sequelize, modelName: 'Mail', tableName: 'mails', underscored: true, timestamps: false },
  );
  return BoundMail;
}
