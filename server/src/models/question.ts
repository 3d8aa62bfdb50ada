import type { CreationOptional, InferAttributes, InferCreationAttributes, ModelStatic, Sequelize } from 'sequelize';
import { DataTypes, Model } from 'sequelize';

/** A thread about fit, on a sale or before one. */
export class Question extends Model<InferAttributes<Question>, InferCreationAttributes<Question>> {
  declare id: CreationOptional<string>;
  declare workshopId: string;
  declare saleId: CreationOptional<string | null>;
  declare listingId: CreationOptional<string | null>;
  declare askerName: string;
  declare askerEmail: string;
  declare link: string;
  declare askedAt: Date;
  declare isAnswered: CreationOptional<boolean>;
}

/** The table `questions` on one connection. */
export function defineQuestion(sequelize: Sequelize): ModelStatic<Question> {
  class BoundQuestion extends Question {}
  BoundQuestion.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
      workshopId: { type: DataTypes.UUID, allowNull: false },
      saleId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      listingId: { type: DataTypes.UUID, allowNull: true, defaultValue: null },
      askerName: { type: DataTypes.TEXT, allowNull: false },
      askerEmail: { type: DataTypes.TEXT, allowNull: false },
      link: { type: DataTypes.TEXT, allowNull: false },
      askedAt: { type: DataTypes.DATE, allowNull: false },
      isAnswered: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
    },
    { sequelize, modelName: 'Question', tableName: 'questions', underscored: true, timestamps: false },
  );
  return BoundQuestion;
}
