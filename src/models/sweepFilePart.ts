import { DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from 'sequelize';

export class SweepFilePart extends Model<InferAttributes<SweepFilePart>, InferCreationAttributes<SweepFilePart>> {
  declare sweepFileId: number;
  declare seq: number;
  declare part: Buffer;
}

export function defineSweepFilePart(sequelize: Sequelize): void {
  SweepFilePart.init(
    {
      sweepFileId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sweep_file_id', primaryKey: true, allowNull: false },
      seq: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
      part: { type: DataTypes.BLOB('medium'), allowNull: false },
    },
    { sequelize, modelName: 'SweepFilePart', tableName: 'sweep_file_parts', timestamps: false },
  );
}
