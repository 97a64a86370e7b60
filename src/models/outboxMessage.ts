import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class OutboxMessage extends Model<InferAttributes<OutboxMessage>, InferCreationAttributes<OutboxMessage>> {
  declare id: CreationOptional<number>;
  declare kind: string;
  declare payload: Record<string, unknown>;
  declare state: CreationOptional<'queued' | 'sending' | 'sent' | 'refused'>;
  declare availableAt: Date;
  declare leasedUntil: CreationOptional<Date | null>;
  declare leaseOwner: CreationOptional<string | null>;
  declare attempts: CreationOptional<number>;
  declare messageId: CreationOptional<string | null>;
  declare lastError: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare doneAt: CreationOptional<Date | null>;
}

export function defineOutboxMessage(sequelize: Sequelize): void {
  OutboxMessage.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      kind: { type: DataTypes.STRING(40), allowNull: false },
      payload: { type: DataTypes.JSON, allowNull: false },
      state: { type: DataTypes.ENUM('queued', 'sending', 'sent', 'refused'), allowNull: false, defaultValue: 'queued' },
      availableAt: { type: DataTypes.DATE(3), field: 'available_at', allowNull: false },
      leasedUntil: { type: DataTypes.DATE(3), field: 'leased_until', allowNull: true },
      leaseOwner: { type: DataTypes.STRING(40), field: 'lease_owner', allowNull: true },
      attempts: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
      messageId: { type: DataTypes.STRING(160), field: 'message_id', allowNull: true },
      lastError: { type: DataTypes.STRING(500), field: 'last_error', allowNull: true },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      doneAt: { type: DataTypes.DATE(3), field: 'done_at', allowNull: true },
    },
    { sequelize, modelName: 'OutboxMessage', tableName: 'outbox', timestamps: true, updatedAt: false },
  );
}
