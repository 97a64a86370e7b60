import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class IdempotencyKey extends Model<InferAttributes<IdempotencyKey>, InferCreationAttributes<IdempotencyKey>> {
  declare id: CreationOptional<number>;
  declare userId: number;
  declare key: string;
  declare operation: string;
  declare requestHash: string;
  declare status: number;
  declare reply: string;
  declare expiresAt: Date;
  declare createdAt: CreationOptional<Date>;
}

export function defineIdempotencyKey(sequelize: Sequelize): void {
  IdempotencyKey.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      key: { type: DataTypes.STRING(80), allowNull: false },
      operation: { type: DataTypes.STRING(80), allowNull: false },
      requestHash: { type: DataTypes.CHAR(64), field: 'request_hash', allowNull: false },
      status: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: false },
      reply: { type: DataTypes.TEXT('long'), allowNull: false },
      expiresAt: { type: DataTypes.DATE(3), field: 'expires_at', allowNull: false },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'IdempotencyKey', tableName: 'idempotency_keys', timestamps: true, updatedAt: false },
  );
}
