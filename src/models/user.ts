import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class User extends Model<InferAttributes<User>, InferCreationAttributes<User>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare organisationId: number;
  declare role: 'manager' | 'technician' | 'designer';
  declare name: string;
  declare email: string;
  declare passwordHash: CreationOptional<string | null>;
  declare disabledAt: CreationOptional<Date | null>;
  declare disabledReason: CreationOptional<string | null>;
  declare lastSignInAt: CreationOptional<Date | null>;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineUser(sequelize: Sequelize): void {
  User.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      organisationId: { type: DataTypes.BIGINT.UNSIGNED, field: 'organisation_id', allowNull: false },
      role: { type: DataTypes.ENUM('manager', 'technician', 'designer'), allowNull: false },
      name: { type: DataTypes.STRING(120), allowNull: false },
      email: { type: DataTypes.STRING(254), allowNull: false },
      passwordHash: { type: DataTypes.STRING(200), field: 'password_hash', allowNull: true },
      disabledAt: { type: DataTypes.DATE(3), field: 'disabled_at', allowNull: true },
      disabledReason: { type: DataTypes.STRING(300), field: 'disabled_reason', allowNull: true },
      lastSignInAt: { type: DataTypes.DATE(3), field: 'last_sign_in_at', allowNull: true },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    { sequelize, modelName: 'User', tableName: 'users', timestamps: true },
  );
}
