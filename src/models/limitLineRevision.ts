import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { LimitSegment } from '@/emc/types';

export class LimitLineRevision extends Model<
  InferAttributes<LimitLineRevision>,
  InferCreationAttributes<LimitLineRevision>
> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare lineKey: string;
  declare revision: number;
  declare name: string;
  declare document: string;
  declare class: string;
  declare port: string;
  declare detector: 'quasi-peak' | 'average' | 'peak';
  declare bandwidthHz: number;
  declare unit: string;
  declare distanceM: CreationOptional<number | null>;
  declare segments: LimitSegment[];
  declare source: string;
  declare basis: string;
  /** Why it was entered, from which file and by whom; null for what came with the bench file. */
  declare reason: CreationOptional<string | null>;
  declare fileName: CreationOptional<string | null>;
  declare fileSha256: CreationOptional<string | null>;
  declare userId: CreationOptional<number | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineLimitLineRevision(sequelize: Sequelize): void {
  LimitLineRevision.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      lineKey: { type: DataTypes.STRING(60), field: 'line_key', allowNull: false },
      revision: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      name: { type: DataTypes.STRING(200), allowNull: false },
      document: { type: DataTypes.STRING(160), allowNull: false },
      class: { type: DataTypes.STRING(120), allowNull: false },
      port: { type: DataTypes.STRING(120), allowNull: false },
      detector: { type: DataTypes.ENUM('quasi-peak', 'average', 'peak'), allowNull: false },
      bandwidthHz: { type: DataTypes.DOUBLE, field: 'bandwidth_hz', allowNull: false },
      unit: { type: DataTypes.STRING(10), allowNull: false },
      distanceM: { type: DataTypes.DOUBLE, field: 'distance_m', allowNull: true },
      segments: { type: DataTypes.JSON, allowNull: false },
      source: { type: DataTypes.STRING(300), allowNull: false },
      basis: { type: DataTypes.STRING(80), allowNull: false },
      reason: { type: DataTypes.STRING(300), allowNull: true },
      fileName: { type: DataTypes.STRING(200), field: 'file_name', allowNull: true },
      fileSha256: { type: DataTypes.CHAR(64), field: 'file_sha256', allowNull: true },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: true },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    {
      sequelize,
      modelName: 'LimitLineRevision',
      tableName: 'limit_line_revisions',
      timestamps: true,
      updatedAt: false,
    },
  );
}
