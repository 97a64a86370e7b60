import { DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from 'sequelize';

export class PhotoPart extends Model<InferAttributes<PhotoPart>, InferCreationAttributes<PhotoPart>> {
  declare photoId: number;
  declare size: 'whole' | 'small';
  declare seq: number;
  declare part: Buffer;
}

export function definePhotoPart(sequelize: Sequelize): void {
  PhotoPart.init(
    {
      photoId: { type: DataTypes.BIGINT.UNSIGNED, field: 'photo_id', primaryKey: true, allowNull: false },
      size: { type: DataTypes.ENUM('whole', 'small'), primaryKey: true, allowNull: false },
      seq: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true, allowNull: false },
      part: { type: DataTypes.BLOB('medium'), allowNull: false },
    },
    { sequelize, modelName: 'PhotoPart', tableName: 'photo_parts', timestamps: false },
  );
}
