import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class SignalPath extends Model<InferAttributes<SignalPath>, InferCreationAttributes<SignalPath>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare code: string;
  declare name: string;
  declare port: 'enclosure' | 'ac-mains' | 'wired-network';
  declare position: string;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineSignalPath(sequelize: Sequelize): void {
  SignalPath.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      code: { type: DataTypes.STRING(20), allowNull: false },
      name: { type: DataTypes.STRING(160), allowNull: false },
      port: { type: DataTypes.ENUM('enclosure', 'ac-mains', 'wired-network'), allowNull: false },
      position: { type: DataTypes.STRING(60), allowNull: false },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    { sequelize, modelName: 'SignalPath', tableName: 'signal_paths', timestamps: true },
  );
}
