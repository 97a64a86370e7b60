import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class ModificationState extends Model<
  InferAttributes<ModificationState>,
  InferCreationAttributes<ModificationState>
> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare sampleId: number;
  declare position: number;
  declare description: string;
  declare planned: CreationOptional<boolean>;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineModificationState(sequelize: Sequelize): void {
  ModificationState.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      sampleId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sample_id', allowNull: false },
      position: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: false },
      description: { type: DataTypes.STRING(300), allowNull: false },
      planned: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    { sequelize, modelName: 'ModificationState', tableName: 'modification_states', timestamps: true },
  );
}
