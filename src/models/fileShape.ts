import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { StoredShapeAnswers } from './stored';

/** How the files of one layout were read last; one row per shape, proposed for the next file that has it. */
export class FileShape extends Model<InferAttributes<FileShape>, InferCreationAttributes<FileShape>> {
  declare id: CreationOptional<number>;
  declare shape: string;
  declare answers: StoredShapeAnswers;
  /** The run it was kept as last. */
  declare sweepId: number;
  /** How many runs were kept from files of this shape. */
  declare kept: CreationOptional<number>;
  declare userId: number;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineFileShape(sequelize: Sequelize): void {
  FileShape.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      shape: { type: DataTypes.CHAR(64), allowNull: false },
      answers: { type: DataTypes.JSON, allowNull: false },
      sweepId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sweep_id', allowNull: false },
      kept: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    { sequelize, modelName: 'FileShape', tableName: 'file_shapes', timestamps: true },
  );
}
