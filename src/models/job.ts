import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import { DECISION_RULES, type DecisionRule } from '@/emc/kinds';

export class Job extends Model<InferAttributes<Job>, InferCreationAttributes<Job>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare number: string;
  declare organisationId: number;
  declare productId: number;
  declare title: string;
  declare decisionRule: DecisionRule;
  declare state: CreationOptional<'open' | 'declined' | 'closed'>;
  declare stateReason: CreationOptional<string | null>;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineJob(sequelize: Sequelize): void {
  Job.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      number: { type: DataTypes.STRING(20), allowNull: false },
      organisationId: { type: DataTypes.BIGINT.UNSIGNED, field: 'organisation_id', allowNull: false },
      productId: { type: DataTypes.BIGINT.UNSIGNED, field: 'product_id', allowNull: false },
      title: { type: DataTypes.STRING(160), allowNull: false },
      decisionRule: { type: DataTypes.ENUM(...DECISION_RULES), field: 'decision_rule', allowNull: false },
      state: { type: DataTypes.ENUM('open', 'declined', 'closed'), allowNull: false, defaultValue: 'open' },
      stateReason: { type: DataTypes.STRING(500), field: 'state_reason', allowNull: true },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    { sequelize, modelName: 'Job', tableName: 'jobs', timestamps: true },
  );
}
