import { DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from 'sequelize';

export class Counter extends Model<InferAttributes<Counter>, InferCreationAttributes<Counter>> {
  declare scope: string;
  declare value: number;
}

export function defineCounter(sequelize: Sequelize): void {
  Counter.init(
    {
      scope: { type: DataTypes.STRING(40), primaryKey: true, allowNull: false },
      value: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
    },
    { sequelize, modelName: 'Counter', tableName: 'counters', timestamps: false },
  );
}
