import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** Where a sample went, and who took it there. Written once; the newest says where it is. */
export class CustodyMove extends Model<InferAttributes<CustodyMove>, InferCreationAttributes<CustodyMove>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare sampleId: number;
  declare place: string;
  declare note: string;
  declare userId: number;
  declare createdAt: CreationOptional<Date>;
}

export function defineCustodyMove(sequelize: Sequelize): void {
  CustodyMove.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      sampleId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sample_id', allowNull: false },
      place: { type: DataTypes.STRING(160), allowNull: false },
      note: { type: DataTypes.STRING(400), allowNull: false },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'CustodyMove', tableName: 'custody_moves', timestamps: true, updatedAt: false },
  );
}
