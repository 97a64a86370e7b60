import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class TraceSegment extends Model<InferAttributes<TraceSegment>, InferCreationAttributes<TraceSegment>> {
  declare sweepId: number;
  declare traceIndex: number;
  declare seq: number;
  declare lowLevel: CreationOptional<number | null>;
  declare highLevel: CreationOptional<number | null>;
  /** How `levels` are written; see tracePacking. */
  declare packing: CreationOptional<number>;
  declare levels: Buffer;
}

export function defineTraceSegment(sequelize: Sequelize): void {
  TraceSegment.init(
    {
      sweepId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sweep_id', primaryKey: true, allowNull: false },
      traceIndex: { type: DataTypes.SMALLINT.UNSIGNED, field: 'trace_index', primaryKey: true, allowNull: false },
      seq: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
      lowLevel: { type: DataTypes.FLOAT, field: 'low_level', allowNull: true },
      highLevel: { type: DataTypes.FLOAT, field: 'high_level', allowNull: true },
      packing: { type: DataTypes.TINYINT.UNSIGNED, allowNull: false, defaultValue: 0 },
      levels: { type: DataTypes.BLOB('medium'), allowNull: false },
    },
    { sequelize, modelName: 'TraceSegment', tableName: 'trace_segments', timestamps: false },
  );
}
