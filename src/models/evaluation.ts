import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { DecisionRule } from '@/emc/kinds';
import type { Verdict } from '@/emc/kinds';
import type { CoverageGap, JudgedPair } from '@/emc/types';
import type { StoredInputs } from './stored';

export class Evaluation extends Model<InferAttributes<Evaluation>, InferCreationAttributes<Evaluation>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare sweepId: number;
  declare engine: string;
  declare decisionRule: DecisionRule;
  declare inputs: StoredInputs;
  declare verdict: 'over' | 'needs-final' | 'inconclusive' | 'not-covered' | 'under';
  declare worstFrequencyHz: CreationOptional<number | null>;
  declare worstMarginDb: CreationOptional<number | null>;
  declare counts: Record<Verdict, number>;
  declare pairs: JudgedPair[];
  declare gaps: CoverageGap[];
  declare candidates: number;
  /** Why a kept run was judged again; null for the evaluation it was kept with. */
  declare reason: CreationOptional<string | null>;
  /** Row id of the evaluation before it, when this one repeats its figures bit for bit. */
  declare repeatsId: CreationOptional<number | null>;
  declare userId: number;
  declare createdAt: CreationOptional<Date>;
}

export function defineEvaluation(sequelize: Sequelize): void {
  Evaluation.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      sweepId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sweep_id', allowNull: false },
      engine: { type: DataTypes.STRING(60), allowNull: false },
      decisionRule: { type: DataTypes.STRING(40), field: 'decision_rule', allowNull: false },
      inputs: { type: DataTypes.JSON, allowNull: false },
      verdict: {
        type: DataTypes.ENUM('over', 'needs-final', 'inconclusive', 'not-covered', 'under'),
        allowNull: false,
      },
      worstFrequencyHz: { type: DataTypes.DOUBLE, field: 'worst_frequency_hz', allowNull: true },
      worstMarginDb: { type: DataTypes.DOUBLE, field: 'worst_margin_db', allowNull: true },
      counts: { type: DataTypes.JSON, allowNull: false },
      pairs: { type: DataTypes.JSON, allowNull: false },
      gaps: { type: DataTypes.JSON, allowNull: false },
      candidates: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      reason: { type: DataTypes.STRING(300), allowNull: true },
      repeatsId: { type: DataTypes.BIGINT.UNSIGNED, field: 'repeats_id', allowNull: true },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'Evaluation', tableName: 'evaluations', timestamps: true, updatedAt: false },
  );
}
