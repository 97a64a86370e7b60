import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class EvaluationCandidate extends Model<
  InferAttributes<EvaluationCandidate>,
  InferCreationAttributes<EvaluationCandidate>
> {
  declare evaluationId: number;
  declare rank: number;
  declare kind: 'peak' | 'floor';
  declare traceIndex: number;
  declare lineId: string;
  declare frequencyHz: number;
  declare fromHz: number;
  declare toHz: number;
  declare reading: number;
  declare level: number;
  declare limit: number;
  declare marginDb: number;
  declare uncertaintyDb: number;
  declare verdict: 'over' | 'needs-final' | 'inconclusive' | 'not-covered' | 'under';
  declare because: CreationOptional<string | null>;
}

export function defineEvaluationCandidate(sequelize: Sequelize): void {
  EvaluationCandidate.init(
    {
      evaluationId: { type: DataTypes.BIGINT.UNSIGNED, field: 'evaluation_id', primaryKey: true, allowNull: false },
      rank: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
      kind: { type: DataTypes.ENUM('peak', 'floor'), allowNull: false },
      traceIndex: { type: DataTypes.SMALLINT.UNSIGNED, field: 'trace_index', allowNull: false },
      lineId: { type: DataTypes.CHAR(16), field: 'line_id', allowNull: false },
      frequencyHz: { type: DataTypes.DOUBLE, field: 'frequency_hz', allowNull: false },
      fromHz: { type: DataTypes.DOUBLE, field: 'from_hz', allowNull: false },
      toHz: { type: DataTypes.DOUBLE, field: 'to_hz', allowNull: false },
      reading: { type: DataTypes.DOUBLE, allowNull: false },
      level: { type: DataTypes.DOUBLE, allowNull: false },
      limit: { type: DataTypes.DOUBLE, allowNull: false },
      marginDb: { type: DataTypes.DOUBLE, field: 'margin_db', allowNull: false },
      uncertaintyDb: { type: DataTypes.DOUBLE, field: 'uncertainty_db', allowNull: false },
      verdict: {
        type: DataTypes.ENUM('over', 'needs-final', 'inconclusive', 'not-covered', 'under'),
        allowNull: false,
      },
      because: { type: DataTypes.STRING(300), allowNull: true },
    },
    { sequelize, modelName: 'EvaluationCandidate', tableName: 'evaluation_candidates', timestamps: false },
  );
}
