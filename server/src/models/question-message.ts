import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** One message of a thread about fit. Never changed. */
export class QuestionMessage extends Model<InferAttributes<QuestionMessage>, InferCreationAttributes<QuestionMessage>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare questionId: string;
  declare key: string;
  declare side: 'customer' | 'workshop';
  declare byName: string;
  declare text: string;
  declare at: Date;
}

/** The table `question_messages` on one connection. */
export function defineQuestionMessage(sequelize: Sequelize): ModelStatic<QuestionMessage> {
  class BoundQuestionMessage extends QuestionMessage {}
  BoundQuestionMessage.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      questionId: { type: DataTypes.UUID, allowNull: false },
      key: { type: DataTypes.TEXT, allowNull: false },
      side: { type: DataTypes.TEXT, allowNull: false },
      byName: { type: DataTypes.TEXT, allowNull: false },
      text: { type: DataTypes.TEXT, allowNull: false },
      at: { type: DataTypes.DATE, allowNull: false },
    },
    { sequelize, modelName: 'QuestionMessage', tableName: 'question_messages', underscored: true, timestamps: false },
  );
  return BoundQuestionMessage;
}
