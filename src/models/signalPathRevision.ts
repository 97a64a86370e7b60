import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { StoredBudget, StoredPathItem, StoredUncertainty } from './stored';

export class SignalPathRevision extends Model<
  InferAttributes<SignalPathRevision>,
  InferCreationAttributes<SignalPathRevision>
> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare signalPathId: number;
  declare revision: number;
  declare items: StoredPathItem[];
  declare uncertainty: StoredUncertainty;
  declare uncertaintySource: string;
  /** What `uncertainty` was computed from; null where its figures are stated. */
  declare budget: CreationOptional<StoredBudget | null>;
  declare reason: CreationOptional<string | null>;
  declare userId: CreationOptional<number | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineSignalPathRevision(sequelize: Sequelize): void {
  SignalPathRevision.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      signalPathId: { type: DataTypes.BIGINT.UNSIGNED, field: 'signal_path_id', allowNull: false },
      revision: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      items: { type: DataTypes.JSON, allowNull: false },
      uncertainty: { type: DataTypes.JSON, allowNull: false },
      uncertaintySource: { type: DataTypes.STRING(300), field: 'uncertainty_source', allowNull: false },
      budget: { type: DataTypes.JSON, allowNull: true },
      reason: { type: DataTypes.STRING(300), allowNull: true },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: true },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    {
      sequelize,
      modelName: 'SignalPathRevision',
      tableName: 'signal_path_revisions',
      timestamps: true,
      updatedAt: false,
    },
  );
}
