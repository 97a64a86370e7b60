import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { RetestStatus } from './retest';

export type RetestAction = 'opened' | 'updated' | 'scheduled' | 'measured' | 'cleared' | 'withdrawn' | 'reopened';

/** One change of a retest, written once. */
export class RetestChange extends Model<InferAttributes<RetestChange>, InferCreationAttributes<RetestChange>> {
  declare id: CreationOptional<number>;
  declare retestId: number;
  declare at: Date;
  declare userId: number;
  declare action: RetestAction;
  declare fromStatus: CreationOptional<RetestStatus | null>;
  declare toStatus: RetestStatus;
  declare reason: string;
  /** The run that brought it about. */
  declare sweepId: CreationOptional<number | null>;
  declare marginFromDb: CreationOptional<number | null>;
  declare marginToDb: CreationOptional<number | null>;
  declare scheduledOn: CreationOptional<string | null>;
  declare note: CreationOptional<string | null>;
}

export function defineRetestChange(sequelize: Sequelize): void {
  const status = ['waiting', 'scheduled', 'measured', 'cleared', 'withdrawn'];
  RetestChange.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      retestId: { type: DataTypes.BIGINT.UNSIGNED, field: 'retest_id', allowNull: false },
      at: { type: DataTypes.DATE(3), allowNull: false },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      action: {
        type: DataTypes.ENUM('opened', 'updated', 'scheduled', 'measured', 'cleared', 'withdrawn', 'reopened'),
        allowNull: false,
      },
      fromStatus: { type: DataTypes.ENUM(...status), field: 'from_status', allowNull: true },
      toStatus: { type: DataTypes.ENUM(...status), field: 'to_status', allowNull: false },
      reason: { type: DataTypes.STRING(400), allowNull: false },
      sweepId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sweep_id', allowNull: true },
      marginFromDb: { type: DataTypes.DOUBLE, field: 'margin_from_db', allowNull: true },
      marginToDb: { type: DataTypes.DOUBLE, field: 'margin_to_db', allowNull: true },
      scheduledOn: { type: DataTypes.DATEONLY, field: 'scheduled_on', allowNull: true },
      note: { type: DataTypes.STRING(300), allowNull: true },
    },
    { sequelize, modelName: 'RetestChange', tableName: 'retest_changes', timestamps: false },
  );
}
