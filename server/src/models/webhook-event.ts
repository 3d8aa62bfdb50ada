import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A signed message of an outside service, kept under its own id as it came. */
export class WebhookEvent extends Model<InferAttributes<WebhookEvent>, InferCreationAttributes<WebhookEvent>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare provider: 'payments' | 'cutting';
  declare eventId: string;
  declare kind: string;
  declare orderId: string | null;
  declare saleId: CreationOptional<string | null>;
  declare happenedAt: Date;
  declare body: string;
  declare receivedAt: Date;
}

/** The table `webhook_events` on one connection. */
export function defineWebhookEvent(sequelize: Sequelize): ModelStatic<WebhookEvent> {
  class BoundWebhookEvent extends WebhookEvent {}
  BoundWebhookEvent.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      provider: { type: DataTypes.TEXT, allowNull: false },
      eventId: { type: DataTypes.TEXT, allowNull: false },
      kind: { type: DataTypes.TEXT, allowNull: false },
      orderId: { type: DataTypes.UUID, allowNull: true },
      saleId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      happenedAt: { type: DataTypes.DATE, allowNull: false },
      body: { type: DataTypes.TEXT, allowNull: false },
      receivedAt: { type: DataTypes.DATE, allowNull: false },
    },
    { sequelize, modelName: 'WebhookEvent', tableName: 'webhook_events', underscored: true, timestamps: false },
  );
  return BoundWebhookEvent;
}
