import { DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from 'sequelize';

export class EvaluationLayer extends Model<InferAttributes<EvaluationLayer>, InferCreationAttributes<EvaluationLayer>> {
  declare evaluationId: number;
  declare traceIndex: number;
  declare columns: number;
  declare layer: Buffer;
}

export function defineEvaluationLayer(sequelize: Sequelize): void {
  EvaluationLayer.init(
    {
      evaluationId: { type: DataTypes.BIGINT.UNSIGNED, field: 'evaluation_id', primaryKey: true, allowNull: false },
      traceIndex: { type: DataTypes.SMALLINT.UNSIGNED, field: 'trace_index', primaryKey: true, allowNull: false },
      columns: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      layer: { type: DataTypes.BLOB('medium'), allowNull: false },
    },
    { sequelize, modelName: 'EvaluationLayer', tableName: 'evaluation_layers', timestamps: false },
  );
}
