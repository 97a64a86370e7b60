import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class Sample extends Model<InferAttributes<Sample>, InferCreationAttributes<Sample>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare jobId: number;
  declare code: string;
  declare serial: string;
  declare firmware: string;
  declare description: string;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineSample(sequelize: Sequelize): void {
  Sample.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      jobId: { type: DataTypes.BIGINT.UNSIGNED, field: 'job_id', allowNull: false },
      code: { type: DataTypes.STRING(20), allowNull: false },
      serial: { type: DataTypes.STRING(80), allowNull: false },
      firmware: { type: DataTypes.STRING(80), allowNull: false },
      description: { type: DataTypes.STRING(2000), allowNull: false },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    { sequelize, modelName: 'Sample', tableName: 'samples', timestamps: true },
  );
}
