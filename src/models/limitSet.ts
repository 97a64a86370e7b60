import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class LimitSet extends Model<InferAttributes<LimitSet>, InferCreationAttributes<LimitSet>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare name: string;
  declare port: 'enclosure' | 'ac-mains' | 'wired-network';
  declare distanceM: CreationOptional<number | null>;
  declare revision: number;
  declare lineRevisionIds: string[];
  declare withdrawnAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineLimitSet(sequelize: Sequelize): void {
  LimitSet.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      name: { type: DataTypes.STRING(160), allowNull: false },
      port: { type: DataTypes.ENUM('enclosure', 'ac-mains', 'wired-network'), allowNull: false },
      distanceM: { type: DataTypes.DOUBLE, field: 'distance_m', allowNull: true },
      revision: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      lineRevisionIds: { type: DataTypes.JSON, field: 'line_revision_ids', allowNull: false },
      withdrawnAt: { type: DataTypes.DATE(3), field: 'withdrawn_at', allowNull: true },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'LimitSet', tableName: 'limit_sets', timestamps: true, updatedAt: false },
  );
}
