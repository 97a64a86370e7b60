import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  Op,
  type Sequelize,
} from 'sequelize';
import type { StoredPartial, StoredReading } from './stored';

export class Sweep extends Model<InferAttributes<Sweep>, InferCreationAttributes<Sweep>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare number: string;
  declare stateId: number;
  declare sweepFileId: number;
  declare sweepIndex: number;
  declare purpose: 'prescan' | 'final' | 'ambient';
  declare port: 'enclosure' | 'ac-mains' | 'wired-network';
  declare line: CreationOptional<'L' | 'N' | 'L1' | 'L2' | 'L3' | null>;
  declare polarisation: CreationOptional<'horizontal' | 'vertical' | null>;
  declare heightM: CreationOptional<number | null>;
  declare heightSwept: CreationOptional<boolean>;
  declare azimuthDeg: CreationOptional<number | null>;
  declare distanceM: CreationOptional<number | null>;
  declare operatingMode: string;
  /** A quick trial under its state, in words; it never speaks for the state. */
  declare trial: CreationOptional<string | null>;
  declare partial: CreationOptional<StoredPartial | null>;
  declare voidedAt: CreationOptional<Date | null>;
  declare voidReason: CreationOptional<string | null>;
  declare voidedBy: CreationOptional<number | null>;
  declare pathRevisionId: CreationOptional<number | null>;
  declare limitSetId: number;
  declare valuesHold: 'receiver-input' | 'field';
  declare reading: StoredReading;
  declare measuredAt: CreationOptional<Date | null>;
  declare points: number;
  declare firstHz: number;
  declare lastHz: number;
  declare stepHz: CreationOptional<number | null>;
  declare userId: number;
  declare evaluationId: CreationOptional<number | null>;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineSweep(sequelize: Sequelize): void {
  Sweep.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      number: { type: DataTypes.STRING(20), allowNull: false },
      stateId: { type: DataTypes.BIGINT.UNSIGNED, field: 'state_id', allowNull: false },
      sweepFileId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sweep_file_id', allowNull: false },
      sweepIndex: { type: DataTypes.INTEGER.UNSIGNED, field: 'sweep_index', allowNull: false },
      purpose: { type: DataTypes.ENUM('prescan', 'final', 'ambient'), allowNull: false },
      port: { type: DataTypes.ENUM('enclosure', 'ac-mains', 'wired-network'), allowNull: false },
      line: { type: DataTypes.ENUM('L', 'N', 'L1', 'L2', 'L3'), allowNull: true },
      polarisation: { type: DataTypes.ENUM('horizontal', 'vertical'), allowNull: true },
      heightM: { type: DataTypes.DOUBLE, field: 'height_m', allowNull: true },
      heightSwept: { type: DataTypes.BOOLEAN, field: 'height_swept', allowNull: false, defaultValue: false },
      azimuthDeg: { type: DataTypes.DOUBLE, field: 'azimuth_deg', allowNull: true },
      distanceM: { type: DataTypes.DOUBLE, field: 'distance_m', allowNull: true },
      operatingMode: { type: DataTypes.STRING(120), field: 'operating_mode', allowNull: false },
      trial: { type: DataTypes.STRING(120), allowNull: true },
      partial: { type: DataTypes.JSON, allowNull: true },
      voidedAt: { type: DataTypes.DATE(3), field: 'voided_at', allowNull: true },
      voidReason: { type: DataTypes.STRING(300), field: 'void_reason', allowNull: true },
      voidedBy: { type: DataTypes.BIGINT.UNSIGNED, field: 'voided_by', allowNull: true },
      pathRevisionId: { type: DataTypes.BIGINT.UNSIGNED, field: 'path_revision_id', allowNull: true },
      limitSetId: { type: DataTypes.BIGINT.UNSIGNED, field: 'limit_set_id', allowNull: false },
      valuesHold: { type: DataTypes.ENUM('receiver-input', 'field'), field: 'values_hold', allowNull: false },
      reading: { type: DataTypes.JSON, allowNull: false },
      measuredAt: { type: DataTypes.DATE(3), field: 'measured_at', allowNull: true },
      points: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      firstHz: { type: DataTypes.DOUBLE, field: 'first_hz', allowNull: false },
      lastHz: { type: DataTypes.DOUBLE, field: 'last_hz', allowNull: false },
      stepHz: { type: DataTypes.DOUBLE, field: 'step_hz', allowNull: true },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      evaluationId: { type: DataTypes.BIGINT.UNSIGNED, field: 'evaluation_id', allowNull: true },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    {
      sequelize,
      modelName: 'Sweep',
      tableName: 'sweeps',
      timestamps: true,
      // A run whose bytes are still being written is none yet; `Sweep.unscoped()` is for who writes them.
      defaultScope: { where: { evaluationId: { [Op.not]: null } } },
    },
  );
}
