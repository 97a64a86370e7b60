import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A photograph of a run's set-up: what it is. Its bytes are in `photo_parts`. */
export class Photo extends Model<InferAttributes<Photo>, InferCreationAttributes<Photo>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare sweepId: number;
  declare caption: string;
  declare contentType: 'image/jpeg';
  declare width: number;
  declare height: number;
  declare bytes: number;
  /** Hex, of the picture that is kept. */
  declare sha256: string;
  declare smallWidth: number;
  declare smallHeight: number;
  declare sentBytes: number;
  /** Hex, of the file as it was sent, which is not kept: it may say where and with what it was taken. */
  declare sentSha256: string;
  declare withdrawnAt: CreationOptional<Date | null>;
  declare withdrawReason: CreationOptional<string | null>;
  declare withdrawnBy: CreationOptional<number | null>;
  declare version: CreationOptional<number>;
  declare userId: number;
  declare createdAt: CreationOptional<Date>;
}

export function definePhoto(sequelize: Sequelize): void {
  Photo.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      sweepId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sweep_id', allowNull: false },
      caption: { type: DataTypes.STRING(200), allowNull: false },
      contentType: { type: DataTypes.ENUM('image/jpeg'), field: 'content_type', allowNull: false },
      width: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: false },
      height: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: false },
      bytes: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      sha256: { type: DataTypes.CHAR(64), allowNull: false },
      smallWidth: { type: DataTypes.SMALLINT.UNSIGNED, field: 'small_width', allowNull: false },
      smallHeight: { type: DataTypes.SMALLINT.UNSIGNED, field: 'small_height', allowNull: false },
      sentBytes: { type: DataTypes.INTEGER.UNSIGNED, field: 'sent_bytes', allowNull: false },
      sentSha256: { type: DataTypes.CHAR(64), field: 'sent_sha256', allowNull: false },
      withdrawnAt: { type: DataTypes.DATE(3), field: 'withdrawn_at' },
      withdrawReason: { type: DataTypes.STRING(300), field: 'withdraw_reason' },
      withdrawnBy: { type: DataTypes.BIGINT.UNSIGNED, field: 'withdrawn_by' },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'Photo', tableName: 'photos', timestamps: true, updatedAt: false },
  );
}
