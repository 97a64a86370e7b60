import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class Calibration extends Model<InferAttributes<Calibration>, InferCreationAttributes<Calibration>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare equipmentId: number;
  declare certificate: string;
  declare laboratory: string;
  declare calibratedOn: string;
  declare dueOn: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineCalibration(sequelize: Sequelize): void {
  Calibration.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      equipmentId: { type: DataTypes.BIGINT.UNSIGNED, field: 'equipment_id', allowNull: false },
      certificate: { type: DataTypes.STRING(80), allowNull: false },
      laboratory: { type: DataTypes.STRING(120), allowNull: false },
      calibratedOn: { type: DataTypes.DATEONLY, field: 'calibrated_on', allowNull: false },
      dueOn: { type: DataTypes.DATEONLY, field: 'due_on', allowNull: true },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'Calibration', tableName: 'calibrations', timestamps: true, updatedAt: false },
  );
}
