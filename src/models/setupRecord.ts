import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** How a run was set up, as somebody said it; never changed, a correction is the next revision. null: nobody has said. */
export class SetupRecord extends Model<InferAttributes<SetupRecord>, InferCreationAttributes<SetupRecord>> {
  declare id: CreationOptional<number>;
  declare sweepId: number;
  declare revision: number;
  declare operatingMode: string | null;
  declare supplyKind: 'ac' | 'dc' | null;
  declare supplyV: number | null;
  declare supplyFrequencyHz: number | null;
  declare supplySource: string | null;
  declare cableLayout: string | null;
  declare ancillary: string | null;
  declare temperatureC: number | null;
  declare humidityPct: number | null;
  declare deviations: string | null;
  declare eutStayed: 'yes' | 'no' | 'not-watched' | null;
  declare whatHappened: string | null;
  declare reason: string | null;
  declare userId: number;
  declare createdAt: CreationOptional<Date>;
}

export function defineSetupRecord(sequelize: Sequelize): void {
  SetupRecord.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      sweepId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sweep_id', allowNull: false },
      revision: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: false },
      operatingMode: { type: DataTypes.STRING(300), field: 'operating_mode' },
      supplyKind: { type: DataTypes.ENUM('ac', 'dc'), field: 'supply_kind' },
      supplyV: { type: DataTypes.DOUBLE, field: 'supply_v' },
      supplyFrequencyHz: { type: DataTypes.DOUBLE, field: 'supply_frequency_hz' },
      supplySource: { type: DataTypes.STRING(120), field: 'supply_source' },
      cableLayout: { type: DataTypes.STRING(1000), field: 'cable_layout' },
      ancillary: { type: DataTypes.STRING(1000) },
      temperatureC: { type: DataTypes.DOUBLE, field: 'temperature_c' },
      humidityPct: { type: DataTypes.DOUBLE, field: 'humidity_pct' },
      deviations: { type: DataTypes.STRING(1000) },
      eutStayed: { type: DataTypes.ENUM('yes', 'no', 'not-watched'), field: 'eut_stayed' },
      whatHappened: { type: DataTypes.STRING(500), field: 'what_happened' },
      reason: { type: DataTypes.STRING(300) },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'SetupRecord', tableName: 'setup_records', timestamps: true, updatedAt: false },
  );
}
