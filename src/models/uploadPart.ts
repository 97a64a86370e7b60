import { DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from 'sequelize';

export class UploadPart extends Model<InferAttributes<UploadPart>, InferCreationAttributes<UploadPart>> {
  declare uploadId: number;
  declare seq: number;
  declare part: Buffer;
}

export function defineUploadPart(sequelize: Sequelize): void {
  UploadPart.init(
    {
      uploadId: { type: DataTypes.BIGINT.UNSIGNED, field: 'upload_id', primaryKey: true, allowNull: false },
      seq: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
      part: { type: DataTypes.BLOB('medium'), allowNull: false },
    },
    { sequelize, modelName: 'UploadPart', tableName: 'upload_parts', timestamps: false },
  );
}
