import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class Organisation extends Model<InferAttributes<Organisation>, InferCreationAttributes<Organisation>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare kind: 'lab' | 'client';
  declare name: string;
  declare shortName: string;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineOrganisation(sequelize: Sequelize): void {
  Organisation.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      kind: { type: DataTypes.ENUM('lab', 'client'), allowNull: false },
      name: { type: DataTypes.STRING(120), allowNull: false },
      shortName: { type: DataTypes.STRING(60), field: 'short_name', allowNull: false },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    { sequelize, modelName: 'Organisation', tableName: 'organisations', timestamps: true },
  );
}
