import { DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from 'sequelize';

export class Setting extends Model<InferAttributes<Setting>, InferCreationAttributes<Setting>> {
  declare name: string;
  declare value: unknown;
}

export function defineSetting(sequelize: Sequelize): void {
  Setting.init(
    {
      name: { type: DataTypes.STRING(40), primaryKey: true, allowNull: false },
      value: { type: DataTypes.JSON, allowNull: false },
    },
    { sequelize, modelName: 'Setting', tableName: 'settings', timestamps: false },
  );
}
