import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class Throttle extends Model<InferAttributes<Throttle>, InferCreationAttributes<Throttle>> {
  declare keyHash: string;
  declare failures: number;
  declare lastFailureAt: Date;
  declare blockedUntil: CreationOptional<Date | null>;
}

export function defineThrottle(sequelize: Sequelize): void {
  Throttle.init(
    {
      keyHash: { type: DataTypes.CHAR(64), field: 'key_hash', primaryKey: true, allowNull: false },
      failures: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      lastFailureAt: { type: DataTypes.DATE(3), field: 'last_failure_at', allowNull: false },
      blockedUntil: { type: DataTypes.DATE(3), field: 'blocked_until', allowNull: true },
    },
    { sequelize, modelName: 'Throttle', tableName: 'throttles', timestamps: false },
  );
}
