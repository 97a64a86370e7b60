import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class Upload extends Model<InferAttributes<Upload>, InferCreationAttributes<Upload>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare sha256: string;
  declare name: string;
  declare bytes: number;
  declare recognition: Record<string, unknown>;
  declare userId: number;
  declare expiresAt: Date;
  declare createdAt: CreationOptional<Date>;
}

export function defineUpload(sequelize: Sequelize): void {
  Upload.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      sha256: { type: DataTypes.CHAR(64), allowNull: false },
      name: { type: DataTypes.STRING(200), allowNull: false },
      bytes: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      recognition: { type: DataTypes.JSON, allowNull: false },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      expiresAt: { type: DataTypes.DATE(3), field: 'expires_at', allowNull: false },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'Upload', tableName: 'uploads', timestamps: true, updatedAt: false },
  );
}
