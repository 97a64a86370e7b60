import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { TokenScope } from './stored';

export class ApiToken extends Model<InferAttributes<ApiToken>, InferCreationAttributes<ApiToken>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare userId: number;
  declare name: string;
  declare tokenHash: string;
  declare scopes: TokenScope[];
  declare lastUsedAt: CreationOptional<Date | null>;
  declare expiresAt: CreationOptional<Date | null>;
  declare revokedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineApiToken(sequelize: Sequelize): void {
  ApiToken.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      name: { type: DataTypes.STRING(80), allowNull: false },
      tokenHash: { type: DataTypes.CHAR(64), field: 'token_hash', allowNull: false },
      scopes: { type: DataTypes.JSON, allowNull: false },
      lastUsedAt: { type: DataTypes.DATE(3), field: 'last_used_at', allowNull: true },
      expiresAt: { type: DataTypes.DATE(3), field: 'expires_at', allowNull: true },
      revokedAt: { type: DataTypes.DATE(3), field: 'revoked_at', allowNull: true },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'ApiToken', tableName: 'api_tokens', timestamps: true, updatedAt: false },
  );
}
