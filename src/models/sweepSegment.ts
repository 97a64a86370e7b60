import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class SweepSegment extends Model<InferAttributes<SweepSegment>, InferCreationAttributes<SweepSegment>> {
  declare sweepId: number;
  declare seq: number;
  declare firstIndex: number;
  declare points: number;
  declare lowHz: number;
  declare highHz: number;
  declare startHz: CreationOptional<number | null>;
  declare stepHz: CreationOptional<number | null>;
  /** How `axis` is written; see tracePacking. */
  declare packing: CreationOptional<number>;
  declare axis: CreationOptional<Buffer | null>;
}

export function defineSweepSegment(sequelize: Sequelize): void {
  SweepSegment.init(
    {
      sweepId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sweep_id', primaryKey: true, allowNull: false },
      seq: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
      firstIndex: { type: DataTypes.INTEGER.UNSIGNED, field: 'first_index', allowNull: false },
      points: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      lowHz: { type: DataTypes.DOUBLE, field: 'low_hz', allowNull: false },
      highHz: { type: DataTypes.DOUBLE, field: 'high_hz', allowNull: false },
      startHz: { type: DataTypes.DOUBLE, field: 'start_hz', allowNull: true },
      stepHz: { type: DataTypes.DOUBLE, field: 'step_hz', allowNull: true },
      packing: { type: DataTypes.TINYINT.UNSIGNED, allowNull: false, defaultValue: 0 },
      axis: { type: DataTypes.BLOB('medium'), allowNull: true },
    },
    { sequelize, modelName: 'SweepSegment', tableName: 'sweep_segments', timestamps: false },
  );
}
