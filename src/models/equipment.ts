import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class Equipment extends Model<InferAttributes<Equipment>, InferCreationAttributes<Equipment>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare identifier: string;
  declare role: string;
  declare description: string;
  declare state: CreationOptional<'in-use' | 'quarantined' | 'retired'>;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineEquipment(sequelize: Sequelize): void {
  Equipment.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      identifier: { type: DataTypes.STRING(20), allowNull: false },
      role: { type: DataTypes.STRING(40), allowNull: false },
      description: { type: DataTypes.STRING(200), allowNull: false },
      state: { type: DataTypes.ENUM('in-use', 'quarantined', 'retired'), allowNull: false, defaultValue: 'in-use' },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    { sequelize, modelName: 'Equipment', tableName: 'equipment', timestamps: true },
  );
}
