import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import { FACTOR_QUANTITIES, type FactorQuantity } from '@/emc/kinds';

export class FactorTableRevision extends Model<
  InferAttributes<FactorTableRevision>,
  InferCreationAttributes<FactorTableRevision>
> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare equipmentId: number;
  declare calibrationId: CreationOptional<number | null>;
  declare name: string;
  declare revision: number;
  declare quantity: FactorQuantity;
  declare polarisation: CreationOptional<'horizontal' | 'vertical' | null>;
  declare distanceM: CreationOptional<number | null>;
  declare frequenciesHz: number[];
  declare valuesDb: number[];
  declare source: string;
  /** Why it was entered, from which file and by whom; null for what came with the bench file. */
  declare reason: CreationOptional<string | null>;
  declare fileName: CreationOptional<string | null>;
  declare fileSha256: CreationOptional<string | null>;
  declare userId: CreationOptional<number | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineFactorTableRevision(sequelize: Sequelize): void {
  FactorTableRevision.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      equipmentId: { type: DataTypes.BIGINT.UNSIGNED, field: 'equipment_id', allowNull: false },
      calibrationId: { type: DataTypes.BIGINT.UNSIGNED, field: 'calibration_id', allowNull: true },
      name: { type: DataTypes.STRING(120), allowNull: false },
      revision: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      quantity: { type: DataTypes.ENUM(...FACTOR_QUANTITIES), allowNull: false },
      polarisation: { type: DataTypes.ENUM('horizontal', 'vertical'), allowNull: true },
      distanceM: { type: DataTypes.DOUBLE, field: 'distance_m', allowNull: true },
      frequenciesHz: { type: DataTypes.JSON, field: 'frequencies_hz', allowNull: false },
      valuesDb: { type: DataTypes.JSON, field: 'values_db', allowNull: false },
      source: { type: DataTypes.STRING(300), allowNull: false },
      reason: { type: DataTypes.STRING(300), allowNull: true },
      fileName: { type: DataTypes.STRING(200), field: 'file_name', allowNull: true },
      fileSha256: { type: DataTypes.CHAR(64), field: 'file_sha256', allowNull: true },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: true },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    {
      sequelize,
      modelName: 'FactorTableRevision',
      tableName: 'factor_table_revisions',
      timestamps: true,
      updatedAt: false,
    },
  );
}
