import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class TestPosition extends Model<InferAttributes<TestPosition>, InferCreationAttributes<TestPosition>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  /** A, B, C… as the lab calls it. */
  declare code: string;
  declare name: string;
  declare description: string;
  declare capabilities: string[];
  declare state: CreationOptional<'in-use' | 'retired'>;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineTestPosition(sequelize: Sequelize): void {
  TestPosition.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      code: { type: DataTypes.STRING(8), allowNull: false },
      name: { type: DataTypes.STRING(80), allowNull: false },
      description: { type: DataTypes.STRING(500), allowNull: false },
      capabilities: { type: DataTypes.JSON, allowNull: false },
      state: { type: DataTypes.ENUM('in-use', 'retired'), allowNull: false, defaultValue: 'in-use' },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    { sequelize, modelName: 'TestPosition', tableName: 'test_positions', timestamps: true },
  );
}
