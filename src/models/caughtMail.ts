import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** An e-mail of the demo that was caught on this machine and goes nowhere. */
export class CaughtMail extends Model<InferAttributes<CaughtMail>, InferCreationAttributes<CaughtMail>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare messageId: string;
  declare sender: string;
  declare recipient: string;
  declare subject: string;
  declare text: string;
  declare expiresAt: Date;
  declare createdAt: CreationOptional<Date>;
}

export function defineCaughtMail(sequelize: Sequelize): void {
  CaughtMail.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      messageId: { type: DataTypes.STRING(200), field: 'message_id', allowNull: false },
      sender: { type: DataTypes.STRING(400), allowNull: false },
      recipient: { type: DataTypes.STRING(400), allowNull: false },
      subject: { type: DataTypes.STRING(500), allowNull: false },
      text: { type: DataTypes.TEXT('medium'), allowNull: false },
      expiresAt: { type: DataTypes.DATE(3), field: 'expires_at', allowNull: false },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'CaughtMail', tableName: 'caught_mails', timestamps: true, updatedAt: false },
  );
}
