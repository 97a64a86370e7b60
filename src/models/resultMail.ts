import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class ResultMail extends Model<InferAttributes<ResultMail>, InferCreationAttributes<ResultMail>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  /** The same for every recipient of one press of the button. */
  declare sendingId: string;
  declare sampleId: number;
  declare stateId: number;
  declare recipientId: number;
  declare subject: string;
  declare text: string;
  declare html: string;
  /** Public ids of the evaluations it rests on. */
  declare evaluationIds: string[];
  declare outboxId: number;
  declare senderId: number;
  declare createdAt: CreationOptional<Date>;
}

export function defineResultMail(sequelize: Sequelize): void {
  ResultMail.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      sendingId: { type: DataTypes.CHAR(16), field: 'sending_id', allowNull: false },
      sampleId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sample_id', allowNull: false },
      stateId: { type: DataTypes.BIGINT.UNSIGNED, field: 'state_id', allowNull: false },
      recipientId: { type: DataTypes.BIGINT.UNSIGNED, field: 'recipient_id', allowNull: false },
      subject: { type: DataTypes.STRING(300), allowNull: false },
      text: { type: DataTypes.TEXT('medium'), allowNull: false },
      html: { type: DataTypes.TEXT('medium'), allowNull: false },
      evaluationIds: { type: DataTypes.JSON, field: 'evaluation_ids', allowNull: false },
      outboxId: { type: DataTypes.BIGINT.UNSIGNED, field: 'outbox_id', allowNull: false },
      senderId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sender_id', allowNull: false },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'ResultMail', tableName: 'result_mails', timestamps: true, updatedAt: false },
  );
}
