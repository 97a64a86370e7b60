import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare tokenHash: string;
  declare userId: number;
  declare assuranceLevel: CreationOptional<number>;
  declare authenticatedAt: Date;
  declare lastSeenAt: Date;
  declare expiresAt: Date;
  declare address: string;
  declare agent: string;
  declare endedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineSession(sequelize: Sequelize): void {
  Session.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      tokenHash: { type: DataTypes.CHAR(64), field: 'token_hash', allowNull: false },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      assuranceLevel: { type: DataTypes.TINYINT.UNSIGNED, field: 'assurance_level', allowNull: false, defaultValue: 1 },
      authenticatedAt: { type: DataTypes.DATE(3), field: 'authenticated_at', allowNull: false },
      lastSeenAt: { type: DataTypes.DATE(3), field: 'last_seen_at', allowNull: false },
      expiresAt: { type: DataTypes.DATE(3), field: 'expires_at', allowNull: false },
      address: { type: DataTypes.STRING(45), allowNull: false },
      agent: { type: DataTypes.STRING(200), allowNull: false },
      endedAt: { type: DataTypes.DATE(3), field: 'ended_at', allowNull: true },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'Session', tableName: 'sessions', timestamps: true, updatedAt: false },
  );
}
