import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class Authenticator extends Model<InferAttributes<Authenticator>, InferCreationAttributes<Authenticator>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare userId: number;
  declare kind: 'totp' | 'webauthn' | 'recovery';
  declare label: string;
  declare secret: Buffer;
  declare lastUsedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineAuthenticator(sequelize: Sequelize): void {
  Authenticator.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      kind: { type: DataTypes.ENUM('totp', 'webauthn', 'recovery'), allowNull: false },
      label: { type: DataTypes.STRING(80), allowNull: false },
      secret: { type: DataTypes.STRING(1024, true), allowNull: false },
      lastUsedAt: { type: DataTypes.DATE(3), field: 'last_used_at', allowNull: true },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'Authenticator', tableName: 'authenticators', timestamps: true, updatedAt: false },
  );
}
